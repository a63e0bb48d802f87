using System.Data.Common;
using System.Globalization;
using System.Numerics;

namespace Smoothing.Sql;

/// <summary>Numbers out of readers, whatever type the engine gave them.</summary>
internal static class RowReading
{
    public static double Double(DbDataReader reader, int at) => reader.IsDBNull(at) ? double.NaN : Double(reader.GetValue(at), reader.GetName(at));

    public static long Long(DbDataReader reader, int at) => reader.IsDBNull(at) ? 0 : Long(reader.GetValue(at), reader.GetName(at));

    public static double Double(object value, string name) => value switch
    {
        double number => number,
        BigInteger big => (double)big,
        string or bool or byte[] or DateTime => throw Unexpected(value, name),
        IConvertible number => number.ToDouble(CultureInfo.InvariantCulture),
        _ => throw Unexpected(value, name),
    };

    public static long Long(object value, string name)
    {
        double number = value switch
        {
            long whole => whole,
            _ => Double(value, name),
        };

        // 2^53: beyond it a double no longer tells neighbouring whole numbers apart.
        if (!(Math.Abs(number) <= 9007199254740992 && number == Math.Floor(number)))
        {
            throw new ArgumentException(
                SourceChecks.Text($"column {name} must hold whole numbers up to 2^53, but holds {number}: with cells this narrow for values this large choose a larger CellWidth."), name);
        }

        return (long)number;
    }

    private static ArgumentException Unexpected(object value, string name) =>
        new(SourceChecks.Text($"column {name} must hold numbers, but holds {value.GetType().Name} '{value}': run the SQL as ToSql() gives it."), name);
}

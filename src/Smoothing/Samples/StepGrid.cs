namespace Smoothing.Samples;

/// <summary>The multiples of a step, with the distance at which a value still counts as one.</summary>
/// <param name="Step">The step, above 0; or its inverse where <paramref name="Inverse"/> says so.</param>
/// <param name="Inverse">Whether 1/<paramref name="Step"/> is meant: 1/1000 is not a double, 1000 is.</param>
/// <param name="Distance">Half the printed place for values rounded twice, else 0.</param>
/// <param name="Relative">The relative error of a printed number.</param>
internal readonly record struct StepGrid(double Step, bool Inverse, double Distance, double Relative)
{
    /// <summary>Four roundings of a double: a decimal read and divided by a step.</summary>
    public const double DoubleError = 4 * 1.2e-16;

    /// <summary>Half a unit in the last place of a single-precision number, 2^−24, and a little.</summary>
    public const double SingleError = 6.1e-8;

    /// <summary>A number shows whether it is a multiple only where its own error is below 1/2000 of the step: chance then marks 1 in 1000.</summary>
    private const double Shown = 1 / 2000.0;

    public double Size => Inverse ? 1 / Step : Step;

    /// <summary>Whether x is a multiple, and of what index.</summary>
    public bool Holds(double x, out double index)
    {
        double scaled = Inverse ? x * Step : x / Step;
        index = Math.Round(scaled);
        double error = Relative * Math.Abs(scaled);
        double tolerance = error + (Inverse ? Distance * Step : Distance / Step);
        return error <= Shown && Math.Abs(scaled - index) <= tolerance && (index != 0 || x == 0 || Distance > 0);
    }

    /// <summary>Share of the weight of the values other than 0 that are multiples; stops and returns 0 once it must stay below <paramref name="needed"/>.</summary>
    public double Share(ValueTable table, double needed, out int distinct)
    {
        double all = 0;
        distinct = 0;
        for (int i = 0; i < table.Values.Length; i++)
        {
            all += table.Values[i] == 0 ? 0 : table.Shares[i];
        }

        double off = 0;
        double allowed = ((1 - needed) * all) + 1e-12;
        for (int i = 0; i < table.Values.Length; i++)
        {
            if (table.Values[i] == 0)
            {
                continue;
            }

            if (Holds(table.Values[i], out double index))
            {
                distinct += index != 0 ? 1 : 0;
            }
            else if ((off += table.Shares[i]) > allowed)
            {
                return 0;
            }
        }

        return all > 0 ? (all - off) / all : 0;
    }
}

using System.Diagnostics.CodeAnalysis;
using System.Runtime.CompilerServices;

namespace Smoothing.Numerics;

/// <summary>The one place where arguments are checked. Every condition is written so that NaN fails it.</summary>
internal static class Guard
{
    /// <summary>An interpolated message in the invariant culture.</summary>
    public static string Text(FormattableString message) => FormattableString.Invariant(message);

    /// <summary>A finite number above zero, such as a bandwidth.</summary>
    public static double Positive(double value, string remedy = "pass a finite number above zero", [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (!(value > 0 && double.IsFinite(value)))
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must be positive and finite, but is {value}: {remedy}."));
        }

        return value;
    }

    /// <summary>A finite number.</summary>
    public static double Finite(double value, string remedy = "pass a finite number", [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (!double.IsFinite(value))
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must be finite, but is {value}: {remedy}."));
        }

        return value;
    }

    /// <summary>Anything but NaN; infinities pass.</summary>
    public static double Number(double value, string remedy = "leave missing values out before asking", [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (double.IsNaN(value))
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must be a number, but is NaN: {remedy}."));
        }

        return value;
    }

    /// <summary>No NaN in a span; names the first index.</summary>
    public static void Numbers(ReadOnlySpan<double> values, string name)
    {
        for (int i = 0; i < values.Length; i++)
        {
            if (double.IsNaN(values[i]))
            {
                throw new ArgumentException(Text($"{name}[{i}] must be a number, but is NaN: leave missing points out before asking."), name);
            }
        }
    }

    /// <summary>A probability in the closed interval [0, 1].</summary>
    public static double Probability(double value, [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (!(value >= 0 && value <= 1))
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must lie in [0, 1], but is {value}: pass a share such as 0.95, not a percentage."));
        }

        return value;
    }

    /// <summary>A confidence level strictly between 0 and 1.</summary>
    public static double Level(double value, [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (!(value > 0 && value < 1))
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must lie strictly between 0 and 1, but is {value}: pass a level such as 0.95, not a percentage."));
        }

        return value;
    }

    /// <summary>A whole number of at least <paramref name="minimum"/>.</summary>
    public static int AtLeast(int value, int minimum, [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (value < minimum)
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must be at least {minimum}, but is {value}."));
        }

        return value;
    }

    /// <summary>A whole number of at least <paramref name="minimum"/>.</summary>
    public static long AtLeast(long value, long minimum, [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (value < minimum)
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must be at least {minimum}, but is {value}."));
        }

        return value;
    }

    /// <summary>A whole number in the closed range <paramref name="minimum"/> to <paramref name="maximum"/>.</summary>
    public static int InRange(int value, int minimum, int maximum, [CallerArgumentExpression(nameof(value))] string name = "")
    {
        if (value < minimum || value > maximum)
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must lie between {minimum} and {maximum}, but is {value}."));
        }

        return value;
    }

    /// <summary>Both ends finite and in order, <paramref name="from"/> below <paramref name="to"/>.</summary>
    public static void Range(double from, double to)
    {
        Finite(from, "pass the left end of the range", nameof(from));
        Finite(to, "pass the right end of the range", nameof(to));
        if (!(from < to))
        {
            throw new ArgumentException(Text($"from must lie below to, but from is {from} and to is {to}: exchange them."), nameof(from));
        }
    }

    /// <summary>A destination long enough for the results.</summary>
    public static void Destination(int needed, int actual, string name = "destination")
    {
        if (actual < needed)
        {
            throw new ArgumentException(Text($"{name} must hold {needed} values, but holds {actual}: pass a longer span."), name);
        }
    }

    /// <summary>Not null.</summary>
    public static T Given<T>([NotNull] T? value, [CallerArgumentExpression(nameof(value))] string name = "")
        where T : class
    {
        ArgumentNullException.ThrowIfNull(value, name);
        return value;
    }
}

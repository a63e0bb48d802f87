using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <content>Columns as a notebook has them.</content>
public sealed partial class Sample
{
    /// <summary>Copies and checks an array of values; see <see cref="Of(ReadOnlySpan{double}, SampleOptions?)"/>.</summary>
    /// <param name="values">The measurements, finite; NaN is missing.</param>
    /// <param name="options">Weights, missing values, name and unit; null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">No value is left, a value is infinite, a missing one is not allowed, or weights are unusable.</exception>
    public static Sample Of(double[] values, SampleOptions? options = null) => Of(Guard.Given(values).AsSpan(), options);

    /// <summary>Reads a sequence of values once; see <see cref="Of(ReadOnlySpan{double}, SampleOptions?)"/>.</summary>
    /// <param name="values">The measurements, finite; NaN is missing.</param>
    /// <param name="options">Weights, missing values, name and unit; null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">No value is left, a value is infinite, a missing one is not allowed, or weights are unusable.</exception>
    public static Sample Of(IEnumerable<double> values, SampleOptions? options = null) => Of(Guard.Given(values).ToArray().AsSpan(), options);

    /// <summary>Reads a sequence in which null stands for a missing value.</summary>
    /// <param name="values">The measurements; null and NaN are missing and handled as the options say.</param>
    /// <param name="options">Weights, missing values, name and unit; null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">No value is left, a value is infinite, a missing one is not allowed, or weights are unusable.</exception>
    public static Sample Of(IEnumerable<double?> values, SampleOptions? options = null) =>
        Of(Guard.Given(values).Select(value => value ?? double.NaN).ToArray().AsSpan(), options);

    /// <summary>Reads a column of durations.</summary>
    /// <param name="values">The durations.</param>
    /// <param name="unit">The unit they are read in: 90 seconds in minutes are 1.5.</param>
    /// <param name="options">Weights, name and unit; where <see cref="SampleOptions.Unit"/> is empty it becomes ms, s, min, h or d. Null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="unit"/> is not one of the names.</exception>
    /// <exception cref="ArgumentException">There is no value, or weights are unusable.</exception>
    /// <remarks>Ticks of 100 ns divided by those of the unit, rounded once.</remarks>
    public static Sample Of(IEnumerable<TimeSpan> values, TimeUnit unit, SampleOptions? options = null)
    {
        long ticks = Ticks(unit);
        return Of(Guard.Given(values).Select(value => (double)value.Ticks / ticks).ToArray().AsSpan(), InUnit(options, unit));
    }

    /// <summary>Reads a column of durations in which null stands for a missing one.</summary>
    /// <param name="values">The durations; null is missing and handled as the options say.</param>
    /// <param name="unit">The unit they are read in: 90 seconds in minutes are 1.5.</param>
    /// <param name="options">Weights, missing values, name and unit; where <see cref="SampleOptions.Unit"/> is empty it becomes ms, s, min, h or d. Null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="unit"/> is not one of the names.</exception>
    /// <exception cref="ArgumentException">No value is left, a missing one is not allowed, or weights are unusable.</exception>
    public static Sample Of(IEnumerable<TimeSpan?> values, TimeUnit unit, SampleOptions? options = null)
    {
        long ticks = Ticks(unit);
        return Of(Guard.Given(values).Select(value => value is TimeSpan span ? (double)span.Ticks / ticks : double.NaN).ToArray().AsSpan(), InUnit(options, unit));
    }

    private static SampleOptions InUnit(SampleOptions? options, TimeUnit unit)
    {
        options ??= new SampleOptions();
        return options.Unit.Length > 0 ? options : options with { Unit = Symbol(unit) };
    }

    private static long Ticks(TimeUnit unit) => unit switch
    {
        TimeUnit.Milliseconds => TimeSpan.TicksPerMillisecond,
        TimeUnit.Seconds => TimeSpan.TicksPerSecond,
        TimeUnit.Minutes => TimeSpan.TicksPerMinute,
        TimeUnit.Hours => TimeSpan.TicksPerHour,
        TimeUnit.Days => TimeSpan.TicksPerDay,
        _ => throw new ArgumentOutOfRangeException(nameof(unit), Guard.Text($"unit must be one of the names of TimeUnit, but is {(int)unit}: pass TimeUnit.Minutes, for instance.")),
    };

    private static string Symbol(TimeUnit unit) => unit switch
    {
        TimeUnit.Milliseconds => "ms",
        TimeUnit.Seconds => "s",
        TimeUnit.Minutes => "min",
        TimeUnit.Hours => "h",
        _ => "d",
    };
}

using System.Runtime.CompilerServices;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <content>Columns as callers have them.</content>
public sealed partial class DensityStudy
{
    /// <summary>Studies an array of values; see <see cref="Of(ReadOnlySpan{double}, StudyOptions?)"/>.</summary>
    /// <param name="values">The measurements; NaN is missing and handled as <see cref="StudyOptions.Missing"/> says.</param>
    /// <param name="options">What is asked; null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">Values, weights or options are unusable; the message names the first fault and its remedy.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    [OverloadResolutionPriority(1)]
    public static DensityStudy Of(double[] values, StudyOptions? options = null) => Of(Guard.Given(values).AsSpan(), options);

    /// <summary>Reads a sequence of values once and studies them.</summary>
    /// <param name="values">The measurements; NaN is missing and handled as <see cref="StudyOptions.Missing"/> says.</param>
    /// <param name="options">What is asked; null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">Values, weights or options are unusable; the message names the first fault and its remedy.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    public static DensityStudy Of(IEnumerable<double> values, StudyOptions? options = null) => Of(Guard.Given(values).ToArray().AsSpan(), options);

    /// <summary>Studies a column in which null stands for a missing value.</summary>
    /// <param name="values">The measurements; null and NaN are missing and handled as <see cref="StudyOptions.Missing"/> says.</param>
    /// <param name="options">What is asked; null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">Values, weights or options are unusable; the message names the first fault and its remedy.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    public static DensityStudy Of(IEnumerable<double?> values, StudyOptions? options = null)
    {
        options ??= new StudyOptions();
        return Of(Sample.Of(values, StudySteps.Columns(options)), options);
    }

    /// <summary>Studies a column of durations.</summary>
    /// <param name="values">The durations.</param>
    /// <param name="unit">The unit they are read in: 90 seconds in minutes are 1.5. Limits, support and bandwidth of the options are in it too.</param>
    /// <param name="options">What is asked; where <see cref="StudyOptions.Unit"/> is empty it becomes ms, s, min, h or d. Null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">Values, weights or options are unusable; the message names the first fault and its remedy.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    public static DensityStudy Of(IEnumerable<TimeSpan> values, TimeUnit unit, StudyOptions? options = null)
    {
        options ??= new StudyOptions();
        return Of(Sample.Of(values, unit, StudySteps.Columns(options)), options);
    }

    /// <summary>Studies a column of durations in which null stands for a missing one.</summary>
    /// <param name="values">The durations; null is missing and handled as <see cref="StudyOptions.Missing"/> says.</param>
    /// <param name="unit">The unit they are read in: 90 seconds in minutes are 1.5. Limits, support and bandwidth of the options are in it too.</param>
    /// <param name="options">What is asked; where <see cref="StudyOptions.Unit"/> is empty it becomes ms, s, min, h or d. Null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="values"/> is null.</exception>
    /// <exception cref="ArgumentException">Values, weights or options are unusable; the message names the first fault and its remedy.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    public static DensityStudy Of(IEnumerable<TimeSpan?> values, TimeUnit unit, StudyOptions? options = null)
    {
        options ??= new StudyOptions();
        return Of(Sample.Of(values, unit, StudySteps.Columns(options)), options);
    }
}

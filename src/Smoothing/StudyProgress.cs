namespace Smoothing;

/// <summary>Adds up what the parts of a study have done and tells the caller's progress a share that never falls.</summary>
internal sealed class StudyProgress(IProgress<double>? target)
{
    /// <summary>The parts in the order of their cost; the last two are worked out when they are first asked for.</summary>
    public enum Part
    {
        /// <summary>Bandwidth, curve, band, shares, quantiles.</summary>
        Curve,

        /// <summary>Tests for groups.</summary>
        Groups,

        /// <summary>Comparison with a reference.</summary>
        Comparison,
    }

    // Rough shares of the time at a thousand values; they only make a progress bar move evenly.
    private static readonly double[] s_weights = [0.3, 0.4, 0.3];

    private readonly Lock _lock = new();
    private readonly double[] _done = new double[3];
    private double _told;

    public void Report(Part part, double fraction)
    {
        if (target is null)
        {
            return;
        }

        double sum = 0;
        lock (_lock)
        {
            _done[(int)part] = Math.Max(_done[(int)part], Math.Clamp(fraction, 0, 1));
            for (int i = 0; i < _done.Length; i++)
            {
                sum += s_weights[i] * _done[i];
            }

            // Told in steps of 1/200: more would only cost time. 0.3 + 0.4 + 0.3 rounds to 1.
            sum = Math.Round(sum * 200) / 200;
            if (!(sum > _told))
            {
                return;
            }

            _told = sum;
        }

        target.Report(sum);
    }

    /// <summary>A progress that speaks for one part.</summary>
    public IProgress<double>? For(Part part) => target is null ? null : new Relay(fraction => Report(part, fraction));

    private sealed class Relay(Action<double> report) : IProgress<double>
    {
        public void Report(double value) => report(value);
    }
}

namespace Smoothing.Sql;

/// <summary>What the first pass found in one group.</summary>
public sealed record ColumnRange
{
    /// <summary>The values of the group columns; empty where there are none.</summary>
    public IReadOnlyList<object?> Group { get; init; } = [];

    /// <summary>Number of rows that passed the filter.</summary>
    public long Rows { get; init; }

    /// <summary>Rows left out because the value is NULL.</summary>
    public long Missing { get; init; }

    /// <summary>Rows left out because the value is NaN or infinite. SQLite stores NaN as NULL and counts it there.</summary>
    public long NotFinite { get; init; }

    /// <summary>Rows left out because their weight is 0.</summary>
    public long Weightless { get; init; }

    /// <summary>Rows with a finite value, weight 0 included.</summary>
    public long Kept { get; init; }

    /// <summary>Smallest value of weight above 0; NaN where there is none.</summary>
    public double Low { get; init; } = double.NaN;

    /// <summary>Largest value of weight above 0; NaN where there is none.</summary>
    public double High { get; init; } = double.NaN;

    /// <summary>Σw of the values kept; their number without weights.</summary>
    public double Weight { get; init; }

    /// <summary>Σwx/Σw, to the accuracy of the engine's sums; for orientation.</summary>
    public double Mean { get; init; } = double.NaN;

    /// <summary>Rows with a value whose weight is negative, NULL, NaN, infinite or, for counts, no whole number.</summary>
    internal long BadWeights { get; init; }

    internal long Texts { get; init; }

    internal long TextWeights { get; init; }

    internal ColumnRange Add(ColumnRange other)
    {
        double weight = Weight + other.Weight;
        return this with
        {
            Rows = Rows + other.Rows,
            Missing = Missing + other.Missing,
            NotFinite = NotFinite + other.NotFinite,
            Weightless = Weightless + other.Weightless,
            Kept = Kept + other.Kept,
            Low = Lower(Low, other.Low),
            High = -Lower(-High, -other.High),
            Weight = weight,
            Mean = double.IsNaN(Mean) ? other.Mean : double.IsNaN(other.Mean) ? Mean : Mean + ((other.Mean - Mean) * (other.Weight / weight)),
            BadWeights = BadWeights + other.BadWeights,
            Texts = Texts + other.Texts,
            TextWeights = TextWeights + other.TextWeights,
        };
    }

    private static double Lower(double a, double b) => double.IsNaN(a) || b < a ? b : a;
}

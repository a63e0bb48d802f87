namespace Smoothing;

/// <summary>What a picture of a study shows, ready to draw: no statistics happen after this.</summary>
internal sealed record FigureModel
{
    /// <summary>Abscissae, increasing, in the unit of the data.</summary>
    public required IReadOnlyList<double> X { get; init; }

    /// <summary>The curve, in 1/unit.</summary>
    public required IReadOnlyList<double> Y { get; init; }

    /// <summary>What the curve is called in the legend.</summary>
    public string CurveWords { get; init; } = "curve";

    /// <summary>Lower edge of the band at each abscissa; empty where no band can be given.</summary>
    public IReadOnlyList<double> Lower { get; init; } = [];

    /// <summary>Upper edge of the band.</summary>
    public IReadOnlyList<double> Upper { get; init; } = [];

    /// <summary>Words for the band, such as "95 % band".</summary>
    public string BandWords { get; init; } = "";

    /// <summary>The curve corrected for the bias of smoothing, drawn along <see cref="Biased"/> only; empty without a band.</summary>
    public IReadOnlyList<double> Corrected { get; init; } = [];

    /// <summary>Stretches of the axis where the smoothing bias exceeds the half-width of the band.</summary>
    public IReadOnlyList<(double From, double To)> Biased { get; init; } = [];

    /// <summary>The curve of a reference at each abscissa; empty without one.</summary>
    public IReadOnlyList<double> Second { get; init; } = [];

    /// <summary>What the reference is called in the legend.</summary>
    public string SecondWords { get; init; } = "";

    /// <summary>Stretches of the axis where the two curves differ beyond chance, with the side that is higher.</summary>
    public IReadOnlyList<(double From, double To, bool FirstHigher)> Different { get; init; } = [];

    /// <summary>Vertical lines at limits, each with a short label.</summary>
    public IReadOnlyList<(double X, string Label)> Limits { get; init; } = [];

    /// <summary>Peaks: place, height and a short label.</summary>
    public IReadOnlyList<(double X, double Y, string Label)> Peaks { get; init; } = [];

    /// <summary>Values (or cell centres) with their relative weight, for the strip under the axis.</summary>
    public IReadOnlyList<(double X, double Weight)> Strip { get; init; } = [];

    /// <summary>Point masses taken out of the curve, each with a label.</summary>
    public IReadOnlyList<(double X, string Label)> Atoms { get; init; } = [];

    /// <summary>Name of the quantity.</summary>
    public string Name { get; init; } = "";

    /// <summary>Unit of the values.</summary>
    public string Unit { get; init; } = "";

    /// <summary>One sentence that says what one sees.</summary>
    public string Alternative { get; init; } = "";
}

using System.Runtime.CompilerServices;
using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>The one door: data in, a complete answer out.</summary>
/// <remarks>
/// Checks the values, chooses the smoothing, draws the curve with its band, answers the questions in <see cref="StudyOptions"/>, and says how
/// far each answer can be trusted. Immutable and safe to share between threads. The same input and seed give the same report, byte for byte, in any culture and on any number of threads.
/// An estimate informs a decision; where people can be hurt it replaces no standard, code or licensed judgement.
/// </remarks>
public sealed partial class DensityStudy
{
    private readonly Lazy<IReadOnlyList<Caution>> _cautions;
    private readonly Lazy<ReportModel> _report;

    private DensityStudy(Sample sample, StudyOptions options)
    {
        Options = options;
        Sample = sample;
        _progress = new StudyProgress(options.Progress);
        Name = TextCleaner.Name(options.Name.Length > 0 ? options.Name : sample.Name);
        Unit = TextCleaner.Name(options.Unit.Length > 0 ? options.Unit : sample.Unit);
        (Atoms, CurveSample) = StudyAtoms.TakeOut(sample);
        CurveShare = 1 - Atoms.Sum(a => a.Share);
        Bandwidth = StudySteps.Choose(CurveSample, options);
        Density = Density.Of(CurveSample, options.Kernel, Bandwidth, new DensityOptions { Support = options.Support, Boundary = options.Boundary });
        Picture = StudySteps.WithAtoms(StudySteps.PictureRange(CurveSample, Bandwidth, options), Atoms, options);
        options.Cancellation.ThrowIfCancellationRequested();
        _progress.Report(StudyProgress.Part.Curve, 0.4);
        Uncertainty = StudySteps.Trust(Density, Bandwidth, options);
        Band = Uncertainty?.Band(Picture.Lower, Picture.Upper, options.Points);
        Curve = Tabulate();
        Peaks = StudyPeaks.Of(Density);
        options.Cancellation.ThrowIfCancellationRequested();
        _progress.Report(StudyProgress.Part.Curve, 0.8);
        SerialDependence dependence = StudySteps.Serial(options);
        Limits = [.. options.Limits.Select(limit => new LimitAnswer(limit, Shares.Beyond(sample, limit, options.Level, dependence: dependence)))];
        Quantiles = [.. options.Probabilities.Select(p => Inference.Quantiles.Of(sample, p, options.Level, dependence: dependence))];
        Reference = StudyComparison.Reference(options, this);
        LimitChanges = StudyComparison.Changes(this);
        Plan = PrecisionPlan.Of(StudySteps.Observations(sample), Bandwidth.Status == BandwidthStatus.RoundingFloor);
        _progress.Report(StudyProgress.Part.Curve, 1);
        _groups = new(FindGroups);
        _comparison = new(Compare);
        _half = new(() => Variant(0.5));
        _double = new(() => Variant(2));
        _sharp = new(Sharpen);
        _cautions = new(() => StudyCautions.Of(this));
        _report = new(WriteReport);
    }

    /// <summary>Studies a column of values.</summary>
    /// <param name="values">The measurements; NaN is missing and handled as <see cref="StudyOptions.Missing"/> says.</param>
    /// <param name="options">What is asked; null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentException">Values, weights or options are unusable; the message names the first fault and its remedy.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    [OverloadResolutionPriority(1)]
    public static DensityStudy Of(ReadOnlySpan<double> values, StudyOptions? options = null)
    {
        options ??= new StudyOptions();
        return Of(Sample.Of(values, StudySteps.Columns(options)), options);
    }

    /// <summary>Studies a sample; its own weights, name and unit hold unless the options give others.</summary>
    /// <param name="sample">The checked values.</param>
    /// <param name="options">What is asked; null for the defaults.</param>
    /// <returns>The study.</returns>
    /// <exception cref="ArgumentException">The options are unusable, or no rule can choose a bandwidth because all values are equal.</exception>
    /// <exception cref="OperationCanceledException">The options' cancellation was asked for.</exception>
    public static DensityStudy Of(Sample sample, StudyOptions? options = null)
    {
        Guard.Given(sample);
        options ??= new StudyOptions();
        StudySteps.Check(options);
        return new DensityStudy(sample, options);
    }

    /// <summary>What was asked.</summary>
    public StudyOptions Options { get; }

    /// <summary>The values that were studied.</summary>
    public Sample Sample { get; }

    /// <summary>The values behind the curve: <see cref="Sample"/> without its atoms.</summary>
    public Sample CurveSample { get; }

    /// <summary>Name of the quantity, made safe to print; may be empty.</summary>
    public string Name { get; }

    /// <summary>Unit of the values, made safe to print; may be empty.</summary>
    public string Unit { get; }

    /// <summary>Values that hold a share of their own and were taken out of the curve; usually none.</summary>
    public IReadOnlyList<Atom> Atoms { get; }

    /// <summary>Share of the values that the curve describes: 1 less the shares of the atoms.</summary>
    public double CurveShare { get; }

    /// <summary>The bandwidth with the rule that chose it and its diagnostics.</summary>
    public BandwidthChoice Bandwidth { get; }

    /// <summary>The curve as a function: integral 1 over the values that are no atoms.</summary>
    public Density Density { get; }

    /// <summary>The stretch of the axis that the picture shows.</summary>
    public Interval Picture { get; }

    /// <summary>The curve at <see cref="StudyOptions.Points"/> places of the picture.</summary>
    public Curve Curve { get; }

    /// <summary>Bias statements, standard errors and intervals of the curve; null where fewer than three values, or values of one size only, carry it.</summary>
    public Uncertainty? Uncertainty { get; }

    /// <summary>The simultaneous band of the curve at the places of <see cref="Curve"/>; null where <see cref="Uncertainty"/> is.</summary>
    public Band? Band { get; }

    /// <summary>The peaks and valleys of the curve, left to right; null for a kernel with jumps, whose curve is a staircase.</summary>
    public PeakSummary? Peaks { get; }

    /// <summary>The share of values beyond each asked limit.</summary>
    public IReadOnlyList<LimitAnswer> Limits { get; }

    /// <summary>The asked quantiles.</summary>
    public IReadOnlyList<QuantileEstimate> Quantiles { get; }

    /// <summary>The warnings that apply, most important first; empty when none does.</summary>
    public IReadOnlyList<Caution> Cautions => _cautions.Value;

    /// <summary>One footnote from which the analysis can be repeated.</summary>
    public string MethodSentence => _report.Value.Method;

    /// <summary>The report as plain text, 80 columns at most.</summary>
    /// <returns>Lines ended by a line feed.</returns>
    public string ToText() => TextReport.Write(_report.Value);

    /// <summary>The report as Markdown.</summary>
    /// <returns>A document with one top heading.</returns>
    public string ToMarkdown() => MarkdownReport.Write(_report.Value);

    /// <summary>The report as one self-contained HTML page with an inline picture: no script, nothing fetched.</summary>
    /// <returns>A complete page.</returns>
    public string ToHtml() => HtmlReport.Write(_report.Value);

    /// <summary>The numbers of the report as JSON: schema in <c>docs/report-schema.md</c>, read back by <see cref="StudyDocument.FromJson"/>. NaN never appears.</summary>
    /// <returns>One indented document.</returns>
    public string ToJson() => ToDocument().ToJson();

    /// <summary>The numbers of the report as an object.</summary>
    /// <returns>What <see cref="ToJson"/> writes.</returns>
    public StudyDocument ToDocument() => StudyDocuments.Of(this);

    /// <summary>The picture alone, as an SVG element.</summary>
    /// <returns>One <c>svg</c> element with a text alternative.</returns>
    public string ToSvg() => SvgFigure.Draw(_report.Value.Figure!);

    /// <summary>The picture of the comparison with a reference alone: both curves, and where they differ beyond chance.</summary>
    /// <returns>One <c>svg</c> element with a text alternative; null where <see cref="Comparison"/> is.</returns>
    public string? ToComparisonSvg() => StudyFigure.Compared(this) is { } figure ? SvgFigure.Draw(figure) : null;

    private ReportModel WriteReport()
    {
        ReportModel report = StudyReport.Of(this);
        _progress.Report(StudyProgress.Part.Groups, 1);
        _progress.Report(StudyProgress.Part.Comparison, 1);
        return report;
    }

    private Curve Tabulate()
    {
        double[] x = Band is null ? StudySteps.Grid(Picture, Options.Points) : [.. Band.X];
        var y = new double[x.Length];
        Density.Values(x, y);
        return new Curve(x, y);
    }
}

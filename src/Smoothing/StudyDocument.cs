using System.Text.Json;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>The numbers of a study as a JSON document: what <see cref="DensityStudy.ToJson"/> writes and <see cref="FromJson"/> reads back.</summary>
/// <remarks>Numbers are finite; an infinite end of an interval is null. The schema stands in <c>docs/report-schema.md</c>; its version rises when a member changes its meaning.</remarks>
/// <param name="SchemaVersion">Version of the schema; this library writes and reads 1.</param>
/// <param name="Library">Version of the library that wrote the document.</param>
/// <param name="Name">Name of the quantity.</param>
/// <param name="Unit">Unit of the values.</param>
/// <param name="Level">Confidence level of all intervals.</param>
/// <param name="Data">The data.</param>
/// <param name="Atoms">Values with a share of their own.</param>
/// <param name="Smoothing">Kernel and bandwidth.</param>
/// <param name="Curve">The tabulated curve.</param>
/// <param name="Peaks">Peaks, left to right.</param>
/// <param name="Limits">Shares beyond limits.</param>
/// <param name="Quantiles">Quantiles.</param>
/// <param name="Cautions">Warnings that apply.</param>
/// <param name="Method">The method sentence.</param>
/// <param name="Groups">Evidence for groups; null where none could be sought.</param>
/// <param name="Comparison">Comparison with a reference; null without one.</param>
/// <param name="AtHalf">The curve at half the bandwidth; null for a kernel with jumps.</param>
/// <param name="AtDouble">The curve at double the bandwidth; null for a kernel with jumps.</param>
/// <param name="Plan">Values needed for twice the precision.</param>
public sealed record StudyDocument(
    int SchemaVersion,
    string Library,
    string Name,
    string Unit,
    double Level,
    DocumentData Data,
    IReadOnlyList<DocumentAtom> Atoms,
    DocumentSmoothing Smoothing,
    DocumentCurve Curve,
    IReadOnlyList<DocumentPeak> Peaks,
    IReadOnlyList<DocumentLimit> Limits,
    IReadOnlyList<DocumentQuantile> Quantiles,
    IReadOnlyList<DocumentCaution> Cautions,
    string Method,
    DocumentGroups? Groups = null,
    DocumentComparison? Comparison = null,
    DocumentVariant? AtHalf = null,
    DocumentVariant? AtDouble = null,
    DocumentPlan? Plan = null)
{
    /// <summary>The version of the schema that this library writes and reads.</summary>
    public const int CurrentSchema = 1;

    /// <summary>Reads a document back.</summary>
    /// <remarks>Safe on hostile input: depth at most 16, memory in proportion to the text, no code is run.</remarks>
    /// <param name="json">The text that <see cref="DensityStudy.ToJson"/> wrote.</param>
    /// <returns>The document.</returns>
    /// <exception cref="ArgumentException">The text is no JSON, not of schema 1, a member is missing, or lists that belong together differ in length.</exception>
    public static StudyDocument FromJson(string json)
    {
        Guard.Given(json);
        StudyDocument? document;
        try
        {
            document = JsonSerializer.Deserialize(json, StudyJsonContext.Default.StudyDocument);
        }
        catch (JsonException error)
        {
            throw new ArgumentException(Guard.Text($"json is no study document: {error.Message}"), nameof(json), error);
        }

        if (document is null || document.SchemaVersion != CurrentSchema)
        {
            throw new ArgumentException(Guard.Text($"json must have schemaVersion {CurrentSchema}, but has {document?.SchemaVersion.ToString(System.Globalization.CultureInfo.InvariantCulture) ?? "none"}: read it with the version that wrote it."), nameof(json));
        }

        string? missing = Missing(document);
        if (missing is not null)
        {
            throw new ArgumentException(Guard.Text($"json lacks {missing}: pass the whole text that ToJson wrote."), nameof(json));
        }

        if (document.Curve.X.Count != document.Curve.Density.Count)
        {
            throw new ArgumentException(Guard.Text($"curve.x has {document.Curve.X.Count} numbers but curve.density has {document.Curve.Density.Count}: they belong together."), nameof(json));
        }

        foreach ((string name, IReadOnlyList<double>? list) in new[] { ("lower", document.Curve.Lower), ("upper", document.Curve.Upper), ("bias", document.Curve.Bias) })
        {
            if (list is not null && list.Count != document.Curve.X.Count)
            {
                throw new ArgumentException(Guard.Text($"curve.x has {document.Curve.X.Count} numbers but curve.{name} has {list.Count}: they belong together."), nameof(json));
            }
        }

        foreach ((string name, IReadOnlyList<double>? list) in new[] { ("difference", document.Comparison?.Difference), ("lower", document.Comparison?.Lower), ("upper", document.Comparison?.Upper) })
        {
            if (list?.Count != document.Comparison?.X?.Count)
            {
                throw new ArgumentException(Guard.Text($"comparison.x has {document.Comparison?.X?.Count ?? 0} numbers but comparison.{name} has {list?.Count ?? 0}: they belong together."), nameof(json));
            }
        }

        return document;
    }

    /// <summary>The document as JSON, indented, numbers round-trip.</summary>
    /// <returns>The text.</returns>
    public string ToJson() => JsonSerializer.Serialize(this, StudyJsonContext.Default.StudyDocument);

    private static string? Missing(StudyDocument document) =>
        document.Library is null ? "library"
        : document.Name is null ? "name"
        : document.Unit is null ? "unit"
        : document.Data is null ? "data"
        : document.Smoothing is null ? "smoothing"
        : document.Curve?.X is null || document.Curve.Density is null ? "curve"
        : document.Atoms is null || document.Atoms.Any(a => a?.Interval is null) ? "atoms"
        : document.Peaks is null || document.Peaks.Any(p => p is null) ? "peaks"
        : document.Limits is null || document.Limits.Any(l => l?.Interval is null) ? "limits"
        : document.Quantiles is null || document.Quantiles.Any(q => q?.Interval is null) ? "quantiles"
        : document.Cautions is null || document.Cautions.Any(c => c is null) ? "cautions"
        : document.Method is null ? "method"
        : document.Groups is { } groups && (groups.Tests is null || groups.Tests.Any(t => t is null) || groups.Peaks is null || groups.Peaks.Any(p => p?.LocationInterval is null || p.HeightInterval is null) || groups.Verdict is null) ? "a part of groups"
        : document.Comparison is { } comparison && (comparison.Shifts is null || comparison.Shifts.Any(x => x?.Interval is null) || comparison.Limits is null || comparison.Limits.Any(l => l?.Interval is null) || comparison.Verdict is null) ? "a part of comparison"
        : null;
}

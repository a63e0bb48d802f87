namespace Smoothing;

/// <summary>Gives the labels of limits and point masses rows of their own above the curve, so that no label meets another one or a line.</summary>
/// <remarks>
/// Each line starts at its own label and runs down, so a label must keep clear of lines from rows above it, and a line of labels in rows below. Taken from the left and
/// from the right, the order that places more labels in fewer rows wins; a line that finds no row stays without a label, its share stands in the table.
/// </remarks>
internal static class SvgMarks
{
    /// <summary>Height of a row of labels.</summary>
    public const double Row = 18;

    private const int MostRows = 6;

    public static (IReadOnlyList<SvgMark> Marks, int Rows) Place(FigureModel figure, SvgLayout layout, double top)
    {
        (double X, string Label, bool IsAtom)[] all =
        [
            .. figure.Limits.Select(l => (l.X, l.Label, false)).Concat(figure.Atoms.Select(a => (a.X, a.Label, true)))
                .Where(m => m.X >= layout.From && m.X <= layout.To).OrderBy(m => m.X).Select(m => (layout.X(m.X), SvgText.Fit(m.Label, layout.Width - 40, !m.Item3), m.Item3)),
        ];
        List<Spot> forward = Try(all, layout.Width);
        List<Spot> backward = Try([.. all.Reverse()], layout.Width);
        (int, int) Score(List<Spot> spots) => (-spots.Count(s => s.Row < MostRows), Rows(spots));
        List<Spot> best = Score(forward).CompareTo(Score(backward)) <= 0 ? forward : backward;
        int rows = Rows(best);
        return ([.. best.OrderBy(s => s.X).Select(s => Mark(s, top, rows))], rows);
    }

    private static int Rows(List<Spot> spots) => spots.Where(s => s.Row < MostRows).Select(s => s.Row + 1).DefaultIfEmpty(0).Max();

    private static SvgMark Mark(Spot spot, double top, int rows) => spot.Row < MostRows
        ? new SvgMark(spot.X, top + 10 + (Row * spot.Row), spot.Label, spot.Right == spot.X ? spot.X - 6 : spot.Left + 6, spot.Right == spot.X ? "end" : "start", spot.IsAtom)
        : new SvgMark(spot.X, top + 10 + (Row * rows), "", spot.X, "start", spot.IsAtom);

    private static List<Spot> Try((double X, string Label, bool IsAtom)[] marks, double width)
    {
        var placed = new List<Spot>();
        foreach ((double x, string label, bool isAtom) in marks)
        {
            placed.Add(Candidates(x, label, isAtom, width).FirstOrDefault(c => placed.All(p => p.Row >= MostRows || IsClear(c, p)), new Spot(MostRows, x, x, x, label, isAtom)));
        }

        return placed;
    }

    // Row by row, to the right of the line where it fits, to its left, and shifted along the width where neither does.
    private static IEnumerable<Spot> Candidates(double x, string label, bool isAtom, double width)
    {
        double length = SvgText.Width(label, !isAtom) + 12;
        bool right = x + length <= width;
        bool left = x - length >= 0;
        for (int row = 0; row < MostRows; row++)
        {
            if (right)
            {
                yield return new Spot(row, x, x, x + length, label, isAtom);
            }

            if (left)
            {
                yield return new Spot(row, x, x - length, x, label, isAtom);
            }

            if (!right && !left)
            {
                double start = Math.Max(0, width - length);
                yield return new Spot(row, x, start, start + length, label, isAtom);
            }
        }
    }

    private static bool IsClear(Spot a, Spot b) =>
        a.Row == b.Row ? a.Right < b.Left || b.Right < a.Left
        : a.Row < b.Row ? !(a.X > b.Left && a.X < b.Right)
        : !(b.X > a.Left && b.X < a.Right);

    private sealed record Spot(int Row, double X, double Left, double Right, string Label, bool IsAtom);
}

namespace Smoothing.Charts.Drawing;

/// <summary>A rectangle in pixels, y downwards.</summary>
internal readonly record struct Box(float Left, float Top, float Right, float Bottom)
{
    public float Width => Right - Left;

    public float Height => Bottom - Top;

    public bool Contains(Box other) => other.Left >= Left && other.Right <= Right && other.Top >= Top && other.Bottom <= Bottom;

    public bool Meets(Box other) => Left < other.Right && other.Left < Right && Top < other.Bottom && other.Top < Bottom;

    /// <summary>Whether the stretch between two points enters the rectangle.</summary>
    public bool Meets(float x1, float y1, float x2, float y2)
    {
        // Liang and Barsky: the part of the stretch inside each pair of edges.
        float enter = 0;
        float leave = 1;
        return Cut(x1 - Left, x2 - x1, ref enter, ref leave) && Cut(Right - x1, x1 - x2, ref enter, ref leave)
            && Cut(y1 - Top, y2 - y1, ref enter, ref leave) && Cut(Bottom - y1, y1 - y2, ref enter, ref leave);
    }

    // Keeps the t with inside + t·step ≥ 0.
    private static bool Cut(float inside, float step, ref float enter, ref float leave)
    {
        if (step == 0)
        {
            return inside >= 0;
        }

        float t = -inside / step;
        if (step > 0)
        {
            enter = Math.Max(enter, t);
        }
        else
        {
            leave = Math.Min(leave, t);
        }

        return enter <= leave;
    }
}

namespace Smoothing.Samples;

/// <summary>Steps that measurements are often taken in before they are converted and printed to a decimal place.</summary>
internal static class TwiceRounded
{
    /// <summary>Parts of an hour, minute, day, week, year or inch: the step is 1 over the number.</summary>
    private static readonly double[] Parts = [3, 6, 7, 9, 12, 15, 16, 20, 24, 30, 32, 60, 64, 120, 128, 240, 256, 360, 720, 1440, 3600, 86400];

    /// <summary>Inch in millimetres, foot and mile in kilometres, pound in kilograms, ounce in grams: exact by definition (international yard and pound, 1959); with any power of ten.</summary>
    private static readonly double[] Conversions = [2.54, 3.048, 1.609344, 4.5359237, 2.8349523125];

    /// <summary>The units at least two printed places wide, so that a multiple can be told from its neighbours.</summary>
    public static IEnumerable<StepGrid> Units(StepGrid place)
    {
        double distance = place.Size / 2 * (1 + 1e-9);
        foreach (double part in Parts)
        {
            if (1 / part >= 2 * place.Size)
            {
                yield return new StepGrid(part, true, distance, place.Relative);
            }
        }

        // A degree Fahrenheit in degrees Celsius.
        if (5.0 / 9 >= 2 * place.Size)
        {
            yield return new StepGrid(5.0 / 9, false, distance, place.Relative);
        }

        int exponent = (int)Math.Ceiling(Math.Log10(2 * place.Size / 4.6));
        for (int more = 0; more < 5; more++)
        {
            foreach (double conversion in Conversions)
            {
                double unit = conversion * Math.Pow(10, exponent + more);
                if (unit >= 2 * place.Size)
                {
                    yield return new StepGrid(unit, false, distance, place.Relative);
                }
            }
        }
    }
}

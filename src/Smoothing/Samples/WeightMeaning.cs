namespace Smoothing.Samples;

/// <summary>What the weights of a sample mean.</summary>
public enum WeightMeaning
{
    /// <summary>Only ratios count: scaling all weights changes nothing. The effective count is (Σw)²/Σw².</summary>
    Relative,

    /// <summary>Whole numbers of repetitions: a weight of 3 is the same as the value given three times. The count is Σw.</summary>
    Counts,
}

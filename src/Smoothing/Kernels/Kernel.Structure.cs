namespace Smoothing.Kernels;

/// <content>What a kernel tells of its make-up, so that sums can be chosen that use it.</content>
public abstract partial class Kernel
{
    /// <summary>λ when K(u) = (λ/2)·exp(−λ|u|); 0 for every other kernel.</summary>
    internal virtual double ExponentialRate => 0;

    /// <summary>Half the width of the strip about the real axis in which K is analytic (π for the logistic); 0 when unknown or when K has a kink.</summary>
    internal virtual double AnalyticHalfWidth => 0;
}

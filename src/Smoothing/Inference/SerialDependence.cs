namespace Smoothing.Inference;

/// <summary>What is made of the order in which the values stand.</summary>
public enum SerialDependence
{
    /// <summary>The order says nothing: values are taken as independent.</summary>
    Ignore,

    /// <summary>The values stand in time order: a lag-1 autocorrelation beyond 2/√n is said, limits stay as for independent values.</summary>
    Check,

    /// <summary>The values stand in time order: limits use the smaller n that batch means find for dependent values, and say it.</summary>
    AllowFor,
}

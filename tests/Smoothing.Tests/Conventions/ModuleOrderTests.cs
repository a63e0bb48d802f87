namespace Smoothing.Tests.Conventions;

public class ModuleOrderTests
{
    private static readonly string[] s_order =
    [
        "Smoothing.Numerics", "Smoothing.Kernels", "Smoothing.Samples", "Smoothing.Theory", "Smoothing.Estimation",
        "Smoothing.Bandwidths", "Smoothing.Inference", "Smoothing",
    ];

    [Fact]
    public void CoreAssembly_EveryType_UsesOnlyModulesBeforeItsOwn()
    {
        var references = AssemblyReferences.Of(typeof(Smoothing.Kernels.Kernel).Assembly.Location).ToList();
        Assert.True(references.Count > 100, "the reader must see the assembly's references");

        var against = references
            .Where(r => Row(r.UsedNamespace) > Row(r.Namespace))
            .Select(r => $"{r.Namespace}.{r.Type} uses {r.UsedNamespace}.{r.UsedType}")
            .ToList();
        Assert.True(against.Count == 0, string.Join("\n", against));
    }

    [Fact]
    public void CoreAssembly_MethodBodies_AreRead()
    {
        // DensityTests' subject calls Guard from a method body only: seeing it proves that bodies are read, not signatures alone.
        Assert.Contains(AssemblyReferences.Of(typeof(Smoothing.Kernels.Kernel).Assembly.Location), r => r.Type == "Density" && r.UsedType == "Guard");
    }

    // Types without a namespace are the compiler's own; they belong to no module.
    private static int Row(string space)
    {
        if (space.Length == 0 || !space.StartsWith("Smoothing", StringComparison.Ordinal))
        {
            return -1;
        }

        int row = Array.IndexOf(s_order, space);
        Assert.True(row >= 0, $"namespace {space} is in no row of the module order");
        return row;
    }
}

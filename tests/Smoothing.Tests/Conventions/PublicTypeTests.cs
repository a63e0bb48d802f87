using System.Reflection;

namespace Smoothing.Tests.Conventions;

public class PublicTypeTests
{
    private static readonly Type[] s_public = typeof(Smoothing.Kernels.Kernel).Assembly.GetExportedTypes();

    [Fact]
    public void PublicClasses_AreSealedStaticOrClosed()
    {
        var open = s_public
            .Where(t => t is { IsClass: true, IsSealed: false })
            .Where(t => !t.IsAbstract || t.GetConstructors(BindingFlags.Instance | BindingFlags.Public | BindingFlags.NonPublic).Any(c => c.IsPublic || c.IsFamily || c.IsFamilyOrAssembly))
            .Where(t => !t.GetConstructors(BindingFlags.Instance | BindingFlags.NonPublic).Any(c => c.IsFamily && c.GetParameters().Length == 1 && c.GetParameters()[0].ParameterType == t && t.IsAbstract))
            .Select(t => t.FullName)
            .ToList();
        Assert.True(open.Count == 0, "neither sealed nor closed: " + string.Join(", ", open));
    }

    [Fact]
    public void PublicStructs_AreReadOnly()
    {
        var mutable = s_public
            .Where(t => t is { IsValueType: true, IsEnum: false })
            .Where(t => t.GetCustomAttribute<System.Runtime.CompilerServices.IsReadOnlyAttribute>() is null)
            .Select(t => t.FullName)
            .ToList();
        Assert.True(mutable.Count == 0, string.Join(", ", mutable));
    }

    [Fact]
    public void PublicProperties_HaveNoSettersButInit()
    {
        var settable = s_public
            .SelectMany(t => t.GetProperties(BindingFlags.Public | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly))
            .Where(p => p.SetMethod is { IsPublic: true } set && !set.ReturnParameter.GetRequiredCustomModifiers().Contains(typeof(System.Runtime.CompilerServices.IsExternalInit)))
            .Select(p => p.DeclaringType!.Name + "." + p.Name)
            .ToList();
        Assert.True(settable.Count == 0, string.Join(", ", settable));
    }

    [Fact]
    public void PublicFields_AreConstantsOrEnumMembers()
    {
        var fields = s_public
            .Where(t => !t.IsEnum)
            .SelectMany(t => t.GetFields(BindingFlags.Public | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly))
            .Where(f => !f.IsLiteral)
            .Select(f => f.DeclaringType!.Name + "." + f.Name)
            .ToList();
        Assert.True(fields.Count == 0, string.Join(", ", fields));
    }

    [Fact]
    public void StaticState_IsReadOnly()
    {
        var mutable = typeof(Smoothing.Kernels.Kernel).Assembly.GetTypes()
            .Where(t => t.Namespace is not null && t.Namespace.StartsWith("Smoothing", StringComparison.Ordinal) && !t.Name.Contains('<', StringComparison.Ordinal))
            .SelectMany(t => t.GetFields(BindingFlags.Public | BindingFlags.NonPublic | BindingFlags.Static | BindingFlags.DeclaredOnly))
            .Where(f => !f.IsLiteral && !f.IsInitOnly && f.GetCustomAttribute<ThreadStaticAttribute>() is null && !f.Name.Contains('<', StringComparison.Ordinal))
            .Select(f => f.DeclaringType!.FullName + "." + f.Name)
            .ToList();
        Assert.True(mutable.Count == 0, string.Join(", ", mutable));
    }
}

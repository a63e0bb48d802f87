using System.Globalization;
using System.Reflection;
using Microsoft.CodeAnalysis;
using Microsoft.CodeAnalysis.CSharp;

namespace Smoothing.Tests.Support;

/// <summary>Compiles a program shown in the docs and runs it; the tests of companion packages use it too.</summary>
internal static class PageProgram
{
    private const string ImplicitUsings = "global using System; global using System.Collections.Generic; global using System.IO; global using System.Linq; global using System.Threading; global using System.Threading.Tasks;";

    private static readonly MetadataReference[] s_references =
        [.. ((string)AppContext.GetData("TRUSTED_PLATFORM_ASSEMBLIES")!).Split(Path.PathSeparator).Select(path => MetadataReference.CreateFromFile(path))];

    /// <summary>What the program prints, in the invariant culture and with line feeds.</summary>
    public static string Run(string code)
    {
        var compilation = CSharpCompilation.Create(
            "Block" + Guid.NewGuid().ToString("N"),
            [CSharpSyntaxTree.ParseText(ImplicitUsings), CSharpSyntaxTree.ParseText(code)],
            s_references,
            new CSharpCompilationOptions(OutputKind.ConsoleApplication, nullableContextOptions: NullableContextOptions.Enable));
        using var stream = new MemoryStream();
        var result = compilation.Emit(stream);
        Assert.True(result.Success, string.Join("\n", result.Diagnostics.Where(d => d.Severity == DiagnosticSeverity.Error)));
        MethodInfo entry = Assembly.Load(stream.ToArray()).EntryPoint!;
        TextWriter before = Console.Out;
        CultureInfo culture = CultureInfo.CurrentCulture;
        CultureInfo.CurrentCulture = CultureInfo.InvariantCulture;
        using var writer = new StringWriter { NewLine = "\n" };
        Console.SetOut(writer);
        try
        {
            object? ended = entry.Invoke(null, entry.GetParameters().Length == 0 ? null : [Array.Empty<string>()]);
            (ended as Task)?.GetAwaiter().GetResult();
        }
        finally
        {
            Console.SetOut(before);
            CultureInfo.CurrentCulture = culture;
        }

        return writer.ToString();
    }
}

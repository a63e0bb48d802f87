using System.Globalization;
using System.Reflection;
using System.Text.RegularExpressions;
using Microsoft.CodeAnalysis;
using Microsoft.CodeAnalysis.CSharp;
using Smoothing.Charts.Tests.Support;

namespace Smoothing.Charts.Tests;

/// <summary>The programs of docs/charts.md are compiled and run; what they print is compared.</summary>
public partial class ChartsPageTests
{
    private const string ImplicitUsings = "global using System; global using System.Collections.Generic; global using System.IO; global using System.Linq;";

    [Fact]
    public void EveryBlock_RunsAndPrintsWhatIsShown()
    {
        string page = File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "charts.md"));
        MatchCollection blocks = Fence().Matches(page);
        Assert.NotEmpty(blocks);
        foreach (Match block in blocks)
        {
            if (Machine.HasFont)
            {
                Assert.Equal(block.Groups["output"].Value.TrimEnd(), Run(block.Groups["code"].Value).TrimEnd());
            }
            else
            {
                // As the page says of a machine without a font.
                var error = Assert.Throws<TargetInvocationException>(() => Run(block.Groups["code"].Value));
                Assert.Contains("No font", Assert.IsType<InvalidOperationException>(error.InnerException).Message, StringComparison.Ordinal);
            }
        }
    }

    private static string Run(string code)
    {
        MetadataReference[] references = [.. ((string)AppContext.GetData("TRUSTED_PLATFORM_ASSEMBLIES")!).Split(Path.PathSeparator).Select(path => MetadataReference.CreateFromFile(path))];
        var compilation = CSharpCompilation.Create("Page", [CSharpSyntaxTree.ParseText(ImplicitUsings), CSharpSyntaxTree.ParseText(code)], references, new CSharpCompilationOptions(OutputKind.ConsoleApplication, nullableContextOptions: NullableContextOptions.Enable));
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
            entry.Invoke(null, entry.GetParameters().Length == 0 ? null : [Array.Empty<string>()]);
        }
        finally
        {
            Console.SetOut(before);
            CultureInfo.CurrentCulture = culture;
        }

        return writer.ToString();
    }

    [GeneratedRegex("```csharp\\n(?<code>.*?)```(\\n\\n```text\\n(?<output>.*?)```)?", RegexOptions.Singleline)]
    private static partial Regex Fence();
}

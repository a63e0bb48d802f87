using System.Globalization;
using System.Reflection;
using System.Text.RegularExpressions;
using Microsoft.CodeAnalysis;
using Microsoft.CodeAnalysis.CSharp;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Conventions;

/// <summary>Every C# block of README and docs is a whole program: it is compiled and run, and the output shown after it is compared.</summary>
public partial class DocumentationTests
{
    private const string ImplicitUsings = "global using System; global using System.Collections.Generic; global using System.IO; global using System.Linq; global using System.Threading; global using System.Threading.Tasks;";

    private static readonly MetadataReference[] s_references =
        [.. ((string)AppContext.GetData("TRUSTED_PLATFORM_ASSEMBLIES")!).Split(Path.PathSeparator).Select(path => MetadataReference.CreateFromFile(path))];

    // The page on databases shows connections that exist nowhere; the tests of Smoothing.Sql compare its blocks with programs that run.
    public static IEnumerable<TheoryDataRow<string, int>> Blocks() =>
        Pages().SelectMany(page => Enumerable.Range(0, Fence().Count(File.ReadAllText(Path.Combine(Repository.Root, page)))).Select(i => new TheoryDataRow<string, int>(page, i)));

    [Theory]
    [MemberData(nameof(Blocks))]
    public void Block_OfAPage_RunsAndPrintsWhatIsShown(string page, int index)
    {
        Match block = Fence().Matches(Repository.Read(page))[index];
        string printed = Run(block.Groups["code"].Value);
        if (Environment.GetEnvironmentVariable("SMOOTHING_UPDATE_DOCS") == "1")
        {
            Show(page, block, printed);
            return;
        }

        if (block.Groups["output"].Success)
        {
            Assert.Equal(block.Groups["output"].Value.TrimEnd(), printed.TrimEnd());
        }
        else if (block.Groups["line"].Success)
        {
            Assert.Equal(block.Groups["line"].Value, printed.TrimEnd());
        }
        else
        {
            Assert.Fail($"{page}, block {index}: show what it prints, in a text block or as Prints `…`.");
        }
    }

    [Fact]
    public void Pages_Links_LeadToFiles()
    {
        foreach (string page in Directory.EnumerateFiles(Path.Combine(Repository.Root, "docs"), "*.md").Append(Path.Combine(Repository.Root, "README.md")))
        {
            foreach (Match link in Link().Matches(File.ReadAllText(page)))
            {
                string target = link.Groups["target"].Value.Split('#')[0];
                Assert.True(target.Length == 0 || File.Exists(Path.Combine(Path.GetDirectoryName(page)!, target)) || Directory.Exists(Path.Combine(Path.GetDirectoryName(page)!, target)), $"{Path.GetFileName(page)} links to {target}, which is not there");
            }
        }
    }

    // The switch: writes what a block prints after it, so that a changed program needs one command and a look at the difference.
    private static void Show(string page, Match block, string printed)
    {
        string path = Path.Combine(Repository.Root, page);
        string text = File.ReadAllText(path);
        string code = "```csharp\n" + block.Groups["code"].Value + "```";
        string shown = code + "\n\n```text\n" + printed.TrimEnd() + "\n```";
        File.WriteAllText(path, text.Replace(block.Value, shown, StringComparison.Ordinal));
    }

    private static IEnumerable<string> Pages() =>
        Directory.EnumerateFiles(Path.Combine(Repository.Root, "docs"), "*.md")
            .Select(path => Path.Combine("docs", Path.GetFileName(path)))
            .Where(path => !path.EndsWith("too-big.md", StringComparison.Ordinal) && !path.EndsWith("charts.md", StringComparison.Ordinal)) // pages of companion packages: their own tests run them
            .Prepend("README.md")
            .Order(StringComparer.Ordinal);

    private static string Run(string code)
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

    [GeneratedRegex("```csharp\\n(?<code>.*?)```(\\n\\n(Prints:?\\n\\n)?```text\\n(?<output>.*?)```|\\n\\nPrints `(?<line>[^`]*)`)?", RegexOptions.Singleline)]
    private static partial Regex Fence();

    [GeneratedRegex("\\]\\((?<target>(?!https?:)[^)\\s]+)\\)")]
    private static partial Regex Link();
}

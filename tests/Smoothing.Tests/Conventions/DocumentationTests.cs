using System.Text.RegularExpressions;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Conventions;

/// <summary>Every C# block of README and docs is a whole program: it is compiled and run, and the output shown after it is compared.</summary>
public partial class DocumentationTests
{
    // The page on databases shows connections that exist nowhere; the tests of Smoothing.Sql compare its blocks with programs that run.
    public static IEnumerable<TheoryDataRow<string, int>> Blocks() =>
        Pages().SelectMany(page => Enumerable.Range(0, Fence().Count(File.ReadAllText(Path.Combine(Repository.Root, page)))).Select(i => new TheoryDataRow<string, int>(page, i)));

    [Theory]
    [MemberData(nameof(Blocks))]
    public void Block_OfAPage_RunsAndPrintsWhatIsShown(string page, int index)
    {
        Match block = Fence().Matches(Repository.Read(page))[index];
        string printed = PageProgram.Run(block.Groups["code"].Value);
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

    [GeneratedRegex("```csharp\\n(?<code>.*?)```(\\n\\n(Prints:?\\n\\n)?```text\\n(?<output>.*?)```|\\n\\nPrints `(?<line>[^`]*)`)?", RegexOptions.Singleline)]
    private static partial Regex Fence();

    [GeneratedRegex("\\]\\((?<target>(?!https?:)[^)\\s]+)\\)")]
    private static partial Regex Link();
}

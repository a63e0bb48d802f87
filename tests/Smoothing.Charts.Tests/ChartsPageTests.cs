using System.Reflection;
using System.Text.RegularExpressions;
using Smoothing.Charts.Tests.Support;
using Smoothing.Tests.Support;

namespace Smoothing.Charts.Tests;

/// <summary>The programs of docs/charts.md are compiled and run; what they print is compared.</summary>
public partial class ChartsPageTests
{
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
                Assert.Equal(block.Groups["output"].Value.TrimEnd(), PageProgram.Run(block.Groups["code"].Value).TrimEnd());
            }
            else
            {
                // As the page says of a machine without a font.
                var error = Assert.Throws<TargetInvocationException>(() => PageProgram.Run(block.Groups["code"].Value));
                Assert.Contains("No font", Assert.IsType<InvalidOperationException>(error.InnerException).Message, StringComparison.Ordinal);
            }
        }
    }

    [GeneratedRegex("```csharp\\n(?<code>.*?)```(\\n\\n```text\\n(?<output>.*?)```)?", RegexOptions.Singleline)]
    private static partial Regex Fence();
}

#!/usr/bin/env dotnet
// Has the second quarter changed against the first? One report with both, on INVENTED data drawn below (seeds stated).
//   dotnet run docs/examples/two-periods.cs                                    prints the report
//   dotnet run docs/examples/two-periods.cs -- report.html                     and writes it as a page
#:project ../../src/Smoothing/Smoothing.csproj

using Smoothing;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

// The invented depot took on a second crew in April: fewer lorries wait for hands, handling itself takes as long as before.
double[] first = new NormalMixture([0.80, 0.20], [24, 50], [6, 6]).Draw(600, seed: 1);
double[] second = new NormalMixture([0.90, 0.10], [24, 50], [6, 6]).Draw(640, seed: 2);

DensityStudy study = DensityStudy.Of(second, new StudyOptions
{
    Name = "Second quarter (invented)",
    Unit = "min",
    Support = new Interval(0, double.PositiveInfinity),
    Limits = [45],
    ReferenceValues = first,
    ReferenceName = "First quarter (invented)",
    Seed = 7,
});
Console.Write(study.ToText());

// The same question by itself, for a program that acts on the answer: exit code 1 when the share beyond the limit has risen.
ShareEstimate before = Shares.Beyond(Sample.Of(first), 45);
ShareEstimate now = study.Limits[0].Beyond;
Console.WriteLine(FormattableString.Invariant($"\nBeyond 45 min: {100 * before.Estimate:F1} % before, {100 * now.Estimate:F1} % now."));
if (args.Length > 0)
{
    File.WriteAllText(args[0], study.ToHtml());
    Console.WriteLine($"Written: {Path.GetFileName(args[0])}");
}

return now.Interval.Lower > before.Interval.Upper ? 1 : 0;

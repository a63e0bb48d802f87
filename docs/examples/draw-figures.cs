#!/usr/bin/env dotnet
// Draws the pictures of docs/charts.md again, all from INVENTED data:
//   dotnet run docs/examples/draw-figures.cs -- docs/figures
#:project ../../src/Smoothing.Charts/Smoothing.Charts.csproj

using System.Globalization;
using Smoothing;
using Smoothing.Charts;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

string examples = AppContext.GetData("EntryPointFileDirectoryPath") as string ?? ".";
string folder = args.Length > 0 ? args[0] : Path.Combine(examples, "..", "figures");
Directory.CreateDirectory(folder);

double[] minutes =
[
    .. File.ReadLines(Path.Combine(examples, "turnaround.csv")).Where(line => line[0] != '#').Skip(1)
        .Select(line => line.Split(',')[2])
        .Select(field => field.Length == 0 ? double.NaN : double.Parse(field, CultureInfo.InvariantCulture)),
];
var options = new StudyOptions { Name = "Turnaround (invented)", Unit = "min", Support = new Interval(0, double.PositiveInfinity), Limits = [45], Missing = MissingValues.LeaveOut };
DensityStudy stays = DensityStudy.Of(minutes, options);

// Two quarters that differ, and a coating measured to the last digit: draws from known mixtures, seeds stated.
DensityStudy spring = DensityStudy.Of(new NormalMixture([0.84, 0.16], [24, 50], [6, 6]).Draw(700, 1), options with { Name = "Spring (invented)" });
DensityStudy autumn = DensityStudy.Of(new NormalMixture([0.68, 0.32], [23, 49], [6, 6]).Draw(650, 2), options with { Name = "Autumn (invented)" });
DensityStudy coating = DensityStudy.Of(new NormalMixture([0.7, 0.3], [80, 95], [5, 2.5]).Draw(300, 3), new StudyOptions { Name = "Coating (invented)", Unit = "µm", Limits = [75] });

var figures = new (string Name, Figure Figure)[]
{
    ("density", Figures.Density(stays)),
    ("density-dark", Figures.Density(stays, new FigureOptions { Theme = FigureTheme.Dark })),
    ("bias", Figures.Bias(coating)),
    ("error", Figures.Error(coating)),
    ("rules", Figures.Rules(coating, options: new FigureOptions { Height = 600 })),
    ("distribution", Figures.Distribution(stays)),
    ("difference", Figures.Difference(spring, autumn, options: new FigureOptions { Height = 600 })),
    ("peak-evidence", Figures.PeakEvidence(coating)),
    ("peak-evidence-print", Figures.PeakEvidence(coating, new FigureOptions { Theme = FigureTheme.Print })),
};
foreach ((string name, Figure figure) in figures)
{
    figure.Save(Path.Combine(folder, name + ".png"));
    Console.WriteLine($"{name}: {figure.Alternative}");
}

Figures.Density(stays).Save(Path.Combine(folder, "density.svg"));

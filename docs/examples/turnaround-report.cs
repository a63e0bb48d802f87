#!/usr/bin/env dotnet
// The first report: a column of a CSV file in, a finished answer out.
//   dotnet run docs/examples/turnaround-report.cs                        the invented demo data beside this file
//   dotnet run docs/examples/turnaround-report.cs -- data.csv column     your own: a file and the name of its column
#:project ../../src/Smoothing/Smoothing.csproj

using System.Globalization;
using Smoothing;
using Smoothing.Numerics;
using Smoothing.Samples;

bool demo = args.Length == 0;
string folder = AppContext.GetData("EntryPointFileDirectoryPath") as string ?? ".";
string path = demo ? Path.Combine(folder, "turnaround.csv") : args[0];
if (!File.Exists(path))
{
    Console.Error.WriteLine($"No file {path}: pass the path of a CSV file, then the name of a column.");
    return 2;
}

string[] lines = [.. File.ReadLines(path).Where(line => line.Length > 0 && line[0] != '#')];
string[] headings = lines.Length > 0 ? lines[0].Split(',') : [];
string wanted = demo ? "turnaround_minutes" : args.Length > 1 ? args[1] : headings.FirstOrDefault() ?? "";
int column = Array.FindIndex(headings, h => h.Trim().Trim('"').Equals(wanted, StringComparison.OrdinalIgnoreCase));
if (column < 0)
{
    Console.Error.WriteLine($"No column {wanted} in {path}: it has {string.Join(", ", headings)}.");
    return 2;
}

// An empty field is a missing value; anything else must be a number.
var values = new List<double>();
for (int row = 1; row < lines.Length; row++)
{
    string[] fields = lines[row].Split(',');
    string field = column < fields.Length ? fields[column].Trim().Trim('"') : "";
    if (field.Length == 0 || field is "NA" or "NaN" or "null")
    {
        values.Add(double.NaN);
    }
    else if (double.TryParse(field, NumberStyles.Float, CultureInfo.InvariantCulture, out double value))
    {
        values.Add(value);
    }
    else
    {
        Console.Error.WriteLine($"Line {row + 1} of {path}: '{field}' is not a number. Leave missing values empty.");
        return 2;
    }
}

var options = new StudyOptions
{
    Name = demo ? "Turnaround time at the loading bays (invented demo data)" : wanted,
    Unit = demo ? "min" : "",
    Support = demo ? new Interval(0, double.PositiveInfinity) : null,
    Limits = demo ? [45] : [],
    Missing = MissingValues.LeaveOut,
};

try
{
    Console.Write(DensityStudy.Of(values.ToArray(), options).ToText());
    return 0;
}
catch (ArgumentException error)
{
    Console.Error.WriteLine(error.Message);
    return 2;
}

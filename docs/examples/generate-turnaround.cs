#!/usr/bin/env dotnet
// Writes the INVENTED demo data docs/examples/turnaround.csv: no lorry, bay or depot behind it exists.
// Scenario: minutes between gate-in and gate-out of lorries at four loading bays over half a year. Most are handled in one
// go; about one in seven waits for a second crew. Times are noted to the minute, by some shifts to five minutes; a few are missing.
using System.Globalization;

const int Visits = 640;
ulong state = 20240607;                                   // the seed: the same file on every run
string folder = AppContext.GetData("EntryPointFileDirectoryPath") as string ?? ".";
using var file = new StreamWriter(Path.Combine(folder, args.Length > 0 ? args[0] : "turnaround.csv")) { NewLine = "\n" };
file.WriteLine("# INVENTED demo data, written by generate-turnaround.cs (seed 20240607)");
file.WriteLine("visit,bay,turnaround_minutes");
for (int visit = 1; visit <= Visits; visit++)
{
    int bay = 1 + (int)(Uniform() * 4);
    bool waits = Uniform() < 0.145;
    double minutes = waits ? 50 + (6.5 * Normal()) : 9 + (14 * Math.Exp(0.36 * Normal()));
    double step = Uniform() < 0.18 ? 5 : 1;
    minutes = Math.Max(1, step * Math.Round(minutes / step));
    bool missing = Uniform() < 0.02;
    file.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{visit},{bay},{(missing ? "" : minutes)}"));
}

double Uniform()
{
    // splitmix64, 53 bits
    ulong z = state += 0x9E3779B97F4A7C15UL;
    z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
    z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
    return (((z ^ (z >> 31)) >> 11) + 0.5) / (1UL << 53);
}

double Normal() => Math.Sqrt(-2 * Math.Log(Uniform())) * Math.Cos(2 * Math.PI * Uniform());

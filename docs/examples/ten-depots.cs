#!/usr/bin/env dotnet
// The nightly run: one study a depot, in parallel, one index page with small pictures, one report page each.
//   dotnet run docs/examples/ten-depots.cs -- out-folder
// Exit code: 0 all well, 1 a depot is over its target for certain, 2 a depot could not be studied.
#:project ../../src/Smoothing/Smoothing.csproj

using System.Net;
using System.Text;
using Smoothing;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

const double Limit = 45;      // minutes
const double Target = 0.15;   // largest share of stays beyond it that was agreed (invented)
string folder = args.Length > 0 ? args[0] : "depots";
Directory.CreateDirectory(folder);
using var stop = new CancellationTokenSource();
Console.CancelKeyPress += (_, press) =>
{
    press.Cancel = true;
    stop.Cancel();
};

// INVENTED depots; one delivers nothing tonight, as happens. A real run would read files or a table here.
var depots = Enumerable.Range(1, 10).Select(i => (
    Name: $"Depot {i:00}",
    Values: i == 7 ? [] : new NormalMixture([1 - (0.03 * i), 0.03 * i], [20 + (i % 4), 51], [5, 6]).Draw(200 + (70 * i), seed: (ulong)i))).ToArray();

var results = new (DensityStudy? Study, string Trouble)[depots.Length];
int done = 0;
object bar = new();
try
{
    Parallel.For(0, depots.Length, new ParallelOptions { MaxDegreeOfParallelism = Environment.ProcessorCount, CancellationToken = stop.Token }, i =>
    {
        try
        {
            results[i].Study = DensityStudy.Of(depots[i].Values, new StudyOptions
            {
                Name = depots[i].Name + " (invented)",
                Unit = "min",
                Support = new Interval(0, double.PositiveInfinity),
                Limits = [Limit],
                Missing = MissingValues.LeaveOut,
                Cancellation = stop.Token,
            });
            File.WriteAllText(Path.Combine(folder, Page(i)), results[i].Study!.ToHtml());
        }
        catch (ArgumentException error)
        {
            // One bad column must not cost the other nine their report.
            results[i].Trouble = error.Message;
        }

        lock (bar)
        {
            done++;
            Console.Error.Write($"\r[{new string('#', done * 30 / depots.Length),-30}] {done} of {depots.Length}");
        }
    });
}
catch (OperationCanceledException)
{
    Console.Error.WriteLine("\nStopped; the index was not written.");
    return 2;
}

Console.Error.WriteLine();
File.WriteAllText(Path.Combine(folder, "index.html"), Index());
int over = results.Count(r => r.Study is { } s && s.Limits[0].Beyond.Interval.Lower > Target);
int failed = results.Count(r => r.Study is null);
Console.WriteLine($"{depots.Length - failed} depots studied, {over} over the target for certain, {failed} without a report.");
foreach (int i in Enumerable.Range(0, depots.Length).Where(i => results[i].Study is null))
{
    Console.WriteLine($"{depots[i].Name}: {results[i].Trouble}");
}

return failed > 0 ? 2 : over > 0 ? 1 : 0;

string Page(int i) => $"depot-{i + 1:00}.html";

// Pictures stand in the page as data, so that it can be mailed as one file; each is a document of its own and follows a dark page.
string Index()
{
    var html = new StringBuilder("<!DOCTYPE html>\n<html lang=\"en\"><head><meta charset=\"utf-8\"><meta name=\"viewport\" content=\"width=device-width\"><title>Depots (invented)</title>\n");
    html.Append("<style>:root{color-scheme:light dark}body{font:16px system-ui,sans-serif;margin:1rem auto;max-width:75rem;padding:0 1rem}main{display:grid;grid-template-columns:repeat(auto-fill,minmax(20rem,1fr));gap:1rem}section{border:1px solid #8888;border-radius:.5rem;padding:.6rem}h2{font-size:1rem;margin:0}img{width:100%}.over{border-color:#c2571a;border-width:2px}</style></head><body>\n");
    html.Append(FormattableString.Invariant($"<h1>Stays at ten depots (invented data)</h1><p>Share of stays beyond {Limit} min; agreed are {100 * Target:F0} % at most. A frame marks a depot whose interval lies above that.</p><main>\n"));
    for (int i = 0; i < depots.Length; i++)
    {
        string name = WebUtility.HtmlEncode(depots[i].Name);
        if (results[i].Study is not { } study)
        {
            html.Append($"<section><h2>{name}</h2><p>No report: {WebUtility.HtmlEncode(results[i].Trouble)}</p></section>\n");
            continue;
        }

        var beyond = study.Limits[0].Beyond;
        string words = FormattableString.Invariant($"{100 * beyond.Estimate:F0} % beyond {Limit} min ({100 * beyond.Interval.Lower:F0} to {100 * beyond.Interval.Upper:F0} %), {study.Sample.Count} stays");
        string data = Convert.ToBase64String(Encoding.UTF8.GetBytes(study.ToSvg()));
        html.Append($"<section{(beyond.Interval.Lower > Target ? " class=\"over\"" : "")}><h2><a href=\"{Page(i)}\">{name}</a></h2><img alt=\"{name}: {words}\" src=\"data:image/svg+xml;base64,{data}\"><p>{words}</p></section>\n");
    }

    return html.Append("</main></body></html>\n").ToString();
}

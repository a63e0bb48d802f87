#!/usr/bin/env dotnet
// Starts the service beside this file, asks it as a client would, and checks the answers: good input, bad input, too much input, a client that leaves.
//   dotnet run docs/examples/call-the-service.cs
using System.Diagnostics;
using System.Net;
using System.Net.Sockets;
using System.Text;
using System.Text.Json;

string folder = Path.Combine(AppContext.GetData("EntryPointFileDirectoryPath") as string ?? ".", "service");
var probe = new TcpListener(IPAddress.Loopback, 0);
probe.Start();
string address = $"http://127.0.0.1:{((IPEndPoint)probe.LocalEndpoint).Port}";
probe.Stop();

// Built first, however long that takes; only the start is waited for by the clock.
using (Process build = Process.Start("dotnet", ["build", folder, "-c", "Release", "-v", "q", "-nologo"]))
{
    build.WaitForExit();
    if (build.ExitCode != 0)
    {
        return 1;
    }
}

using Process service = Process.Start(new ProcessStartInfo("dotnet", ["run", "--no-build", "-c", "Release", "--project", folder, "--urls", address]) { RedirectStandardOutput = true })!;
service.OutputDataReceived += (_, _) => { };
service.BeginOutputReadLine();
int failed = 0;
try
{
    using var client = new HttpClient { BaseAddress = new Uri(address), Timeout = TimeSpan.FromSeconds(60) };
    await Started(client, service);

    string values = string.Join(",", Enumerable.Range(0, 300).Select(i => 20 + (i * i % 37)));
    string good = $$"""{"values":[{{values}},null],"name":"Stay <b>","unit":"min","limits":[45]}""";
    using (HttpResponseMessage answer = await Post(client, good, "html"))
    {
        string page = await answer.Content.ReadAsStringAsync();
        Check("a report as a page", answer.StatusCode == HttpStatusCode.OK && page.StartsWith("<!DOCTYPE html>", StringComparison.OrdinalIgnoreCase) && !page.Contains("<b>"));
    }

    using (HttpResponseMessage answer = await Post(client, good, "json"))
    {
        using JsonDocument json = JsonDocument.Parse(await answer.Content.ReadAsStringAsync());
        Check("a report as JSON, the missing value counted", json.RootElement.GetProperty("data").GetProperty("leftOut").GetInt32() == 1);
    }

    await Refused("no values", """{"values":[]}""", 400, "values must hold");
    await Refused("values of one size", """{"values":[3,3,3]}""", 400, "");
    await Refused("a limit that is no number", """{"values":[1,2,3],"limits":["x"]}""", 400, null);
    await Refused("no JSON", "{", 400, null);
    await Refused("five megabytes", """{"values":[""" + string.Join(",", Enumerable.Repeat("1.25", 1_100_000)) + "]}", 413, null);

    // A client that leaves: its request ends, and the next one is served.
    using var leaving = new CancellationTokenSource(50);
    string large = $$"""{"values":[{{string.Join(",", Enumerable.Range(0, 150_000).Select(i => (i * 7919L % 100_003) / 10.0).Select(v => v.ToString(System.Globalization.CultureInfo.InvariantCulture)))}}]}""";
    bool left = false;
    try
    {
        using HttpResponseMessage unread = await Post(client, large, "text", leaving.Token);
    }
    catch (OperationCanceledException)
    {
        left = true;
    }

    using (HttpResponseMessage after = await Post(client, good, "text"))
    {
        Check("the next client after one that left", left && after.IsSuccessStatusCode);
    }

    async Task Refused(string what, string body, int status, string? detail)
    {
        using HttpResponseMessage answer = await Post(client, body, "text");
        string text = await answer.Content.ReadAsStringAsync();
        bool problem = answer.Content.Headers.ContentType?.MediaType == "application/problem+json";
        Check($"{what} is refused with {status}", (int)answer.StatusCode == status && problem && (detail is null || text.Contains(detail)));
    }
}
finally
{
    service.Kill(entireProcessTree: true);
}

return failed == 0 ? 0 : 1;

void Check(string what, bool holds)
{
    Console.WriteLine($"{(holds ? "holds" : "FAILS")}: {what}");
    failed += holds ? 0 : 1;
}

static async Task<HttpResponseMessage> Post(HttpClient client, string body, string form, CancellationToken cancellation = default)
{
    // Asks before it sends: a body that is too large is refused by its length, before it is on its way.
    using var request = new HttpRequestMessage(HttpMethod.Post, $"/reports?as={form}") { Content = new StringContent(body, Encoding.UTF8, "application/json") };
    request.Headers.ExpectContinue = true;
    return await client.SendAsync(request, cancellation);
}

static async Task Started(HttpClient client, Process service)
{
    for (var waited = Stopwatch.StartNew(); waited.Elapsed < TimeSpan.FromMinutes(3) && !service.HasExited; await Task.Delay(200))
    {
        try
        {
            await client.GetStringAsync("/");
            return;
        }
        catch (HttpRequestException)
        {
            // Not up yet.
        }
    }

    throw new InvalidOperationException("The service did not start.");
}

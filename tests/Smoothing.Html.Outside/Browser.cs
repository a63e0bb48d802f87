using System.Diagnostics;
using System.Net.WebSockets;
using System.Text;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace Smoothing.Html.Outside;

/// <summary>A headless Chromium of its own, driven over its debugging socket on loopback; ended by its id when the tests are done.</summary>
public sealed class Browser : IAsyncLifetime
{
    private readonly string _home = Path.Combine(Path.GetTempPath(), "smoothing-page-" + Guid.NewGuid().ToString("N"));
    private Process? _process;
    private ClientWebSocket? _socket;
    private int _id;

    /// <summary>Messages of the page and of the browser about it, and requests for anything but the page itself.</summary>
    public List<string> Complaints { get; } = [];

    public string Home => _home;

    public async ValueTask InitializeAsync()
    {
        Directory.CreateDirectory(_home);
        string program = Environment.GetEnvironmentVariable("SMOOTHING_CHROMIUM") ?? "chromium";
        var start = new ProcessStartInfo(program) { RedirectStandardError = true, RedirectStandardOutput = true };
        string[] arguments =
        [
            "--headless", "--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage", "--hide-scrollbars", "--force-color-profile=srgb", "--no-first-run",
            "--disable-extensions", "--disable-background-networking", "--disable-component-update", "--remote-debugging-port=0", "--user-data-dir=" + _home, "about:blank",
        ];
        foreach (string argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        _process = Process.Start(start) ?? throw new InvalidOperationException("Chromium did not start.");
        _process.OutputDataReceived += (_, _) => { };
        _process.ErrorDataReceived += (_, _) => { };
        _process.BeginOutputReadLine();
        _process.BeginErrorReadLine();
        string portFile = Path.Combine(_home, "DevToolsActivePort");
        for (int i = 0; i < 600 && !(File.Exists(portFile) && File.ReadAllLines(portFile).Length >= 1); i++)
        {
            await Task.Delay(100);
        }

        string port = File.ReadAllLines(portFile)[0];
        using var http = new HttpClient();
        HttpResponseMessage made = await http.PutAsync(new Uri($"http://127.0.0.1:{port}/json/new?about:blank"), null);
        JsonNode target = JsonNode.Parse(await made.Content.ReadAsStringAsync())!;
        _socket = new ClientWebSocket();
        await _socket.ConnectAsync(new Uri((string)target["webSocketDebuggerUrl"]!), CancellationToken.None);
        foreach (string domain in new[] { "Page", "Runtime", "Log", "Network" })
        {
            await Ask(domain + ".enable");
        }
    }

    public async ValueTask DisposeAsync()
    {
        _socket?.Dispose();
        if (_process is { HasExited: false })
        {
            _process.Kill(entireProcessTree: true);
            await _process.WaitForExitAsync();
        }

        _process?.Dispose();
        try
        {
            Directory.Delete(_home, recursive: true);
        }
        catch (IOException)
        {
            // A child that is just ending may still hold a file of the temporary folder.
        }
    }

    /// <summary>Shows a page in a window of the given size.</summary>
    /// <param name="html">The page.</param>
    /// <param name="width">Width in pixels.</param>
    /// <param name="height">Height in pixels.</param>
    /// <param name="scheme">light or dark.</param>
    /// <param name="media">screen or print.</param>
    /// <param name="mobile">Whether it is a phone.</param>
    public async Task Show(string html, int width, int height, string scheme = "light", string media = "screen", bool mobile = false)
    {
        string path = Path.Combine(_home, "page-" + Guid.NewGuid().ToString("N") + ".html");
        await File.WriteAllTextAsync(path, html);
        await Ask("Emulation.setDeviceMetricsOverride", new JsonObject { ["width"] = width, ["height"] = height, ["deviceScaleFactor"] = 1, ["mobile"] = mobile });
        await Ask("Emulation.setEmulatedMedia", new JsonObject
        {
            ["media"] = media,
            ["features"] = new JsonArray(new JsonObject { ["name"] = "prefers-color-scheme", ["value"] = scheme }),
        });
        Complaints.Clear();
        _page = new Uri(path).AbsoluteUri;
        await Ask("Page.navigate", new JsonObject { ["url"] = _page });
        while (!_loaded)
        {
            await Receive();
        }

        _loaded = false;
    }

    /// <summary>The value of an expression, which the page's own scripts know nothing of.</summary>
    /// <param name="expression">JavaScript; its value is returned as JSON.</param>
    /// <returns>The value.</returns>
    public async Task<JsonNode> Evaluate(string expression)
    {
        JsonNode answer = await Ask("Runtime.evaluate", new JsonObject { ["expression"] = "JSON.stringify(" + expression + ")", ["returnByValue"] = true });
        return JsonNode.Parse((string)answer["result"]!["value"]!)!;
    }

    /// <summary>What the window shows.</summary>
    /// <returns>A PNG.</returns>
    public async Task<byte[]> Screenshot() => Convert.FromBase64String((string)(await Ask("Page.captureScreenshot", new JsonObject { ["format"] = "png" }))["data"]!);

    private string _page = "";
    private bool _loaded;

    private async Task<JsonNode> Ask(string method, JsonObject? parameters = null)
    {
        int id = ++_id;
        string text = new JsonObject { ["id"] = id, ["method"] = method, ["params"] = parameters ?? [] }.ToJsonString();
        await _socket!.SendAsync(Encoding.UTF8.GetBytes(text), WebSocketMessageType.Text, endOfMessage: true, CancellationToken.None);
        while (true)
        {
            JsonNode message = await Receive();
            if ((int?)message["id"] == id)
            {
                return message["result"] ?? throw new InvalidOperationException($"{method}: {message["error"]}");
            }
        }
    }

    private async Task<JsonNode> Receive()
    {
        using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(120));
        using var whole = new MemoryStream();
        byte[] buffer = new byte[1 << 16];
        WebSocketReceiveResult part;
        do
        {
            part = await _socket!.ReceiveAsync(buffer, limit.Token);
            whole.Write(buffer, 0, part.Count);
        }
        while (!part.EndOfMessage);
        JsonNode message = JsonNode.Parse(whole.ToArray(), documentOptions: new JsonDocumentOptions { MaxDepth = 512 })!;
        Note(message);
        return message;
    }

    private void Note(JsonNode message)
    {
        JsonNode? given = message["params"];
        switch ((string?)message["method"])
        {
            case "Page.loadEventFired":
                _loaded = true;
                break;
            case "Runtime.consoleAPICalled":
            case "Runtime.exceptionThrown":
            case "Log.entryAdded":
                Complaints.Add(given!.ToJsonString());
                break;
            case "Network.requestWillBeSent":
                string url = (string)given!["request"]!["url"]!;
                if (url != _page && !url.StartsWith("data:", StringComparison.Ordinal))
                {
                    Complaints.Add("request: " + url);
                }

                break;
        }
    }
}

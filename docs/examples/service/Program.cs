// A report over HTTP: POST values, get the report back.
//   dotnet run --project docs/examples/service
//   curl -d '{"values":[21,25,19,48,23,28,52,22],"unit":"min","limits":[45]}' -H 'Content-Type: application/json' 'http://localhost:5000/reports?as=text'
// "as" is html (the default), text, markdown, json or svg. Bodies are held to 4 MB; what is wrong with an input comes back as problem+json; when the
// client leaves, the work for it stops. Nothing is stored. Put authentication and rate limits of your own in front of it.
using Microsoft.AspNetCore.Mvc;
using Smoothing;
using Smoothing.Samples;

const long LargestBody = 4 * 1024 * 1024;
const int MostValues = 200_000;

WebApplicationBuilder builder = WebApplication.CreateBuilder(args);
builder.WebHost.ConfigureKestrel(server => server.Limits.MaxRequestBodySize = LargestBody);
builder.Services.AddProblemDetails();

// As many studies at once as there are processors: more would only slow each other down.
builder.Services.AddSingleton(new SemaphoreSlim(Environment.ProcessorCount));
WebApplication app = builder.Build();
app.UseExceptionHandler();
app.UseStatusCodePages();

app.MapGet("/", () => "POST values to /reports?as=html|text|markdown|json|svg");
app.MapPost("/reports", async (ReportRequest request, SemaphoreSlim places, CancellationToken left, [FromQuery(Name = "as")] string form = "html") =>
{
    if (request.Values is not { Length: > 0 and <= MostValues } values)
    {
        return Results.Problem($"values must hold 1 to {MostValues} numbers, but holds {request.Values?.Length ?? 0}.", statusCode: 400, title: "Unusable input");
    }

    if (form is not ("html" or "text" or "markdown" or "json" or "svg"))
    {
        return Results.Problem("as must be html, text, markdown, json or svg.", statusCode: 400, title: "Unusable input");
    }

    await places.WaitAsync(left);
    try
    {
        // null among the values is a missing one. The work runs off the request's own thread and stops with it.
        var options = new StudyOptions { Name = request.Name ?? "", Unit = request.Unit ?? "", Limits = request.Limits ?? [], Missing = MissingValues.LeaveOut, Cancellation = left };
        DensityStudy study = await Task.Run(() => DensityStudy.Of([.. values.Select(v => v ?? double.NaN)], options), left);
        left.ThrowIfCancellationRequested();
        return form switch
        {
            "text" => Results.Text(study.ToText()),
            "markdown" => Results.Text(study.ToMarkdown(), "text/markdown"),
            "json" => Results.Text(study.ToJson(), "application/json"),
            "svg" => Results.Text(study.ToSvg(), "image/svg+xml"),
            _ => Results.Text(study.ToHtml(), "text/html"),
        };
    }
    catch (ArgumentException error)
    {
        // The library's messages name the value, its place and the remedy: they are meant for whoever sent them.
        return Results.Problem(error.Message, statusCode: 400, title: "Unusable input");
    }
    catch (OperationCanceledException)
    {
        return Results.StatusCode(StatusCodes.Status499ClientClosedRequest);
    }
    finally
    {
        places.Release();
    }
});

app.Run();

internal sealed record ReportRequest(double?[]? Values, string? Name = null, string? Unit = null, double[]? Limits = null);

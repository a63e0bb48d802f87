namespace Smoothing.Tests.Support;

/// <summary>Finds files of the repository from where the tests run.</summary>
internal static class Repository
{
    public static string Root { get; } = Find();

    public static string Read(params string[] path) => File.ReadAllText(Path.Combine([Root, .. path]));

    private static string Find()
    {
        DirectoryInfo? folder = new(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "Smoothing.sln")))
        {
            folder = folder.Parent;
        }

        return folder?.FullName ?? throw new InvalidOperationException("Smoothing.sln stands in no folder above the tests.");
    }
}

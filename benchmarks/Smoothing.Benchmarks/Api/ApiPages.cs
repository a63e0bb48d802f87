using System.Reflection;
using System.Text;
using System.Xml.Linq;

namespace Smoothing.Benchmarks.Api;

/// <summary>Writes docs/api: one page a namespace from the assemblies and their XML documentation, <c>-- api</c> from the top folder.</summary>
internal static class ApiPages
{
    public static int Run()
    {
        if (!Directory.Exists("docs"))
        {
            Console.Error.WriteLine("docs not found: run this from the top folder of the repository.");
            return 2;
        }

        Directory.CreateDirectory(Path.Combine("docs", "api"));
        foreach ((string name, string text) in Pages())
        {
            File.WriteAllText(Path.Combine("docs", "api", name), text);
        }

        Console.WriteLine("docs/api written.");
        return 0;
    }

    public static IEnumerable<(string Name, string Text)> Pages()
    {
        Assembly[] assemblies = [typeof(DensityStudy).Assembly, .. OtherAssemblies()];
        var spaces = new SortedDictionary<string, List<Type>>(StringComparer.Ordinal);
        var members = new Dictionary<string, XElement>();
        foreach (Assembly assembly in assemblies)
        {
            foreach (XElement member in XDocument.Load(Path.ChangeExtension(assembly.Location, ".xml")).Descendants("member"))
            {
                members[(string)member.Attribute("name")!] = member;
            }

            foreach (Type type in assembly.GetExportedTypes())
            {
                (spaces.TryGetValue(type.Namespace!, out List<Type>? list) ? list : spaces[type.Namespace!] = []).Add(type);
            }
        }

        var index = new StringBuilder("# API\n\nWritten by `dotnet run -c Release --project benchmarks/Smoothing.Benchmarks -- api` from the documentation in the source.\n\n| namespace | types |\n|---|---|\n");
        foreach ((string space, List<Type> types) in spaces)
        {
            types.Sort((a, b) => string.CompareOrdinal(ApiNames.Of(a), ApiNames.Of(b)));
            string file = space + ".md";
            index.Append("| [").Append(space).Append("](").Append(file).Append(") | ").AppendJoin(", ", types.Select(t => "`" + ApiNames.Of(t) + "`")).Append(" |\n");
            var page = new StringBuilder("# ").Append(space).Append('\n');
            foreach (Type type in types)
            {
                Write(page, type, members);
            }

            yield return (file, page.ToString());
        }

        yield return ("index.md", index.ToString());
    }

    private static IEnumerable<Assembly> OtherAssemblies() =>
        Directory.EnumerateFiles(AppContext.BaseDirectory, "Smoothing.*.dll").Where(file => Path.GetFileName(file) is "Smoothing.Sql.dll" or "Smoothing.Charts.dll").Order(StringComparer.Ordinal).Select(Assembly.LoadFrom);

    private static void Write(StringBuilder page, Type type, Dictionary<string, XElement> members)
    {
        page.Append("\n## ").Append(ApiNames.Of(type)).Append("\n\n`").Append(ApiNames.Declaration(type)).Append("`\n");
        Describe(page, members.GetValueOrDefault("T:" + type.FullName!.Replace('+', '.')));
        if (type.IsEnum)
        {
            page.Append("\n| name | meaning |\n|---|---|\n");
            foreach (FieldInfo field in type.GetFields(BindingFlags.Public | BindingFlags.Static))
            {
                page.Append("| `").Append(field.Name).Append("` | ").Append(ApiText.Of(members.GetValueOrDefault("F:" + type.FullName + "." + field.Name)?.Element("summary"))).Append(" |\n");
            }

            return;
        }

        const BindingFlags own = BindingFlags.Public | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly;
        foreach (MemberInfo member in type.GetMembers(own).OrderBy(ApiNames.Rank).ThenBy(m => m.MetadataToken))
        {
            // Without a text of its own a member was made by the compiler: the copy and equality methods of records.
            if (ApiNames.Id(member) is { } id && members.TryGetValue(id, out XElement? text))
            {
                page.Append("\n### ").Append(ApiNames.Signature(member)).Append('\n');
                Describe(page, text);
            }
        }
    }

    private static void Describe(StringBuilder page, XElement? text)
    {
        if (text is null)
        {
            return;
        }

        page.Append('\n').Append(ApiText.Of(text.Element("summary"))).Append('\n');
        string[] lines =
        [
            .. text.Elements("param").Select(p => $"- `{(string)p.Attribute("name")!}`: {ApiText.Of(p)}"),
            .. text.Elements("returns").Select(r => "- returns: " + ApiText.Of(r)),
            .. text.Elements("exception").Select(e => $"- throws `{((string)e.Attribute("cref")!).Split('.')[^1]}`: {ApiText.Of(e)}"),
        ];
        if (lines.Length > 0)
        {
            page.Append('\n').AppendJoin('\n', lines).Append('\n');
        }

        if (text.Element("remarks") is { } remarks)
        {
            page.Append('\n').Append(ApiText.Of(remarks)).Append('\n');
        }
    }
}

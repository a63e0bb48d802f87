using System.Text;
using System.Text.RegularExpressions;
using System.Xml.Linq;

namespace Smoothing.Benchmarks.Api;

/// <summary>Documentation elements as Markdown.</summary>
internal static partial class ApiText
{
    public static string Of(XElement? element)
    {
        if (element is null)
        {
            return "";
        }

        var text = new StringBuilder();
        Append(text, element);
        return Space().Replace(text.ToString(), " ").Replace(" \u2029 ", "\n\n", StringComparison.Ordinal).Replace("\u2029", "\n\n", StringComparison.Ordinal).Trim();
    }

    private static void Append(StringBuilder text, XElement element)
    {
        foreach (XNode node in element.Nodes())
        {
            switch (node)
            {
                case XText plain:
                    text.Append(plain.Value.Replace("|", "\\|", StringComparison.Ordinal).Replace("*", "\\*", StringComparison.Ordinal));
                    break;
                case XElement { Name.LocalName: "see" or "paramref" or "typeparamref" } link:
                    text.Append('`').Append(Name((string?)link.Attribute("cref") ?? (string?)link.Attribute("langword") ?? (string?)link.Attribute("name") ?? link.Value)).Append('`');
                    break;
                case XElement { Name.LocalName: "c" or "code" } code:
                    text.Append('`').Append(code.Value).Append('`');
                    break;
                case XElement { Name.LocalName: "para" } paragraph:
                    text.Append('\u2029');
                    Append(text, paragraph);
                    break;
                case XElement other:
                    Append(text, other);
                    break;
            }
        }
    }

    // "M:Smoothing.Kernels.Kernel.Value(System.Double)" reads as Kernel.Value; a type as its last part.
    private static string Name(string reference)
    {
        int colon = reference.IndexOf(':', StringComparison.Ordinal);
        if (colon < 0)
        {
            return reference;
        }

        string[] parts = reference[(colon + 1)..].Split('(')[0].Split('.');
        return reference[0] == 'T' || parts.Length < 2 ? parts[^1] : parts[^2] + "." + parts[^1];
    }

    [GeneratedRegex(@"[ \t\r\n]+")]
    private static partial Regex Space();
}

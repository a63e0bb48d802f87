using System.Text.Json.Serialization;

namespace Smoothing;

/// <summary>The generated reader and writer of study documents: no reflection at run time.</summary>
[JsonSourceGenerationOptions(WriteIndented = true, PropertyNamingPolicy = JsonKnownNamingPolicy.CamelCase, NewLine = "\n", MaxDepth = 16)]
[JsonSerializable(typeof(StudyDocument))]
internal sealed partial class StudyJsonContext : JsonSerializerContext
{
}

using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using CarryTest.Rules.Sections;

namespace CarryTest.Rules.Schema;

/// <summary>The JSON Schema of a rule book, for editors that check TOML as it is written. Keys of later versions are not in it.</summary>
internal static class RuleBookSchema
{
    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    public static string Text()
    {
        var schema = new JsonObject
        {
            ["$schema"] = "https://json-schema.org/draft/2020-12/schema",
            ["title"] = "CarryTest rule book",
        };
        foreach ((string name, JsonNode? value) in RuleBookKeys.Shape.Schema().ToArray())
        {
            schema[name] = value?.DeepClone();
        }

        return schema.ToJsonString(Layout) + "\n";
    }
}

using System.Text.Json.Nodes;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>A key that holds settings of the rule book by their dotted names: what a variant changes.</summary>
/// <param name="path">dotted</param>
/// <param name="settings">finds the settings that may be changed; asked when a value is checked</param>
/// <param name="sentence">plain English</param>
internal sealed class SettingsKey(string path, Func<Shape> settings, string sentence) : Key(path, sentence)
{
    public override string Expected => "a table of settings by their dotted names, as { \"execution.delay\" = 0 }";

    public override JsonObject Schema() => new() { ["type"] = "object", ["minProperties"] = 1 };

    public override string Text(Node node) => throw new InvalidOperationException($"{Path} is no single value");

    protected override void CheckValue(Node node, string shown, Problems problems)
    {
        if (node is not TableNode { Entries.Count: > 0 } table)
        {
            problems.Add(node.At, $"`{shown}` must be {Expected}; found {(node is TableNode ? "an empty one" : node.Shown)}");
            return;
        }

        settings().CheckChanges(table, "", problems);
    }
}

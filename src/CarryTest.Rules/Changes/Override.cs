using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Changes;

/// <summary>A change of one setting, `key=value`: it edits the document before that is checked, so that it meets the same checks and messages.</summary>
internal static class Override
{
    /// <summary>Edits a document.</summary>
    /// <param name="document">a rule book's</param>
    /// <param name="change">a dotted key, `=`, a TOML value; what is no TOML value is taken as text</param>
    /// <param name="known">the keys that exist</param>
    /// <param name="problems">takes what is wrong</param>
    public static void Apply(TableNode document, string change, Shape known, Problems problems)
    {
        var at = Place.Of($"--set {change}");
        int equals = change.IndexOf('=', StringComparison.Ordinal);
        if (equals < 0)
        {
            problems.Add(at, "write a setting and its value, as --set entry.per_share=0.05");
            return;
        }

        string path = change[..equals].Trim();
        if (!known.IsTable(path) && known.Find(path) is null)
        {
            problems.Add(at, known.Unknown(path));
            return;
        }

        if (Value(change[(equals + 1)..].Trim(), at, problems) is { } value)
        {
            Set(document, path.Split('.'), value, at);
        }
    }

    private static Node? Value(string text, Place at, Problems problems)
    {
        var broken = new Problems();
        TableNode read = TomlText.ReadAt($"value = {text}", at, broken);
        if (!broken.Any && read.Entries.Count == 1)
        {
            return read.Entries[0].Value;
        }

        // A word needs no quotes on a command line; a quote, bracket or brace that does not close is a slip, not a word.
        if (text.Length > 0 && text[0] is not ('"' or '\'' or '[' or '{'))
        {
            return new TextNode(at, text);
        }

        if (text.Length == 0)
        {
            problems.Add(at, "the value is missing");
        }

        problems.AddAll(broken);
        return null;
    }

    private static void Set(TableNode table, ReadOnlySpan<string> path, Node value, Place at)
    {
        foreach (string key in path[..^1])
        {
            switch (table.Find(key)?.Value)
            {
                case TableNode inner:
                    table = inner;
                    break;
                case null:
                    var made = new TableNode(at);
                    table.Set(new Entry(key, at, made));
                    table = made;
                    break;
                default:
                    // The document has a value where a table belongs: its own check says so.
                    return;
            }
        }

        table.Set(new Entry(path[^1], at, value));
    }
}

using System.Text.Json.Nodes;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>A check that takes more than one key.</summary>
internal delegate void Together(Values values, string prefix, Problems problems);

/// <summary>All keys that a table may have, below it too: what is known, and so what is unknown.</summary>
internal sealed class Shape
{
    private readonly Dictionary<string, Key> _keys;
    private readonly HashSet<string> _tables = [];
    private readonly Together[] _together;

    /// <param name="keys">in the order of documentation</param>
    /// <param name="tables">sentences of the tables that the keys are in</param>
    /// <param name="together">checks that take more than one key, made where no single key is wrong</param>
    public Shape(IReadOnlyList<Key> keys, IReadOnlyDictionary<string, string>? tables = null, params Together[] together)
    {
        Keys = keys;
        Tables = tables ?? new Dictionary<string, string>();
        _keys = keys.ToDictionary(k => k.Path, StringComparer.Ordinal);
        _together = together;
        foreach (Key key in keys)
        {
            for (int dot = key.Path.IndexOf('.', StringComparison.Ordinal); dot >= 0; dot = key.Path.IndexOf('.', dot + 1))
            {
                _tables.Add(key.Path[..dot]);
            }
        }
    }

    public IReadOnlyList<Key> Keys { get; }

    /// <summary>What each table is about.</summary>
    public IReadOnlyDictionary<string, string> Tables { get; }

    public bool IsTable(string path) => _tables.Contains(path);

    public Key? Find(string path) => _keys.GetValueOrDefault(path);

    /// <summary>Adds everything that is wrong with a table: unknown keys, missing keys, wrong values.</summary>
    /// <param name="table">a document or a row</param>
    /// <param name="prefix">what its keys are called in messages: empty, or `surprise.`</param>
    /// <param name="problems">takes what is wrong</param>
    public void Check(TableNode table, string prefix, Problems problems)
    {
        var own = new Problems();
        Walk(table, "", prefix, own, changes: false);
        foreach (Key key in Keys.Where(k => k.Required && !table.TryFind(k.Path, out _)))
        {
            own.Add(PlaceFor(table, key.Path), $"`{prefix}{key.Path}` is missing{(key.MissingHint.Length == 0 ? $"; it must be {key.Expected}" : $": {key.MissingHint}")}");
        }

        if (!own.Any)
        {
            var values = new Values(table);
            foreach (Together check in _together)
            {
                check(values, prefix, own);
            }
        }

        problems.AddAll(own);
    }

    /// <summary>Adds everything that is wrong with changes to a table of this shape: keys may be quoted dotted names, and none is missed.</summary>
    public void CheckChanges(TableNode changes, string prefix, Problems problems) => Walk(changes, "", prefix, problems, changes: true);

    /// <summary>The complaint about a key that nobody knows, with the nearest that is known.</summary>
    /// <param name="path">the unknown one</param>
    /// <param name="prefix">what goes before it in messages</param>
    /// <param name="settingsOnly">whether lists of tables are none of the known ones</param>
    public string Unknown(string path, string prefix = "", bool settingsOnly = false)
    {
        string[] known = [.. Keys.Where(k => !settingsOnly || k is not RowsKey).Select(k => k.Path)];
        string[] tables = [.. _tables.Where(t => Array.Exists(known, k => k.StartsWith(t + ".", StringComparison.Ordinal)))];
        return $"unknown key `{prefix}{path}`; the nearest known one is `{prefix}{NearestKey.Of(path, [.. known, .. tables])}`";
    }

    public JsonObject Schema() => SchemaOf("");

    private void Walk(TableNode table, string below, string prefix, Problems problems, bool changes)
    {
        foreach (Entry entry in table.Entries)
        {
            string path = below + entry.Key;
            if (Find(path) is { } key && !(changes && key is RowsKey))
            {
                key.Check(entry.Value, prefix + path, entry.At, problems);
            }
            else if (!_tables.Contains(path) || (changes && HoldsRowsOnly(path)))
            {
                problems.Add(entry.At, Unknown(path, prefix, changes));
            }
            else if (entry.Value is TableNode inner)
            {
                Walk(inner, path + ".", prefix, problems, changes);
            }
            else
            {
                problems.Add(entry.Value.At, $"`{prefix}{path}` is a table of keys ({string.Join(", ", Keys.Where(k => k.Path.StartsWith(path + ".", StringComparison.Ordinal)).Select(k => k.Path[(path.Length + 1)..]))}); found {entry.Value.Shown}");
            }
        }
    }

    private bool HoldsRowsOnly(string table) => Keys.Where(k => k.Path.StartsWith(table + ".", StringComparison.Ordinal)).All(k => k is RowsKey);

    /// <summary>Where a missing key belongs: its table if that is there, else the table above.</summary>
    private static Place PlaceFor(TableNode table, string path)
    {
        int dot = path.LastIndexOf('.');
        return dot >= 0 && table.TryFind(path[..dot], out Node? home) && home is TableNode ? home.At : table.At;
    }

    private JsonObject SchemaOf(string below)
    {
        var properties = new JsonObject();
        var required = new JsonArray();
        foreach (Key key in Keys.Where(k => k.Path.StartsWith(below, StringComparison.Ordinal) && k.Later is null))
        {
            string name = key.Path[below.Length..].Split('.')[0];
            string path = below + name;
            if (key.Required && !required.Any(r => (string?)r == name))
            {
                required.Add(name);
            }

            if (properties.ContainsKey(name))
            {
                continue;
            }

            JsonObject schema = _tables.Contains(path) ? SchemaOf(path + ".") : key.Schema();
            string? sentence = _tables.Contains(path) ? Tables.GetValueOrDefault(path) : key.Sentence;
            if (sentence is not null)
            {
                schema["description"] = sentence;
            }

            if (path == key.Path && key.DefaultText is { } text && !key.Required)
            {
                schema["default"] = JsonNode.Parse(text);
            }

            properties[name] = schema;
        }

        var table = new JsonObject { ["type"] = "object", ["additionalProperties"] = false, ["properties"] = properties };
        if (required.Count > 0)
        {
            table["required"] = required;
        }

        return table;
    }
}

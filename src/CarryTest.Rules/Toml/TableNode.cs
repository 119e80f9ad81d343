using System.Diagnostics.CodeAnalysis;

namespace CarryTest.Rules.Toml;

/// <summary>An entry of a table: where its key stands and what it holds.</summary>
internal readonly record struct Entry(string Key, Place At, Node Value);

/// <summary>A table, in the order of the text. However it is written (header, dotted keys or inline), it looks the same here.</summary>
internal sealed record TableNode(Place At) : Node(At)
{
    private readonly List<Entry> _entries = [];

    public override string Shown => "a table";

    public IReadOnlyList<Entry> Entries => _entries;

    public Entry? Find(string key)
    {
        foreach (Entry entry in _entries)
        {
            if (entry.Key == key)
            {
                return entry;
            }
        }

        return null;
    }

    /// <summary>The value of a dotted key below this table.</summary>
    public bool TryFind(string dottedKey, [NotNullWhen(true)] out Node? value)
    {
        Node? here = this;
        foreach (string key in dottedKey.Split('.'))
        {
            here = (here as TableNode)?.Find(key)?.Value;
        }

        value = here;
        return value is not null;
    }

    /// <summary>Sets a key, in its old position if it has one.</summary>
    public void Set(Entry entry)
    {
        int old = _entries.FindIndex(e => e.Key == entry.Key);
        if (old >= 0)
        {
            _entries[old] = entry;
            return;
        }

        _entries.Add(entry);
    }
}

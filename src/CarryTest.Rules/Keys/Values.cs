using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>The values of a table that was checked.</summary>
internal sealed class Values(TableNode table)
{
    /// <summary>Whether the key is written.</summary>
    public bool Has(Key key) => table.TryFind(key.Path, out _);

    /// <summary>What is written under the key; null: nothing.</summary>
    public Node? NodeOf(Key key) => table.TryFind(key.Path, out Node? node) ? node : null;

    /// <summary>The place of the value; of the table where the key is not written.</summary>
    public Place PlaceOf(Key key) => NodeOf(key)?.At ?? table.At;

    /// <summary>The value: as written, else the default.</summary>
    public T Of<T>(Key<T> key) => NodeOf(key) is { } node ? key.Form.Read(node).Value : key.Default;

    /// <summary>The value as written; null: not written, whatever the default.</summary>
    public T? Written<T>(Key<T> key)
        where T : struct => NodeOf(key) is { } node ? key.Form.Read(node).Value : null;

    /// <summary>The text as written; null: not written, whatever the default.</summary>
    public string? WrittenText(Key<string> key) => NodeOf(key) is { } node ? key.Form.Read(node).Value : null;
}

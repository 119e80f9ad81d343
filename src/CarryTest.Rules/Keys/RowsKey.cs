using System.Text.Json.Nodes;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>A key that holds a list of tables, `[[key]]`, each with keys of its own.</summary>
internal sealed class RowsKey(string path, Shape row, string sentence) : Key(path, sentence)
{
    public Shape Row => row;

    /// <summary>At most so many.</summary>
    public int MostRows { get; init; } = int.MaxValue;

    public override string Expected => MostRows == int.MaxValue ? $"a list of tables, each under [[{Path}]]" : $"a list of at most {MostRows} tables";

    public override JsonObject Schema()
    {
        var schema = new JsonObject { ["type"] = "array", ["items"] = row.Schema() };
        if (MostRows != int.MaxValue)
        {
            schema["maxItems"] = MostRows;
        }

        return schema;
    }

    public override string Text(Node node) => throw new InvalidOperationException($"{Path} is no single value");

    /// <summary>The tables of a value that was checked.</summary>
    public static IEnumerable<TableNode> Of(Node node) => ((ListNode)node).Items.Cast<TableNode>();

    protected override void CheckValue(Node node, string shown, Problems problems)
    {
        if (node is not ListNode list)
        {
            problems.Add(node.At, $"`{shown}` must be {Expected}; found {node.Shown}");
            return;
        }

        if (list.Items.FirstOrDefault(i => i is not TableNode) is { } other)
        {
            problems.Add(other.At, $"`{shown}` must be {Expected}; found {other.Shown} in it");
            return;
        }

        if (list.Items.Length > MostRows)
        {
            problems.Add(list.Items[MostRows].At, $"`{shown}` must be {Expected}; found {list.Items.Length}");
            return;
        }

        foreach (TableNode each in list.Items.Cast<TableNode>())
        {
            row.Check(each, shown + ".", problems);
        }
    }
}

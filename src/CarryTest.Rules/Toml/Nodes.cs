using System.Collections.Immutable;
using System.Globalization;

namespace CarryTest.Rules.Toml;

/// <summary>A value of a TOML document with its place.</summary>
internal abstract record Node(Place At)
{
    /// <summary>How a message shows what was found.</summary>
    public abstract string Shown { get; }
}

internal sealed record TextNode(Place At, string Value) : Node(At)
{
    public override string Shown => Quoted.Of(Value);
}

internal sealed record WholeNode(Place At, long Value) : Node(At)
{
    public override string Shown => Value.ToString(CultureInfo.InvariantCulture);
}

internal sealed record NumberNode(Place At, double Value) : Node(At)
{
    public override string Shown => Value switch
    {
        double.NaN => "nan",
        double.PositiveInfinity => "inf",
        double.NegativeInfinity => "-inf",
        _ when double.IsInteger(Value) && Math.Abs(Value) < 1e15 => Value.ToString("F1", CultureInfo.InvariantCulture),
        _ => Value.ToString("R", CultureInfo.InvariantCulture),
    };
}

internal sealed record FlagNode(Place At, bool Value) : Node(At)
{
    public override string Shown => Value ? "true" : "false";
}

internal sealed record DateNode(Place At, DateOnly Value) : Node(At)
{
    public override string Shown => Value.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}

/// <summary>A time, or a date with a time: no setting takes one, messages show it.</summary>
internal sealed record TimeNode(Place At, string Text) : Node(At)
{
    public override string Shown => Text;
}

internal sealed record ListNode(Place At, ImmutableArray<Node> Items) : Node(At)
{
    public override string Shown => "a list";

    /// <summary>Whether all items are tables: `[[header]]` or inline tables in brackets.</summary>
    public bool OfTables => Items.All(i => i is TableNode);
}

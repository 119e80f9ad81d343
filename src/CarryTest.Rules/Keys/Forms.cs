using System.Collections.Immutable;
using System.Globalization;
using System.Text.Json.Nodes;
using CarryTest.Market.Words;
using CarryTest.Parity.Packages;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>The forms of single values and lists.</summary>
internal static class Forms
{
    /// <summary>A whole number in a range.</summary>
    public static Form<long> Long(long least, long most)
    {
        Form<long> form = null!;
        form = new Form<long>(
            Range("a whole number", least, most, least == long.MinValue, most == long.MaxValue),
            node => node is WholeNode whole && whole.Value >= least && whole.Value <= most ? Taken.Of(whole.Value, node) : form.Refuse(node),
            Invariant,
            () => Bounds("integer", least, most == long.MaxValue ? null : most));
        return form;
    }

    /// <summary>A whole number in a range.</summary>
    public static Form<int> Whole(int least, int most = int.MaxValue)
    {
        Form<int> form = null!;
        form = new Form<int>(
            Range("a whole number", least, most, false, most == int.MaxValue),
            node => node is WholeNode whole && whole.Value >= least && whole.Value <= most ? Taken.Of((int)whole.Value, node) : form.Refuse(node),
            v => Invariant(v),
            () => Bounds("integer", least, most == int.MaxValue ? null : most));
        return form;
    }

    /// <summary>A number in a range; whole numbers are numbers.</summary>
    /// <param name="least">allowed, unless <paramref name="above"/></param>
    /// <param name="most">allowed</param>
    /// <param name="above">whether <paramref name="least"/> itself is too small</param>
    /// <param name="hint">what a reader should know about the unit, for messages</param>
    public static Form<double> Number(double least, double most, bool above = false, string hint = "")
    {
        string range = above
            ? string.Create(CultureInfo.InvariantCulture, $"a number above {least}{(double.IsInfinity(most) ? "" : $", at most {Invariant(most)}")}")
            : Range("a number", least, most, double.IsInfinity(least), double.IsInfinity(most));
        Form<double> form = null!;
        form = new Form<double>(
            hint.Length == 0 ? range : $"{range} ({hint})",
            node => NumberOf(node) is { } value && value <= most && (above ? value > least : value >= least) && double.IsFinite(value)
                ? Taken.Of(value, node)
                : form.Refuse(node),
            Invariant,
            () => Bounds("number", least, double.IsInfinity(most) ? null : most, above));
        return form;
    }

    /// <summary>A number in a range, or the word `none`: not asked.</summary>
    public static Form<double?> NumberOrNone(double least, double most)
    {
        Form<double> number = Number(least, most);
        Form<double?> form = null!;
        form = new Form<double?>(
            $"{number.Expected}, or \"none\"",
            node => node is TextNode { Value: "none" } ? Taken.Of<double?>(null, node)
                : number.Read(node) is { Fault: null } taken ? Taken.Of<double?>(taken.Value, node)
                : form.Refuse(node),
            v => v is { } value ? Invariant(value) : "\"none\"",
            () => new JsonObject { ["anyOf"] = new JsonArray(number.Schema(), new JsonObject { ["const"] = "none" }) });
        return form;
    }

    /// <summary>true or false.</summary>
    public static Form<bool> Flag()
    {
        Form<bool> form = null!;
        form = new Form<bool>(
            "true or false",
            node => node is FlagNode flag ? Taken.Of(flag.Value, node) : form.Refuse(node),
            v => v ? "true" : "false",
            () => new JsonObject { ["type"] = "boolean" });
        return form;
    }

    /// <summary>false; true is refused, it comes with a later version.</summary>
    public static Form<bool> FalseForNow()
    {
        Form<bool> flag = Flag();
        return flag with
        {
            Expected = "false",
            Read = node => node is FlagNode { Value: true }
                ? Form<bool>.Refuse(node, key => $"`{key} = true` comes with a later version; this one knows false")
                : flag.Read(node),
            Schema = () => new JsonObject { ["const"] = false },
        };
    }

    /// <summary>A date.</summary>
    public static Form<DateOnly> Date()
    {
        Form<DateOnly> form = null!;
        form = new Form<DateOnly>(
            "a date without quotes, as 2025-01-02",
            node => node is DateNode date ? Taken.Of(date.Value, node) : form.Refuse(node),
            v => v.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture),
            () => new JsonObject { ["type"] = "string", ["format"] = "date" });
        return form;
    }

    /// <summary>Text that is not empty.</summary>
    /// <param name="expected">what it is, for messages</param>
    /// <param name="suits">what else it must satisfy</param>
    public static Form<string> Text(string expected, Func<string, bool>? suits = null)
    {
        Form<string> form = null!;
        form = new Form<string>(
            expected,
            node => node is TextNode text && text.Value.Trim().Length > 0 && (suits is null || suits(text.Value)) ? Taken.Of(text.Value, node) : form.Refuse(node),
            Quoted.Of,
            () => new JsonObject { ["type"] = "string", ["minLength"] = 1 });
        return form;
    }

    /// <summary>A path of a file or folder, relative to the rule book.</summary>
    public static Form<string> Path(string what) => Text($"the path of {what} in quotes, relative to the rule book", path => !path.Contains('\0'));

    /// <summary>One of the words of an enum.</summary>
    /// <param name="later">values that a later version brings: known, and refused</param>
    public static Form<T> Word<T>(params T[] later)
        where T : struct, Enum
    {
        (T Value, string Word, string Sentence)[] known = [.. Vocabulary<T>.All.Where(w => !later.Contains(w.Value))];
        string words = string.Join(" | ", known.Select(w => w.Word));
        Form<T> form = null!;
        form = new Form<T>(
            known.Length == 1 ? $"\"{words}\"" : $"one of {words}",
            node =>
            {
                if (node is not TextNode text || !Vocabulary<T>.TryRead(text.Value, out T value))
                {
                    return form.Refuse(node);
                }

                return later.Contains(value)
                    ? Form<T>.Refuse(node, key => $"`{key} = {node.Shown}` comes with a later version; this one knows {words}")
                    : Taken.Of(value, node);
            },
            v => Quoted.Of(v.Word()),
            () => new JsonObject { ["enum"] = new JsonArray([.. known.Select(w => (JsonNode)w.Word)]) })
        {
            Words = [.. known.Select(w => (w.Word, w.Sentence))],
            LaterWords = [.. later.Select(v => v.Word())],
        };
        return form;
    }

    /// <summary>A list in brackets, every item of one form.</summary>
    /// <param name="item">the form of an item</param>
    /// <param name="plural">what the items are, for messages: `kinds`</param>
    /// <param name="mayBeEmpty">whether a list without items says something</param>
    public static Form<ImmutableArray<T>> List<T>(Form<T> item, string plural, bool mayBeEmpty)
    {
        Form<ImmutableArray<T>> form = null!;
        form = new Form<ImmutableArray<T>>(
            $"a list of {plural} in brackets{(mayBeEmpty ? "" : ", not empty")}, each {item.Expected}",
            node =>
            {
                if (node is not ListNode list || (list.Items.IsEmpty && !mayBeEmpty))
                {
                    return form.Refuse(node);
                }

                var items = ImmutableArray.CreateBuilder<T>(list.Items.Length);
                foreach (Node each in list.Items)
                {
                    Taken<T> taken = item.Read(each);
                    if (taken.Fault is { } fault)
                    {
                        return new Taken<ImmutableArray<T>>([], taken.At, fault);
                    }

                    if (items.Contains(taken.Value))
                    {
                        return Form<ImmutableArray<T>>.Refuse(each, key => $"`{key}` has {each.Shown} twice");
                    }

                    items.Add(taken.Value);
                }

                return Taken.Of(items.ToImmutable(), node);
            },
            v => $"[{string.Join(", ", v.Select(item.Write))}]",
            () =>
            {
                var schema = new JsonObject { ["type"] = "array", ["items"] = item.Schema(), ["uniqueItems"] = true };
                if (!mayBeEmpty)
                {
                    schema["minItems"] = 1;
                }

                return schema;
            })
        {
            Words = item.Words,
        };
        return form;
    }

    /// <summary>Two values in brackets, the least and the most.</summary>
    public static Form<Between<T>> Between<T>(Form<T> end)
        where T : IComparable<T>
    {
        Form<Between<T>> form = null!;
        form = new Form<Between<T>>(
            $"[least, most], least not above most, each {end.Expected}",
            node => node is ListNode { Items.Length: 2 } list
                && end.Read(list.Items[0]) is { Fault: null } least
                && end.Read(list.Items[1]) is { Fault: null } most
                && least.Value.CompareTo(most.Value) <= 0
                    ? Taken.Of(new Between<T>(least.Value, most.Value), node)
                    : Form<Between<T>>.Refuse(node, key => $"`{key}` must be {form.Expected}; found {ShownPair(node)}"),
            v => $"[{end.Write(v.Least)}, {end.Write(v.Most)}]",
            () => new JsonObject { ["type"] = "array", ["items"] = end.Schema(), ["minItems"] = 2, ["maxItems"] = 2 });
        return form;
    }

    /// <summary>A number, whole or not; null: something else.</summary>
    private static double? NumberOf(Node node) => node switch
    {
        WholeNode whole => whole.Value,
        NumberNode number => number.Value,
        _ => null,
    };

    private static string ShownPair(Node node) => node is ListNode list ? $"[{string.Join(", ", list.Items.Select(i => i.Shown))}]" : node.Shown;

    private static string Range<T>(string what, T least, T most, bool openBelow, bool openAbove)
        where T : IFormattable =>
        (openBelow, openAbove) switch
        {
            (true, true) => what,
            (false, true) => $"{what}, at least {Invariant(least)}",
            (true, false) => $"{what}, at most {Invariant(most)}",
            _ => $"{what} from {Invariant(least)} to {Invariant(most)}",
        };

    private static JsonObject Bounds<T>(string type, T least, T? most, bool above = false)
        where T : struct
    {
        var schema = new JsonObject { ["type"] = type };
        if (least is not double.NegativeInfinity)
        {
            schema[above ? "exclusiveMinimum" : "minimum"] = JsonValue.Create(least);
        }

        if (most is { } limit)
        {
            schema["maximum"] = JsonValue.Create(limit);
        }

        return schema;
    }

    private static string Invariant<T>(T value)
        where T : IFormattable => value.ToString(null, CultureInfo.InvariantCulture);
}

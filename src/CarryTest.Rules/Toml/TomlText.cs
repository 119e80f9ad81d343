using Tomlyn;
using Tomlyn.Parsing;
using Tomlyn.Syntax;

namespace CarryTest.Rules.Toml;

/// <summary>TOML text into nodes with places.</summary>
internal sealed class TomlText
{
    private readonly Func<TextPosition, Place> _placeOf;
    private readonly Problems _problems;

    private TomlText(Func<TextPosition, Place> placeOf, Problems problems)
    {
        _placeOf = placeOf;
        _problems = problems;
    }

    /// <summary>Reads a document. Where it is not TOML, the problems say so and what is returned is not to be used.</summary>
    /// <param name="text">the document</param>
    /// <param name="source">the file, for places</param>
    /// <param name="problems">takes what is wrong</param>
    public static TableNode Read(string text, string source, Problems problems) =>
        Read(text, at => new Place(source, at.Line + 1, at.Column + 1), new Place(source, 1, 1), problems);

    /// <summary>Reads a document whose every part stands at one place: a value from the command line.</summary>
    public static TableNode ReadAt(string text, Place place, Problems problems) => Read(text, _ => place, place, problems);

    private static TableNode Read(string text, Func<TextPosition, Place> placeOf, Place start, Problems problems)
    {
        DocumentSyntax document;
        try
        {
            document = SyntaxParser.Parse(text);
        }
        catch (TomlException fault)
        {
            // The parser gives up on some texts, such as lists nested beyond reason, instead of gathering what is wrong.
            problems.Add(placeOf(new TextPosition(0, Math.Max((fault.Line ?? 1) - 1, 0), Math.Max((fault.Column ?? 1) - 1, 0))), $"this is not TOML: {fault.Message}");
            return new TableNode(start);
        }

        if (document.HasErrors)
        {
            foreach (DiagnosticMessage message in document.Diagnostics)
            {
                // A text that ends too early is reported at its beginning by the parser; the end is where to look.
                TextPosition at = message.Message.Contains("<eof>", StringComparison.Ordinal) ? EndOf(text) : message.Span.Start;
                problems.Add(placeOf(at), $"this is not TOML: {message.Message}");
            }

            return new TableNode(start);
        }

        return new TomlText(placeOf, problems).Document(document, start);
    }

    private static TextPosition EndOf(string text)
    {
        int lastLine = text.LastIndexOf('\n') + 1;
        return new TextPosition(text.Length, text.AsSpan().Count('\n'), text.Length - lastLine);
    }

    private TableNode Document(DocumentSyntax document, Place start)
    {
        var root = new TableNode(start);
        foreach (KeyValueSyntax pair in document.KeyValues)
        {
            Add(root, pair);
        }

        foreach (TableSyntaxBase header in document.Tables)
        {
            TableNode? table = Header(root, header);
            foreach (KeyValueSyntax pair in header.Items)
            {
                Add(table ?? new TableNode(start), pair);
            }
        }

        return root;
    }

    private TableNode? Header(TableNode root, TableSyntaxBase header)
    {
        List<(string Key, Place At)> path = Path(header.Name!);
        TableNode? parent = Descend(root, path);
        (string key, Place at) = path[^1];
        Entry? old = parent?.Find(key);
        if (header is TableArraySyntax)
        {
            var row = new TableNode(at);
            if (old is null)
            {
                parent?.Set(new Entry(key, at, new ListNode(at, [row])));
                return row;
            }

            if (old.Value.Value is ListNode { OfTables: true } rows)
            {
                parent!.Set(old.Value with { Value = rows with { Items = rows.Items.Add(row) } });
                return row;
            }

            Twice(key, at, old.Value.At);
            return null;
        }

        switch (old?.Value)
        {
            case null:
                var table = new TableNode(at);
                parent?.Set(new Entry(key, at, table));
                return table;
            case TableNode known:
                return known;
            default:
                Twice(key, at, old.Value.At);
                return null;
        }
    }

    private void Add(TableNode table, KeyValueSyntax pair)
    {
        List<(string Key, Place At)> path = Path(pair.Key!);
        TableNode? parent = Descend(table, path);
        (string key, Place at) = path[^1];
        if (parent?.Find(key) is { } old)
        {
            Twice(key, at, old.At);
            return;
        }

        parent?.Set(new Entry(key, at, Value(pair.Value!)));
    }

    /// <summary>The table that holds the last key of a path; tables on the way are made, of a list of tables the last one counts.</summary>
    private TableNode? Descend(TableNode table, List<(string Key, Place At)> path)
    {
        foreach ((string key, Place at) in path.SkipLast(1))
        {
            switch (table.Find(key)?.Value)
            {
                case null:
                    var made = new TableNode(at);
                    table.Set(new Entry(key, at, made));
                    table = made;
                    break;
                case TableNode known:
                    table = known;
                    break;
                case ListNode { OfTables: true, Items.Length: > 0 } rows:
                    table = (TableNode)rows.Items[^1];
                    break;
                default:
                    Twice(key, at, table.Find(key)!.Value.At);
                    return null;
            }
        }

        return table;
    }

    private void Twice(string key, Place at, Place before) => _problems.Add(at, $"`{key}` is given twice; the first is at {before}");

    private List<(string Key, Place At)> Path(KeySyntax key)
    {
        List<(string, Place)> path = [Part(key.Key!)];
        foreach (DottedKeyItemSyntax item in key.DotKeys)
        {
            path.Add(Part(item.Key!));
        }

        return path;
    }

    private (string Key, Place At) Part(BareKeyOrStringValueSyntax part) =>
        ((part as StringValueSyntax)?.Value ?? (part as BareKeySyntax)?.Key?.Text ?? "", _placeOf(part.Span.Start));

    private Node Value(ValueSyntax value)
    {
        Place at = _placeOf(value.Span.Start);
        return value switch
        {
            StringValueSyntax text => new TextNode(at, text.Value ?? ""),
            IntegerValueSyntax whole => new WholeNode(at, whole.Value),
            FloatValueSyntax number => new NumberNode(at, number.Value),
            BooleanValueSyntax flag => new FlagNode(at, flag.Value),
            DateTimeValueSyntax { Kind: SyntaxKind.LocalDate } date => new DateNode(at, DateOnly.FromDateTime(date.Value.DateTime.DateTime)),
            DateTimeValueSyntax time => new TimeNode(at, time.Token?.Text ?? ""),
            ArraySyntax list => new ListNode(at, [.. list.Items.Select(i => Value(i.Value!))]),
            InlineTableSyntax inline => Inline(inline, at),
            _ => throw new InvalidOperationException($"{value.Kind} is no TOML value"),
        };
    }

    private TableNode Inline(InlineTableSyntax inline, Place at)
    {
        var table = new TableNode(at);
        foreach (InlineTableItemSyntax item in inline.Items)
        {
            Add(table, item.KeyValue!);
        }

        return table;
    }
}

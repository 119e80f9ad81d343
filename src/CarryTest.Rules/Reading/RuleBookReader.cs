using System.Collections.Immutable;
using CarryTest.Carry.Rules;
using CarryTest.Market.Faults;
using CarryTest.Rules.Changes;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Sections;
using CarryTest.Rules.Toml;
using CarryTest.Studies;

namespace CarryTest.Rules.Reading;

/// <summary>Reads rule books.</summary>
public static class RuleBookReader
{
    /// <summary>Reads a rule book, the fee schedule and the forecast table that it names. Nothing is ignored: an unknown key, a value out of range, and a setting that this version has not got are errors.</summary>
    /// <param name="path">a TOML file; paths in it are relative to its folder</param>
    /// <param name="overrides">changes of single settings, `entry.per_share=0.05`, applied in order before anything is checked; a value that is not TOML is taken as text</param>
    /// <exception cref="InputException">something is wrong: one problem a line, each beginning with `file:line:column: ` or `--set key=value: `</exception>
    public static RuleBook Read(string path, IReadOnlyList<string> overrides)
    {
        string text = TextFile.Read(path, "the rule book");
        var problems = new Problems();
        TableNode document = TomlText.Read(text, path, problems);
        problems.ThrowIfAny();

        foreach (string change in overrides)
        {
            Override.Apply(document, change, RuleBookKeys.Shape, problems);
        }

        RuleBookKeys.Shape.Check(document, "", problems);
        string name = NameOf(document, path, problems);
        problems.ThrowIfAny();
        return Bind(document, name, text, path, overrides);
    }

    private static RuleBook Bind(TableNode document, string name, string text, string path, IReadOnlyList<string> overrides)
    {
        var values = new Values(document);
        string home = Path.GetDirectoryName(path) ?? "";
        var files = new SideFiles(home);
        return new RuleBook
        {
            Name = name,
            History = HistorySection.Bind(values, home),
            Book = new BookRules
            {
                Capital = CapitalSection.Bind(values),
                Packages = PackagesSection.Bind(values),
                Entry = EntrySection.Bind(values),
                Execution = ExecutionSection.Bind(values),
                Costs = CostsSection.Bind(values, files),
                Funding = FundingSection.Bind(values),
                Dividends = DividendsSection.Bind(values, files),
                Assignment = AssignmentSection.Bind(values),
                Borrow = BorrowSection.Bind(values),
                Settlement = SettlementSection.Bind(values),
                Mark = MarksSection.Bind(values),
                Seed = values.Of(RunSection.Seed),
            },
            Text = text,
            Overrides = [.. overrides],
            Effective = Effective(values, name),
            StudyTables = [.. RuleBookKeys.OfStudies.Select(t => t.Table).Where(t => document.Find(t) is not null)],
        };
    }

    private static string NameOf(TableNode document, string path, Problems problems)
    {
        if (document.Find(RunSection.Name.Path) is { } written)
        {
            return written.Value is TextNode text ? text.Value : "";
        }

        string name = Path.GetFileNameWithoutExtension(path);
        if (!RunSection.IsFolderName(name))
        {
            problems.Add(document.At, $"`{RunSection.Name.Path}` is missing, and the name of this file is not fit for a folder; it must be {RunSection.Name.Expected}");
        }

        return name;
    }

    private static ImmutableArray<(string Key, string Value, bool Written)> Effective(Values values, string name) =>
    [
        .. RuleBookKeys.OfBook.Select(key => (
            key.Path,
            values.NodeOf(key) is { } node ? key.Text(node) : ReferenceEquals(key, RunSection.Name) ? Quoted.Of(name) : key.WhenAbsent,
            values.Has(key))),
    ];
}

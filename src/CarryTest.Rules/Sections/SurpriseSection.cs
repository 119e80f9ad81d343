using System.Collections.Immutable;
using CarryTest.Carry.Assignment;
using CarryTest.Market.Words;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>`[[surprise]]`: read by the command `stress`.</summary>
internal static class SurpriseSection
{
    private static readonly Key<string> Name = new("name", Forms.Text("a name in quotes"), "Names the surprise in tables and figures.") { Required = true };

    private static readonly Key<DividendChange> Change = new("dividend.change", Forms.Word<DividendChange>(), "What happens to dividends.");

    private static readonly Key<ImmutableArray<string>> DividendSymbols = Symbols("dividend.symbols");

    private static readonly Key<DateOnly> DividendFrom = First("dividend.from", "First ex-date that is changed.");

    private static readonly Key<DateOnly> DividendTo = Last("dividend.to", "Last ex-date that is changed.");

    private static readonly Key<double> Amount = new("dividend.amount", Forms.Number(0, 1000), "Of `set` and `add`: currency per share.");

    private static readonly Key<double> Factor = new("dividend.factor", Forms.Number(0, 100), "Of `scale`: by what the amount is multiplied.");

    private static readonly Key<int> Days = new("dividend.days", Forms.Whole(-366, 366), "Of `move`: trading days, later or, negative, earlier.");

    private static readonly Key<DateOnly> ReviseOn = new("dividend.revise_on", Forms.Date(), "The date on which an amount already declared is changed.") { Otherwise = "only what is not declared yet changes" };

    private static readonly Key<DateOnly> FundingFrom = First("funding.from", "First night.");

    private static readonly Key<DateOnly> FundingTo = Last("funding.to", "Last night.");

    private static readonly Key<string> GapSymbol = new("gap.symbol", Forms.Text("an underlying in quotes"), "The underlying whose price jumps.");

    private static readonly Key<DateOnly> GapExpiry = new("gap.expiry", Forms.Date(), "The expiry over which it jumps.");

    private static readonly Key<double> GapMove = new("gap.move", Forms.Number(-1, 10, above: true), "By what fraction.");

    private static readonly Key<GapWhen> GapTime = new("gap.when", Forms.Word<GapWhen>(), "When it jumps.");

    private static readonly Key[] Gap = [GapSymbol, GapExpiry, GapMove, GapTime];

    private static readonly Key[] DividendKeys = [Change, DividendSymbols, DividendFrom, DividendTo, Amount, Factor, Days, ReviseOn];

    public static readonly RowsKey Surprises = new(
        "surprise",
        new Shape(
            [
                Name,
                .. DividendKeys,
                new Key<double>("funding.shift_bps", Forms.Number(-10_000, 10_000), "Added to all rates, basis points."),
                new Key<double>("funding.spread_bps", Forms.Number(-10_000, 10_000), "Added to both spreads, basis points."),
                FundingFrom,
                FundingTo,
                new Key<double>("borrow.fee_add", Forms.Number(0, 10), "Added to the borrow fee, a fraction a year."),
                new Key<DateOnly>("borrow.recall_on", Forms.Date(), "The date on which borrowed stock is recalled."),
                Symbols("borrow.symbols"),
                new Key<AssignmentRule>("assignment.rule", Forms.Word<AssignmentRule>(), "When holders exercise early, instead of the rule book's."),
                new Key<double>("assignment.fraction", Forms.Number(0, 1), "Fraction of holders who act, instead of the rule book's."),
                new Key<double>("costs.scale", Forms.Number(0, 100), "By what all fees are multiplied."),
                new Key<double>("quotes.widen", Forms.Number(1, 100), "By what all spreads are multiplied."),
                .. Gap,
            ],
            new Dictionary<string, string>
            {
                ["dividend"] = "Dividends other than the history's.",
                ["funding"] = "Rates other than the history's.",
                ["borrow"] = "Borrowed stock other than the history's.",
                ["assignment"] = "Early exercise other than the rule book's.",
                ["costs"] = "Fees other than the schedule's.",
                ["quotes"] = "Spreads other than the history's.",
                ["gap"] = "A price that jumps over an expiry.",
            },
            CheckDividend,
            CheckDates,
            CheckGap),
        "Something that happens otherwise than the history says; tables may be combined.");

    public static readonly IReadOnlyList<Key> Keys = [Surprises];

    private static void CheckDividend(Values values, string prefix, Problems problems)
    {
        if (DividendKeys.FirstOrDefault(values.Has) is not { } any)
        {
            return;
        }

        if (values.Written(Change) is not { } change)
        {
            problems.Add(values.PlaceOf(any), $"`{prefix}{Change.Path}` is missing; it must be {Change.Expected}");
            return;
        }

        Needs(Amount, DividendChange.Set, DividendChange.Add);
        Needs(Factor, DividendChange.Scale);
        Needs(Days, DividendChange.Move);

        void Needs(Key key, params DividendChange[] of)
        {
            if (of.Contains(change) && !values.Has(key))
            {
                problems.Add(values.PlaceOf(Change), $"`{prefix}{Change.Path} = \"{change.Word()}\"` needs `{prefix}{key.Path}`, {key.Expected}");
            }
            else if (!of.Contains(change) && values.Has(key))
            {
                problems.Add(values.PlaceOf(key), $"`{prefix}{key.Path}` has a meaning for {string.Join(" and ", of.Select(c => $"\"{c.Word()}\""))} only; `{prefix}{Change.Path}` is \"{change.Word()}\"");
            }
        }
    }

    private static void CheckDates(Values values, string prefix, Problems problems)
    {
        foreach ((Key<DateOnly> first, Key<DateOnly> last) in new[] { (DividendFrom, DividendTo), (FundingFrom, FundingTo) })
        {
            if (values.Written(first) is { } from && values.Written(last) is { } to && from > to)
            {
                problems.Add(values.PlaceOf(last), $"`{prefix}{last.Path}` lies before `{prefix}{first.Path}`");
            }
        }
    }

    private static void CheckGap(Values values, string prefix, Problems problems)
    {
        if (!Gap.Any(values.Has))
        {
            return;
        }

        foreach (Key key in Gap.Where(k => !values.Has(k)))
        {
            problems.Add(values.PlaceOf(Gap.First(values.Has)), $"`{prefix}{key.Path}` is missing; it must be {key.Expected}");
        }
    }

    private static Key<ImmutableArray<string>> Symbols(string path) =>
        new(path, Forms.List(Forms.Text("a name in quotes"), "names", mayBeEmpty: false), "The underlyings it concerns.") { Otherwise = "all" };

    private static Key<DateOnly> First(string path, string sentence) => new(path, Forms.Date(), sentence) { Otherwise = "from the first day" };

    private static Key<DateOnly> Last(string path, string sentence) => new(path, Forms.Date(), sentence) { Otherwise = "to the last day" };
}

using System.Collections.Frozen;
using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Words;

namespace CarryTest.Market.Reference;

/// <summary>The reference tables sorted and by key, their keys and names checked.</summary>
internal sealed class ReferenceIndex
{
    public ReferenceIndex(ReferenceTables tables)
    {
        Underlyings = Keyed("underlyings", tables.Underlyings, u => u.Symbol, u => u.Symbol);
        Roots = Keyed("roots", tables.Roots, r => r.Root, r => r.Root);
        foreach (OptionRoot root in tables.Roots)
        {
            CheckSymbol("roots", root.Root, root.Symbol);
        }

        Dividends = ByName("dividends", tables.Dividends, d => (d.Symbol, d.ExOn, d.Kind), d => $"{d.Symbol}, ex_on {d.ExOn:O}, {d.Kind.Word()}", d => d.Symbol);
        Borrow = ByName("borrow", tables.Borrow, b => (b.Symbol, b.AsOf), b => $"{b.Symbol}, as_of {b.AsOf:O}", b => b.Symbol);
        Actions = ByName(
            "corporate_actions", tables.CorporateActions, a => (a.Symbol, a.EffectiveOn, a.Kind), a => $"{a.Symbol}, effective_on {a.EffectiveOn:O}, {a.Kind.Word()}", a => a.Symbol);
        RatesByTerm =
        [
            .. Unique("rates", tables.Rates, r => (r.Days, r.AsOf), r => $"as_of {r.AsOf:O}, days {r.Days}")
                .GroupBy(r => r.Days).OrderBy(g => g.Key).Select(g => g.OrderBy(r => r.AsOf).ToImmutableArray()),
        ];
        Overnight = RatesByTerm.FirstOrDefault(rows => rows[0].Days == 1, []);
        foreach (SettlementValue row in tables.Settlements)
        {
            CheckRoot("settlements", Words(row), row.Root);
        }

        foreach (OfficialClose row in tables.Closes)
        {
            CheckSymbol("closes", Words(row), row.Symbol);
        }

        Settlements = Keyed("settlements", tables.Settlements, s => (s.Root, s.Expiry), Words).ToFrozenDictionary(p => p.Key, p => p.Value.Price);
        Closes = Keyed("closes", tables.Closes, c => (c.Symbol, c.Date), Words).ToFrozenDictionary(p => p.Key, p => p.Value.Close);
    }

    public FrozenDictionary<string, Underlying> Underlyings { get; }

    public FrozenDictionary<string, OptionRoot> Roots { get; }

    /// <summary>One array a term, terms ascending; within it by date.</summary>
    public ImmutableArray<ImmutableArray<RateQuote>> RatesByTerm { get; }

    /// <summary>The term of one day, by date; empty where the table has none.</summary>
    public ImmutableArray<RateQuote> Overnight { get; }

    public FrozenDictionary<string, ImmutableArray<Dividend>> Dividends { get; }

    public FrozenDictionary<string, ImmutableArray<BorrowTerms>> Borrow { get; }

    public FrozenDictionary<string, ImmutableArray<CorporateAction>> Actions { get; }

    public FrozenDictionary<(string Root, DateOnly Expiry), double> Settlements { get; }

    public FrozenDictionary<(string Symbol, DateOnly Date), double> Closes { get; }

    private static FrozenDictionary<TKey, T> Keyed<TKey, T>(string table, IEnumerable<T> rows, Func<T, TKey> keyOf, Func<T, string> words)
        where TKey : notnull => Unique(table, rows, keyOf, words).ToFrozenDictionary(keyOf);

    private static List<T> Unique<TKey, T>(string table, IEnumerable<T> rows, Func<T, TKey> keyOf, Func<T, string> words)
        where TKey : notnull
    {
        var seen = new HashSet<TKey>();
        var list = new List<T>();
        foreach (T row in rows)
        {
            if (!seen.Add(keyOf(row)))
            {
                throw new InputException($"reference table `{table}`: the key {words(row)} occurs twice. Keep one of its rows.");
            }

            list.Add(row);
        }

        return list;
    }

    private static string Words(SettlementValue row) => $"{row.Root}, expiry {row.Expiry:O}";

    private static string Words(OfficialClose row) => $"{row.Symbol}, date {row.Date:O}";

    private void CheckSymbol(string table, string row, string symbol)
    {
        if (!Underlyings.ContainsKey(symbol))
        {
            throw new InputException($"reference table `{table}`, row {row}: the symbol {symbol} is not in the table `underlyings`. Add it there or mend the name.");
        }
    }

    private void CheckRoot(string table, string row, string root)
    {
        if (!Roots.ContainsKey(root))
        {
            throw new InputException($"reference table `{table}`, row {row}: the root {root} is not in the table `roots`. Add it there or mend the name.");
        }
    }

    private FrozenDictionary<string, ImmutableArray<T>> ByName<TKey, T>(string table, IEnumerable<T> rows, Func<T, TKey> keyOf, Func<T, string> words, Func<T, string> nameOf)
        where TKey : notnull
    {
        List<T> unique = Unique(table, rows, keyOf, words);
        foreach (T row in unique)
        {
            CheckSymbol(table, words(row), nameOf(row));
        }

        // Within a group the name is the same: what orders it is the rest of the key, its date first.
        return unique.ToLookup(nameOf).ToFrozenDictionary(g => g.Key, g => g.OrderBy(keyOf).ToImmutableArray());
    }
}

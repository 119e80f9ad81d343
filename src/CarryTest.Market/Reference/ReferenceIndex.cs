using System.Collections.Frozen;
using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;

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
            CheckName("roots", $"root {root.Root}", root.Symbol);
        }

        Rates = [.. Unique("rates", tables.Rates, r => (r.AsOf, r.Days), r => $"as_of {r.AsOf:yyyy-MM-dd}, days {r.Days}").OrderBy(r => r.AsOf).ThenBy(r => r.Days)];
        Overnight = [.. Rates.Where(r => r.Days == 1)];
        Dividends = ByName(
            "dividends", Unique("dividends", tables.Dividends, d => (d.Symbol, d.ExOn, d.Kind), d => $"{d.Symbol}, ex_on {d.ExOn:yyyy-MM-dd}"), d => d.Symbol, d => d.ExOn);
        Borrow = ByName("borrow", Unique("borrow", tables.Borrow, b => (b.Symbol, b.AsOf), b => $"{b.Symbol}, as_of {b.AsOf:yyyy-MM-dd}"), b => b.Symbol, b => b.AsOf);
        Actions = ByName("corporate_actions", tables.CorporateActions, a => a.Symbol, a => a.EffectiveOn);
        Settlements = Keyed("settlements", tables.Settlements, s => (s.Root, s.Expiry), s => $"{s.Root}, expiry {s.Expiry:yyyy-MM-dd}")
            .ToFrozenDictionary(p => p.Key, p => p.Value.Price);
        Closes = Keyed("closes", tables.Closes, c => (c.Symbol, c.Date), c => $"{c.Symbol}, date {c.Date:yyyy-MM-dd}").ToFrozenDictionary(p => p.Key, p => p.Value.Close);
    }

    public FrozenDictionary<string, Underlying> Underlyings { get; }

    public FrozenDictionary<string, OptionRoot> Roots { get; }

    public ImmutableArray<RateQuote> Rates { get; }

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
                throw new InputException($"reference table `{table}`: the key {words(row)} occurs twice. Keep one of the rows.");
            }

            list.Add(row);
        }

        return list;
    }

    private void CheckName(string table, string row, string symbol)
    {
        if (!Underlyings.ContainsKey(symbol))
        {
            throw new InputException($"reference table `{table}`: {row} names the symbol {symbol}, which the table `underlyings` does not have. Add it there or mend the name.");
        }
    }

    private FrozenDictionary<string, ImmutableArray<T>> ByName<T>(string table, IEnumerable<T> rows, Func<T, string> nameOf, Func<T, DateOnly> dateOf)
    {
        ILookup<string, T> groups = rows.ToLookup(nameOf);
        foreach (IGrouping<string, T> group in groups)
        {
            CheckName(table, "a row", group.Key);
        }

        return groups.ToFrozenDictionary(g => g.Key, g => g.OrderBy(dateOf).ToImmutableArray());
    }
}

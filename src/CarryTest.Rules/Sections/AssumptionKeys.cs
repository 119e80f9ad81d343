using CarryTest.Market.Words;
using CarryTest.Parity.Funding;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>The keys of one financing assumption, wherever it stands.</summary>
internal sealed class AssumptionKeys
{
    private readonly Key<FundingKind> _kind;
    private readonly Key<double> _rate;
    private readonly Key<string> _from;
    private readonly Key<double> _debitSpreadBps;
    private readonly Key<double> _creditSpreadBps;
    private readonly Key<DayCount> _dayCount;

    /// <param name="table">the table that holds it, dotted</param>
    /// <param name="usual">its defaults</param>
    /// <param name="later">kinds that a later version brings</param>
    public AssumptionKeys(string table, FundingAssumption usual, params FundingKind[] later)
    {
        _kind = new Key<FundingKind>($"{table}.kind", Forms.Word(later), "Where the rate of a night comes from.") { Default = usual.Kind };
        _rate = new Key<double>($"{table}.rate", Forms.Number(-0.1, 1, hint: "a fraction a year: 0.05 is five percent"), "Of kind `flat`: the rate, a fraction a year.") { Otherwise = "needed for kind `flat`" };
        _from = new Key<string>($"{table}.from", Forms.Text("a root in quotes, or \"own\""), "Of kind `implied`: the root whose chains imply the rate, or `own`.")
        {
            Otherwise = "a European root of the same currency",
            Later = later.Contains(FundingKind.Implied) ? "rates that chains imply come with a later version" : null,
        };
        _debitSpreadBps = new Key<double>($"{table}.debit_spread_bps", Forms.Number(-10_000, 10_000), "Added to the rate where cash is owed, basis points.") { Default = usual.DebitSpreadBps };
        _creditSpreadBps = new Key<double>($"{table}.credit_spread_bps", Forms.Number(-10_000, 10_000), "Taken from the rate where cash is held, basis points.") { Default = usual.CreditSpreadBps };
        _dayCount = new Key<DayCount>($"{table}.day_count", Forms.Word<DayCount>(), "How a year is counted.") { Default = usual.DayCount };
        All = [_kind, _rate, _from, _debitSpreadBps, _creditSpreadBps, _dayCount];
    }

    public IReadOnlyList<Key> All { get; }

    public FundingAssumption Bind(Values values) => new()
    {
        Kind = values.Of(_kind),
        Rate = values.Written(_rate) ?? double.NaN,
        From = values.WrittenText(_from),
        DebitSpreadBps = values.Of(_debitSpreadBps),
        CreditSpreadBps = values.Of(_creditSpreadBps),
        DayCount = values.Of(_dayCount),
    };

    public void Check(Values values, string prefix, Problems problems)
    {
        FundingKind kind = values.Of(_kind);
        if (kind == FundingKind.Flat && !values.Has(_rate))
        {
            problems.Add(values.PlaceOf(_kind), $"`{prefix}{_kind.Path} = \"flat\"` needs `{prefix}{_rate.Path}`, a fraction a year: 0.05 is five percent");
        }

        OnlyFor(FundingKind.Flat, _rate);
        OnlyFor(FundingKind.Implied, _from);

        void OnlyFor(FundingKind wanted, Key key)
        {
            if (kind != wanted && values.Has(key))
            {
                problems.Add(values.PlaceOf(key), $"`{prefix}{key.Path}` has a meaning for kind \"{wanted.Word()}\" only; `{prefix}{_kind.Path}` is \"{kind.Word()}\"");
            }
        }
    }
}

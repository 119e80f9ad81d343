using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>
/// The screen of a day, shared by all variants: leg tests once a strike, then for each kind the edge without early exercise and without fees, an upper bound of every variant's.
/// What it drops no variant could want.
/// </summary>
public sealed class Screen
{
    private readonly IReadOnlyList<ParityRules> _variants;
    private Stage[] _sells = [];
    private Stage[] _buys = [];

    /// <summary>Screens for books with these rules.</summary>
    /// <param name="variants">the rules of all books, at least one; they share the limits of the leg tests</param>
    /// <exception cref="ArgumentException">there is none, or two differ in a limit that the leg tests read: these need screens of their own</exception>
    public Screen(IReadOnlyList<ParityRules> variants)
    {
        if (variants.Count == 0 || variants.Any(v => LegLimits(v) != LegLimits(variants[0])))
        {
            throw new ArgumentException("A screen needs at least one variant, and all of them the same limits of spread and staleness.", nameof(variants));
        }

        _variants = variants;
    }

    /// <summary>Screens a day.</summary>
    public Shortlist Run(MarketDay day)
    {
        var funnel = new FunnelCount();
        var lists = ImmutableArray.CreateBuilder<ImmutableArray<Candidate>>(day.Day.Snapshots.Length);
        for (int snapshot = 0; snapshot < day.Day.Snapshots.Length; snapshot++)
        {
            var found = new List<Candidate>();
            BelievedFunding[] believed = [.. _variants.Select(v => new BelievedFunding(v.Believed, day.KnownAt(snapshot)).Until(day.Furthest))];
            ImmutableArray<Chain> chains = day.Day.Snapshots[snapshot].Chains;
            for (int c = 0; c < chains.Length; c++)
            {
                foreach (ExpirySlice slice in chains[c].Expiries)
                {
                    ExpiryView[] views = [.. _variants.Select((v, i) => new ExpiryView(v, day, snapshot, chains[c], slice, believed[i], () => true))];
                    ScreenExpiry(day, snapshot, chains[c], slice, day.Ages(snapshot, c), views, found, funnel);
                }
            }

            lists.Add([.. found.OrderBy(f => f.Terms.Underlying.Symbol, StringComparer.Ordinal).ThenBy(f => f.Terms.Root.Root, StringComparer.Ordinal)
                .ThenBy(f => f.Terms.Expiry).ThenBy(f => f.Terms.Low).ThenBy(f => f.Terms.High).ThenBy(f => f.Terms.Kind.Kind)]);
        }

        return new Shortlist(lists.ToImmutable(), [.. funnel.Rows()]);
    }

    private void ScreenExpiry(
        MarketDay day, int snapshot, Chain chain, ExpirySlice slice, QuoteAges ages, ExpiryView[] views, List<Candidate> found, FunnelCount funnel)
    {
        if (_sells.Length < slice.Count)
        {
            _sells = new Stage[slice.Count];
            _buys = new Stage[slice.Count];
        }

        Span<Stage> sells = _sells.AsSpan(0, slice.Count);
        Span<Stage> buys = _buys.AsSpan(0, slice.Count);
        string symbol = chain.Underlying.Symbol;
        funnel.See(symbol, null, slice.Count);
        for (int i = 0; i < slice.Count; i++)
        {
            sells[i] = LegTests.First(chain, slice, slice.Start + i, sells: true, _variants[0].Entry, ages, day.Session, views[0].Dates);
            buys[i] = LegTests.First(chain, slice, slice.Start + i, sells: false, _variants[0].Entry, ages, day.Session, views[0].Dates);
            Stage better = (Stage)Math.Max((int)sells[i], (int)buys[i]);
            if (better <= Stage.Stale)
            {
                funnel.Refuse(symbol, null, better, 1);
            }
        }

        Singles(Kind.Conversion, sells, snapshot, chain, slice, views, found, funnel);
        Singles(Kind.Reversal, buys, snapshot, chain, slice, views, found, funnel);
        Boxes(Kind.LongBox, buys, sells, snapshot, chain, slice, views, found, funnel);
        Boxes(Kind.ShortBox, sells, buys, snapshot, chain, slice, views, found, funnel);
    }

    private void Singles(
        Kind kind, ReadOnlySpan<Stage> rows, int snapshot, Chain chain, ExpirySlice slice, ExpiryView[] views, List<Candidate> found, FunnelCount funnel)
    {
        if (!_variants.Any(v => v.Packages.Kinds.Contains(kind)))
        {
            return;
        }

        string symbol = chain.Underlying.Symbol;
        funnel.See(symbol, kind, slice.Count);
        Span<Stage> expiry = stackalloc Stage[views.Length];
        Stage latest = Latest(kind, views, expiry);
        SyntheticValue[] values = [.. views.Select((v, i) => new SyntheticValue(v, _variants[i], PackageKinds.Of(kind).Funding))];
        double mid = chain.UnderlyingMid;
        for (int i = 0; i < rows.Length; i++)
        {
            Stage first = (Stage)Math.Min((int)rows[i], (int)latest);
            double strike = chain.Columns.Strike[slice.Start + i] / 1000.0;
            bool inRange = false;
            bool wanted = false;
            for (int v = 0; v < views.Length && first > Stage.Moneyness; v++)
            {
                bool range = _variants[v].Packages.Moneyness.Holds(strike / mid);
                inRange |= range;
                wanted |= range && first == LegTests.Passed && expiry[v] == LegTests.Passed && values[v].SingleInReach(kind, chain, slice.Start + i);
            }

            if (!wanted)
            {
                funnel.Refuse(symbol, kind, first <= Stage.Moneyness ? first : !inRange ? Stage.Moneyness : first == LegTests.Passed ? Stage.Edge : first, 1);
                continue;
            }

            var at = new Strike(chain.Columns.Strike[slice.Start + i]);
            var terms = new PackageTerms(PackageKinds.Of(kind), chain.Root, chain.Underlying, slice.Expiry, at, at);
            found.Add(new Candidate(snapshot, terms, views[0].Dates, chain, slice.Start + i, slice.Start + i));
        }
    }

    private void Boxes(
        Kind kind, ReadOnlySpan<Stage> low, ReadOnlySpan<Stage> high, int snapshot, Chain chain, ExpirySlice slice, ExpiryView[] views, List<Candidate> found, FunnelCount funnel)
    {
        if (!_variants.Any(v => v.Packages.Kinds.Contains(kind)))
        {
            return;
        }

        string symbol = chain.Underlying.Symbol;
        funnel.See(symbol, kind, (long)slice.Count * (slice.Count - 1) / 2);
        Span<Stage> expiry = stackalloc Stage[views.Length];
        Stage latest = Latest(kind, views, expiry);
        var widest = new Between<double>(_variants.Min(v => v.Packages.BoxWidth.Least), _variants.Max(v => v.Packages.BoxWidth.Most));
        long pass = PairCount.Count(chain, slice, low, high, latest, widest, chain.UnderlyingMid, (stage, n) => funnel.Refuse(symbol, kind, stage, n));
        long listed = 0;
        if (pass > 0)
        {
            var pairs = new SortedSet<(int Low, int High)>();
            for (int v = 0; v < views.Length; v++)
            {
                if (expiry[v] == LegTests.Passed)
                {
                    var value = new SyntheticValue(views[v], _variants[v], PackageKinds.Of(kind).Funding);
                    value.BoxesInReach(kind, chain, slice, low, high, pairs);
                }
            }

            foreach ((int a, int b) in pairs)
            {
                var terms = new PackageTerms(
                    PackageKinds.Of(kind), chain.Root, chain.Underlying, slice.Expiry, new Strike(chain.Columns.Strike[a]), new Strike(chain.Columns.Strike[b]));
                found.Add(new Candidate(snapshot, terms, views[0].Dates, chain, a, b));
            }

            listed = pairs.Count;
        }

        funnel.Refuse(symbol, kind, Stage.Edge, pass - listed);
    }

    private static (double Spread, double Exempt, int Sessions) LegLimits(ParityRules rules) =>
        (rules.Entry.MaxSpreadFraction, rules.Entry.MinPriceForSpread, rules.Entry.StaleAfterSessions);

    private static Stage Latest(Kind kind, ExpiryView[] views, Span<Stage> expiry)
    {
        Stage latest = Stage.Quoted;
        for (int v = 0; v < views.Length; v++)
        {
            expiry[v] = views[v].First(kind);
            latest = (Stage)Math.Max((int)latest, (int)expiry[v]);
        }

        return latest;
    }
}

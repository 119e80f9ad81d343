using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>One variant's judgement of candidates. Not safe for several threads: each book has its own.</summary>
/// <param name="rules">the variant's rules</param>
/// <param name="premia">early-exercise premia, shared</param>
public sealed class Entry(ParityRules rules, Premia premia)
{
    private readonly Dictionary<(int Snapshot, string Root, DateOnly Label), ExpiryView> _views = [];
    private readonly Dictionary<int, BelievedFunding> _believed = [];
    private readonly Dictionary<(int Snapshot, string Root), bool> _agrees = [];
    private MarketDay? _day;

    /// <summary>All tests from tradeable to edge, at a size.</summary>
    /// <param name="candidate">what could be opened</param>
    /// <param name="day">its day</param>
    /// <param name="units">the size, at least 1</param>
    public Judgement Judge(Candidate candidate, MarketDay day, int units)
    {
        ExpiryView view = ViewOf(candidate, day);
        Stage first = First(candidate, view);
        if (first != LegTests.Passed)
        {
            return new Judgement(first, null);
        }

        (Stage? refused, PackagePlan? plan) = Priced(candidate, view, units);
        if (refused is null or Stage.Sanity && candidate.Terms.Kind.HasStock && !view.StockAgrees())
        {
            return new Judgement(Stage.StockAgrees, plan);
        }

        return new Judgement(refused, plan);
    }

    /// <summary>The candidate at another snapshot of its day; null where a contract is not listed there.</summary>
    public static Candidate? Again(Candidate decided, MarketDay day, int snapshot)
    {
        if (day.Day.Snapshots[snapshot].Of(decided.Terms.Root.Root) is not { } chain)
        {
            return null;
        }

        int low = chain.Row(decided.Terms.Expiry, decided.Terms.Low);
        int high = chain.Row(decided.Terms.Expiry, decided.Terms.High);
        return low < 0 || high < 0
            ? null
            : decided with { Snapshot = snapshot, Dates = day.Dates(chain.Root, decided.Terms.Expiry), Chain = chain, RowLow = low, RowHigh = high };
    }

    /// <summary>The tests of a fill: leg tests, agreement of the stock, and the edge at what is known now against `refuse_below`.</summary>
    /// <param name="now">the candidate at the snapshot of the fill</param>
    /// <param name="day">its day</param>
    /// <param name="units">the size</param>
    public Judgement AtFill(Candidate now, MarketDay day, int units)
    {
        ExpiryView view = ViewOf(now, day);
        foreach (Leg leg in now.Terms.Kind.Legs)
        {
            if (leg.Of == LegOf.Call && LegTests.First(now.Chain, view.Slice, now.RowOf(leg), leg.Sign < 0, rules.Entry, null, 0, view.Dates) != LegTests.Passed)
            {
                return new Judgement(Stage.QuoteGone, null);
            }
        }

        bool stock = now.Terms.Kind.HasStock;
        bool unknownPremium = double.IsNaN(now.Chain.UnderlyingMid) && now.Chain.Root.Exercise == ExerciseStyle.American;
        if (view.IsBlocked || LegPrices(now).Any(double.IsNaN) || unknownPremium || (stock && (view.StockQuote != LegTests.Passed || !view.StockAgrees())))
        {
            return new Judgement(Stage.QuoteGone, null);
        }

        PackagePlan plan = WithPremia(now, view, PlanWithout(now, view, units));
        return new Judgement(plan.EdgePerShare < rules.Execution.RefuseBelow ? Stage.EdgeGone : null, plan);
    }

    /// <summary>The plan of a candidate at a size, without any test.</summary>
    public PackagePlan Plan(Candidate candidate, MarketDay day, int units)
    {
        ExpiryView view = ViewOf(candidate, day);
        return WithPremia(candidate, view, PlanWithout(candidate, view, units));
    }

    /// <summary>What each leg would trade at, currency per share; NaN where its side is not quoted.</summary>
    public ImmutableArray<double> LegPrices(Candidate candidate) =>
        [.. candidate.Terms.Kind.Legs.Select(leg => Prices.Of(candidate.Chain, candidate.RowOf(leg), leg, rules.Execution, rules.Costs))];

    /// <summary>A of an option at a snapshot, per share; 0 where the chain does not list it.</summary>
    public double PremiumOf(MarketDay day, int snapshot, PackageTerms terms, Right right, Strike strike)
    {
        if (day.Day.Snapshots[snapshot].Of(terms.Root.Root) is not { } chain || chain.Slice(terms.Expiry) is not { } slice)
        {
            return 0;
        }

        int row = chain.Row(terms.Expiry, strike);
        return row < 0 ? 0 : premia.Of(ViewOf(day, snapshot, chain, slice).Premium, row, right);
    }

    private Stage First(Candidate candidate, ExpiryView view)
    {
        PackageTerms terms = candidate.Terms;
        Stage first = view.First(terms.Kind.Kind);
        double mid = candidate.Chain.UnderlyingMid;
        bool inRange = terms.Kind.Strikes == 1
            ? rules.Packages.Moneyness.Holds(terms.Low.PerShare / mid)
            : rules.Packages.BoxWidth.Holds((terms.High.Thousandths - terms.Low.Thousandths) / 1000.0 / mid);
        return inRange ? first : (Stage)Math.Min((int)first, (int)Stage.Moneyness);
    }

    // Bounds of the premium first: most candidates are decided without a volatility.
    private (Stage? Refused, PackagePlan? Plan) Priced(Candidate candidate, ExpiryView view, int units)
    {
        if (OutOfReach(candidate, view))
        {
            return (Stage.Edge, null);
        }

        PackagePlan plan = PlanWithout(candidate, view, units);
        double least = Thresholds.Least(rules.Entry, plan.Delivered * plan.DiscountToDelivery, view.Dates.FundedDays, plan.CostsPerShare);
        (double leastShort, double mostLong) = Bounds(candidate, view);
        if (plan.EdgePerShare + (rules.Entry.LongExerciseValue * mostLong) - leastShort < least)
        {
            return (Stage.Edge, plan);
        }

        plan = WithPremia(candidate, view, plan);
        if (plan.EdgePerShare < least)
        {
            return (Stage.Edge, plan);
        }

        return (plan.EdgePerShare > rules.Entry.TooGood * plan.Delivered ? Stage.Sanity : null, plan);
    }

    // Without fees, and with the premium's bounds alone: decides most candidates before a plan is made.
    private bool OutOfReach(Candidate candidate, ExpiryView view)
    {
        PackageKind kind = candidate.Terms.Kind;
        SyntheticValue value = view.ValueAt(kind.Funding);
        double edge = kind.HasStock
            ? value.Single(kind.Kind, candidate.Chain, candidate.RowLow)
            : value.Box(kind.Kind, candidate.Chain, candidate.RowLow, candidate.RowHigh);
        (double leastShort, double mostLong) = Bounds(candidate, view);
        double least = Thresholds.Least(rules.Entry, view.Delivered(candidate.Terms) * view.Z(view.Dates.DeliverySettles, kind.Funding), view.Dates.FundedDays);
        return edge - leastShort + (rules.Entry.LongExerciseValue * mostLong) < least;
    }

    private (double LeastShort, double MostLong) Bounds(Candidate candidate, ExpiryView view)
    {
        double leastShort = 0;
        double mostLong = 0;
        foreach (Leg leg in candidate.Terms.Kind.Legs)
        {
            if (leg.Of == LegOf.Stock || (leg.Sign > 0 && rules.Entry.LongExerciseValue == 0))
            {
                continue;
            }

            (double least, double most) = Premia.Bounds(view.Premium, candidate.RowOf(leg), leg.Of == LegOf.Call ? Right.Call : Right.Put);
            leastShort += leg.Sign < 0 ? least : 0;
            mostLong += leg.Sign > 0 ? most : 0;
        }

        return (leastShort, mostLong);
    }

    private PackagePlan PlanWithout(Candidate candidate, ExpiryView view, int units) => PackageEdge.Plan(
        new PlanRequest
        {
            Terms = candidate.Terms,
            Dates = view.Dates,
            Units = units,
            LegPrices = LegPrices(candidate),
            StockMid = candidate.Chain.UnderlyingMid,
            Dividends = view.Dividends,
            Believed = view.Believed,
            Benchmark = view.Benchmark,
            Fees = rules.Costs.Schedule,
            BorrowFee = view.BorrowFee,
            BorrowBase = rules.BorrowBase,
            Withholding = rules.Dividends.Withholding,
            PremiumShort = 0,
            PremiumLongCounted = 0,
        },
        view.Known.Calendar);

    private PackagePlan WithPremia(Candidate candidate, ExpiryView view, PackagePlan plan)
    {
        double ofShort = 0;
        double ofLong = 0;
        foreach (Leg leg in candidate.Terms.Kind.Legs)
        {
            if (leg.Of == LegOf.Stock || (leg.Sign > 0 && rules.Entry.LongExerciseValue == 0))
            {
                continue;
            }

            Right right = leg.Of == LegOf.Call ? Right.Call : Right.Put;
            double premium = premia.Of(view.Premium, candidate.RowOf(leg), right);
            ofShort += leg.Sign < 0 ? Math.Max(premium, right == Right.Call ? EveFloor(candidate, view, leg) : 0) : 0;
            ofLong += leg.Sign > 0 ? rules.Entry.LongExerciseValue * premium : 0;
        }

        return plan.With(ofShort, ofLong);
    }

    // On the eve of an ex-date on which holders exercise, the call's price holds no more than the right to do so: the premium is at least what exercise gains.
    private static double EveFloor(Candidate candidate, ExpiryView view, Leg leg)
    {
        int row = candidate.RowOf(leg);
        EarlyCall? eve = candidate.Chain.Root.Exercise == ExerciseStyle.European ? null : EarlyExercise.CallAt(
            candidate.Chain, view.Slice.Expiry, row, view.Dates.TradedOn, view.Known, view.Dividends, view.Benchmark, view.Cycle, useBid: false, cost: 0);
        if (eve is null || !EarlyExercise.CallPays(eve))
        {
            return 0;
        }

        CallHorizon expiry = eve.Horizons[^1];
        double put = candidate.Chain.Columns.PutBid[row];
        return Math.Max(0, expiry.DividendsWorth - (double.IsNaN(put) ? 0 : put) - expiry.Interest);
    }

    private ExpiryView ViewOf(Candidate candidate, MarketDay day) =>
        ViewOf(day, candidate.Snapshot, candidate.Chain, candidate.Chain.Slice(candidate.Terms.Expiry)!.Value);

    private ExpiryView ViewOf(MarketDay day, int snapshot, Chain chain, ExpirySlice slice)
    {
        if (!ReferenceEquals(_day, day))
        {
            _views.Clear();
            _believed.Clear();
            _agrees.Clear();
            _day = day;
        }

        if (!_views.TryGetValue((snapshot, chain.Root.Root, slice.Expiry), out ExpiryView? view))
        {
            view = new ExpiryView(rules, day, snapshot, chain, slice, BelievedAt(day, snapshot), () => Agrees(day, snapshot, chain));
            _views.Add((snapshot, chain.Root.Root, slice.Expiry), view);
        }

        return view;
    }

    private BelievedFunding BelievedAt(MarketDay day, int snapshot)
    {
        if (!_believed.TryGetValue(snapshot, out BelievedFunding? believed))
        {
            believed = new BelievedFunding(rules.Believed, day.KnownAt(snapshot)).Until(day.Furthest);
            _believed.Add(snapshot, believed);
        }

        return believed;
    }

    private bool Agrees(MarketDay day, int snapshot, Chain chain)
    {
        if (!_agrees.TryGetValue((snapshot, chain.Root.Root), out bool agrees))
        {
            agrees = StockAgreement.Holds(day, snapshot, chain, rules, premia);
            _agrees.Add((snapshot, chain.Root.Root), agrees);
        }

        return agrees;
    }
}

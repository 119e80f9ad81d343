using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Markets;
using CsCheck;

namespace CarryTest.Parity.Tests.Screening;

/// <summary>The screen against a twin that walks every strike and every pair and reads the edge off the legs.</summary>
public sealed class ScreenProperties
{
    private const string Today = "2025-06-02";

    // An edge this near to a threshold may fall on either side: the twin counts whole cents of a large size.
    private const double Hair = 1e-5;

    private static readonly string[] Expiries = ["2025-06-20", "2025-08-15"];

    private static readonly Gen<(MarketDay Day, ParityRules Rules)> Cases = Gen.Select(
        Gen.Int[3, 9], Gen.Int[0, 4], Gen.Double[-1, 1].Array[72], Gen.Int[0, 11].Array[72], Gen.Select(Gen.Double[-0.1, 0.2], Gen.Int[0, 2], Gen.Double[0.02, 0.06], Gen.Bool))
        .Select((strikes, dividends, noise, fault, rule) => (DayOf(strikes, dividends, noise, fault), RulesOf(rule.Item1, rule.Item2, rule.Item3, rule.Item4)));

    [Fact]
    public void Shortlist_IsWhatAWalkOverEveryPairFinds() => Cases.Sample(
        c =>
        {
            Shortlist shortlist = new Screen([c.Rules]).Run(c.Day);
            (List<string> certain, List<string> possible, _) = Walk(c.Day, c.Rules);
            string[] found = [.. shortlist.At(0).Select(Name)];
            Assert.Empty(certain.Except(found));
            Assert.Empty(found.Except(possible));
            Assert.Equal(found.Length, found.Distinct().Count());
        },
        iter: 300);

    [Fact]
    public void Funnel_CountsWhatAWalkOverEveryPairRefuses() => Cases.Sample(
        c =>
        {
            FunnelLine[] funnel = [.. new Screen([c.Rules]).Run(c.Day).Funnel];
            (List<string> certain, List<string> possible, Dictionary<(Kind, Stage), long> refused) = Walk(c.Day, c.Rules);
            int open = possible.Count - certain.Count;
            foreach (FunnelLine line in funnel.Where(l => l.Kind is not null))
            {
                long expected = refused.GetValueOrDefault((line.Kind!.Value, line.Stage));
                Assert.InRange(line.Refused, expected - (line.Stage == Stage.Edge ? open : 0), expected + (line.Stage == Stage.Edge ? open : 0));
            }
        },
        iter: 300);

    [Fact]
    public void Funnel_SeenLessRefused_IsSeenOfTheNextTest() => Cases.Sample(
        c =>
        {
            Shortlist shortlist = new Screen([c.Rules]).Run(c.Day);
            foreach (IGrouping<Kind?, FunnelLine> lane in shortlist.Funnel.GroupBy(l => l.Kind))
            {
                FunnelLine[] lines = [.. lane.OrderBy(l => l.Stage)];
                for (int i = 1; i < lines.Length; i++)
                {
                    Assert.Equal(lines[i - 1].Seen - lines[i - 1].Refused, lines[i].Seen);
                    Assert.True(lines[i].Refused >= 0 && lines[i].Seen >= 0);
                }

                if (lane.Key is { } kind)
                {
                    Assert.Equal(shortlist.At(0).Count(x => x.Terms.Kind.Kind == kind), lines[^1].Seen - lines[^1].Refused);
                }
            }
        },
        iter: 100);

    [Fact]
    public void TwoVariants_AreListedTogether_AsEachAlone() => Gen.Select(Cases, Cases).Sample(
        (a, b) =>
        {
            ParityRules other = b.Rules with { Entry = b.Rules.Entry with { MaxSpreadFraction = a.Rules.Entry.MaxSpreadFraction } };
            IEnumerable<string> Alone(ParityRules rules) => new Screen([rules]).Run(a.Day).At(0).Select(Name);
            Assert.Equal(
                Alone(a.Rules).Union(Alone(other)).Order(StringComparer.Ordinal),
                new Screen([a.Rules, other]).Run(a.Day).At(0).Select(Name).Order(StringComparer.Ordinal));
        },
        iter: 100);

    [Fact]
    public void Candidates_StandInTheOrderOfExpiryStrikesAndKind() => Cases.Sample(
        c =>
        {
            ImmutableArray<Candidate> list = new Screen([c.Rules]).Run(c.Day).At(0);
            Assert.Equal(list.OrderBy(x => x.Terms.Expiry).ThenBy(x => x.Terms.Low).ThenBy(x => x.Terms.High).ThenBy(x => x.Terms.Kind.Kind).Select(Name), list.Select(Name));
        },
        iter: 50);

    [Fact]
    public void Bounds_OfThePremium_DecideNothingThatTheGridWouldNot() => Cases.Sample(
        c =>
        {
            // Judged in steps, and by the whole plan at once.
            var entry = new Entry(c.Rules, new Premia());
            foreach (Candidate candidate in new Screen([c.Rules]).Run(c.Day).At(0))
            {
                Judgement judged = entry.Judge(candidate, c.Day, 5);
                PackagePlan plan = entry.Plan(candidate, c.Day, 5);
                double least = Thresholds.Least(c.Rules.Entry, plan.Delivered * plan.DiscountToDelivery, plan.Dates.FundedDays, plan.CostsPerShare);
                Assert.Equal(plan.EdgePerShare < least, judged.Refused == Stage.Edge);
                if (judged.Refused is null)
                {
                    Assert.Equal(plan.EdgePerShare, judged.Plan!.EdgePerShare, 1e-12);
                }
            }
        },
        iter: 60);

    // What passes for certain, what may pass within a hair, and the first failing test of everything else.
    private static (List<string> Certain, List<string> Possible, Dictionary<(Kind, Stage), long> Refused) Walk(MarketDay day, ParityRules rules)
    {
        List<string> certain = [];
        List<string> possible = [];
        Dictionary<(Kind, Stage), long> refused = [];
        Chain chain = day.Day.Snapshots[0].Chains[0];
        var believed = new BelievedFunding(rules.Believed, day.KnownAt(0)).Until(day.Furthest);
        foreach (ExpirySlice slice in chain.Expiries)
        {
            var view = new ExpiryView(rules, day, 0, chain, slice, believed, () => true);
            foreach (PackageKind kind in PackageKinds.All)
            {
                for (int low = slice.Start; low < slice.Start + slice.Count; low++)
                {
                    for (int high = kind.Strikes == 1 ? low : low + 1; high < (kind.Strikes == 1 ? low + 1 : slice.Start + slice.Count); high++)
                    {
                        var terms = new PackageTerms(kind, chain.Root, chain.Underlying, slice.Expiry, new Strike(chain.Columns.Strike[low]), new Strike(chain.Columns.Strike[high]));
                        var candidate = new Candidate(0, terms, view.Dates, chain, low, high);
                        Stage first = First(candidate, view, day, rules);
                        if (first != LegTests.Passed)
                        {
                            refused[(kind.Kind, first)] = refused.GetValueOrDefault((kind.Kind, first)) + 1;
                            continue;
                        }

                        (double edge, double least) = Edge(candidate, view, rules);
                        if (edge >= least + Hair)
                        {
                            certain.Add(Name(candidate));
                        }

                        if (edge >= least - Hair)
                        {
                            possible.Add(Name(candidate));
                        }
                        else
                        {
                            refused[(kind.Kind, Stage.Edge)] = refused.GetValueOrDefault((kind.Kind, Stage.Edge)) + 1;
                        }
                    }
                }
            }
        }

        return (certain, possible, refused);
    }

    private static Stage First(Candidate candidate, ExpiryView view, MarketDay day, ParityRules rules)
    {
        Stage first = view.First(candidate.Terms.Kind.Kind);
        double mid = candidate.Chain.UnderlyingMid;
        bool inRange = candidate.Terms.Kind.HasStock
            ? rules.Packages.Moneyness.Holds(candidate.Terms.Low.PerShare / mid)
            : rules.Packages.BoxWidth.Holds((candidate.Terms.High.Thousandths - candidate.Terms.Low.Thousandths) / 1000.0 / mid);
        first = inRange ? first : (Stage)Math.Min((int)first, (int)Stage.Moneyness);
        foreach (Leg call in candidate.Terms.Kind.Legs.Where(l => l.Of == LegOf.Call))
        {
            Stage leg = LegTests.First(
                candidate.Chain, view.Slice, candidate.RowOf(call), call.Sign < 0, rules.Entry, day.Ages(0, 0), day.Session, view.Dates);
            first = (Stage)Math.Min((int)first, (int)leg);
        }

        return first;
    }

    private static (double Edge, double Least) Edge(Candidate candidate, ExpiryView view, ParityRules rules)
    {
        PackagePlan plan = PackageEdge.Plan(
            new PlanRequest
            {
                Terms = candidate.Terms,
                Dates = view.Dates,
                Units = 1000,
                LegPrices = [.. candidate.Terms.Kind.Legs.Select(l => Prices.Of(candidate.Chain, candidate.RowOf(l), l, rules.Execution, rules.Costs))],
                StockMid = candidate.Chain.UnderlyingMid,
                Dividends = view.Dividends,
                Believed = view.Believed,
                Benchmark = view.Benchmark,
                Fees = Parity.Costs.FeeSchedule.None,
                BorrowFee = 0,
                BorrowBase = 1,
                Withholding = rules.Dividends.Withholding,
                PremiumShort = 0,
                PremiumLongCounted = 0,
            },
            view.Known.Calendar);
        return (plan.EdgePerShare, Thresholds.Least(rules.Entry, plan.Delivered * plan.DiscountToDelivery, plan.Dates.FundedDays));
    }

    private static string Name(Candidate candidate) => candidate.Terms.Key(DateTime.UnixEpoch);

    private static ParityRules RulesOf(double perShare, int thresholds, double width, bool narrow) => TestRules.Plain with
    {
        Entry = TestRules.Plain.Entry with { PerShare = thresholds == 1 ? null : perShare, BpsPerYear = thresholds == 0 ? null : 1000 * perShare },
        Packages = TestRules.Plain.Packages with { BoxWidth = new Between<double>(width, width + 0.1), Moneyness = narrow ? new Between<double>(0.95, 1.1) : new Between<double>(0.7, 1.3) },
        Believed = TestRules.Plain.Believed with { DebitSpreadBps = 40, CreditSpreadBps = 30 },
        Dividends = TestRules.Plain.Dividends with { Withholding = 0.1 },
    };

    private static MarketDay DayOf(int strikes, int dividends, double[] noise, int[] fault)
    {
        // Fair without early exercise, which is quick to make: on the American root reversals then come within reach.
        TestMarket european = Named(ExerciseStyle.European, dividends);
        TestMarket market = Named(ExerciseStyle.American, dividends);
        var pairs = new List<Pair>();
        int at = 0;
        foreach (string expiry in Expiries)
        {
            foreach (Pair fair in FairChain.At(european, Today, expiry, 100, Enumerable.Range(0, strikes).Select(i => 88 + (3.0 * i)), 0.3, 0.03))
            {
                pairs.Add(Disturbed(fair, noise.AsSpan(at, 4), fault.AsSpan(at, 4)));
                at += 4;
            }
        }

        return market.Quote(Today, "10:00", 99.98, 100.02, pairs).DayOf(Today);
    }

    private static TestMarket Named(ExerciseStyle exercise, int dividends)
    {
        TestMarket market = new TestMarket(exercise: exercise).Rate(0.03).Rate(0.05, 30);
        foreach (string ex in new[] { "2025-06-09", "2025-06-23", "2025-07-07", "2025-08-04" }.Take(dividends))
        {
            market.Dividend("2025-05-01", ex, "2025-08-04", 0.25);
        }

        return market;
    }

    // Each side is moved; one in a few loses a side, is crossed or wide.
    private static Pair Disturbed(Pair pair, ReadOnlySpan<double> noise, ReadOnlySpan<int> fault)
    {
        const double Most = 0.15;
        Pair moved = pair with
        {
            CallBid = Math.Max(0.01, pair.CallBid + (Most * Math.Min(noise[0], 0))),
            CallAsk = pair.CallAsk + (Most * noise[1]),
            PutBid = Math.Max(0.01, pair.PutBid + (Most * noise[2])),
            PutAsk = pair.PutAsk + (Most * Math.Max(noise[3], 0)),
        };
        return (fault[0], fault[1]) switch
        {
            (0, < 4) => moved with { CallBid = double.NaN },
            (0, _) => moved with { PutAsk = double.NaN },
            (1, < 4) => moved with { CallAsk = moved.CallAsk * 2 },
            (1, _) => moved with { PutBid = moved.PutBid / 2 },
            _ => moved,
        };
    }
}

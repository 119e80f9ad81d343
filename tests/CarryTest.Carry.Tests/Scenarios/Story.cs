using System.Collections.Immutable;
using CarryTest.Carry.Attribution;
using CarryTest.Carry.Day;
using CarryTest.Carry.Positions;
using CarryTest.Carry.Rules;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Ledgers;

namespace CarryTest.Carry.Tests.Scenarios;

/// <summary>One package placed by hand and lived through day by day: quotes are given for the days on which they matter and stand until the next.</summary>
internal sealed class Story
{
    private readonly List<(DateOnly Date, TimeOnly Time, double Bid, double Ask, PairQuote[] Pairs)> _quotes = [];
    private readonly List<Dividend> _dividends = [];
    private readonly List<RateQuote> _rates = [];
    private readonly List<BorrowTerms> _borrow = [];
    private readonly List<SettlementValue> _settlements = [];
    private readonly List<OfficialClose> _closes = [];

    public Story(string symbol, string root, UnderlyingKind kind = UnderlyingKind.Equity, ExerciseStyle exercise = ExerciseStyle.American, SettlementStyle settles = SettlementStyle.Shares)
    {
        Underlying = new Underlying(symbol, symbol, kind, "new-york", "USD");
        Root = new OptionRoot(root, symbol, exercise, settles, 100, 100, 0);
    }

    public Underlying Underlying { get; }

    public OptionRoot Root { get; }

    public RecordingLedger Ledger { get; } = new();

    public Package Package { get; private set; } = null!;

    public BookRules Rules { get; set; } = new()
    {
        Funding = new FundingSettings { Believed = Flat(0.044, 60, 40), Charged = Flat(0.044, 60, 40) },
        Costs = new CostSettings { Schedule = TestFees },
        Capital = new Margin.CapitalSettings { Margin = Margin.MarginMethod.House },
        Packages = new PackageSettings { Kinds = [] },
    };

    /// <summary>0.50 a contract, 0.0035 a share, 0.25 a contract exercised or assigned, 20 per million of sales, rounded up.</summary>
    public static FeeSchedule TestFees { get; } = new([
        Fee("commission", FeeApplies.EquityOption, FeeSide.Both, FeeBasis.Contract, 0.50),
        Fee("commission", FeeApplies.IndexOption, FeeSide.Both, FeeBasis.Contract, 0.50),
        Fee("commission", FeeApplies.Stock, FeeSide.Both, FeeBasis.Share, 0.0035),
        Fee("exercise", FeeApplies.Delivery, FeeSide.Both, FeeBasis.Contract, 0.25),
        Fee("sale", FeeApplies.Stock, FeeSide.Sell, FeeBasis.Notional, 20e-6, FeeRounding.Up),
        Fee("sale", FeeApplies.EquityOption, FeeSide.Sell, FeeBasis.Notional, 20e-6, FeeRounding.Up),
        Fee("sale", FeeApplies.Delivery, FeeSide.Sell, FeeBasis.Notional, 20e-6, FeeRounding.Up),
    ]);

    public static FundingAssumption Flat(double rate, double debit, double credit) =>
        new() { Kind = FundingKind.Flat, Rate = rate, DebitSpreadBps = debit, CreditSpreadBps = credit };

    public static DateOnly On(string text) => DateOnly.ParseExact(text, "yyyy-MM-dd");

    public Story Dividend(string declared, string ex, string paid, double amount)
    {
        _dividends.Add(new Dividend(Underlying.Symbol, On(declared), On(ex), On(ex), On(paid), amount, DividendKind.Ordinary, false));
        return this;
    }

    public Story Rate(string from, double overnight)
    {
        _rates.Add(new RateQuote(On(from), 1, overnight));
        return this;
    }

    public Story Borrow(string from, double fee)
    {
        _borrow.Add(new BorrowTerms(Underlying.Symbol, On(from), fee, null, false));
        return this;
    }

    public Story Settlement(string expiry, double price)
    {
        _settlements.Add(new SettlementValue(Root.Root, On(expiry), price));
        return this;
    }

    public Story Close(string date, double price)
    {
        _closes.Add(new OfficialClose(Underlying.Symbol, On(date), price));
        return this;
    }

    /// <summary>Quotes of a snapshot, exchange time.</summary>
    public Story Quote(string date, string time, double bid, double ask, params PairQuote[] pairs)
    {
        _quotes.Add((On(date), TimeOnly.Parse(time, System.Globalization.CultureInfo.InvariantCulture), bid, ask, pairs));
        return this;
    }

    /// <summary>Places the package after the close of its trade date and lives until a day; returns the settled balance after each day's settlements.</summary>
    public Dictionary<DateOnly, Cash> Live(
        Kind kind, double low, double high, string expiry, string tradedOn, int units, double stockMid, double[] prices, string until,
        double premium = 0, double borrowFee = 0, ExpectedDividend[]? expected = null)
    {
        ReferenceTables tables = Tables();
        var book = new Book(Rules, tables, new Premia(), Ledger);
        TradingCalendar calendar = tables.Calendar;
        var cycle = new SettlementCycle(calendar);
        DateOnly first = On(tradedOn);
        var balances = new Dictionary<DateOnly, Cash>();
        MarketDay? market = null;
        for (DateOnly date = first; date <= On(until); date = calendar.NextTradingDay(date))
        {
            market = MarketDay.Of(DayOf(date), market, tables, cycle);
            book.Run(market, new Screen([ParityRules()]).Run(market));
            if (date == first)
            {
                Place(book, tables, cycle, kind, low, high, On(expiry), date, units, stockMid, prices, premium, borrowFee, expected);
            }

            balances[date] = book.State.Packages.Count == 0 ? Ledger.Packages.Single().RealisedProfit!.Value : book.State.Packages[0].Balance;
        }

        book.Finish();
        return balances;
    }

    private void Place(
        Book book, ReferenceTables tables, SettlementCycle cycle, Kind kind, double low, double high, DateOnly expiry, DateOnly tradedOn, int units, double stockMid, double[] prices,
        double premium, double borrowFee, ExpectedDividend[]? expected)
    {
        var knowledge = Knowledge.Of(tables, tradedOn, TradingCalendar.ToUtc(tradedOn, new TimeOnly(15, 45)));
        var believed = new BelievedFunding(Rules.Funding.Believed, knowledge);
        var terms = new PackageTerms(PackageKinds.Of(kind), Root, Underlying, expiry, Strike.Of(low), Strike.Of(high));
        var dates = ExpiryTerms.Of(Root, expiry, tradedOn, cycle, tables.Calendar);
        PackagePlan plan = PackageEdge.Plan(
            new PlanRequest
            {
                Terms = terms,
                Dates = dates,
                Units = units,
                LegPrices = [.. prices],
                StockMid = stockMid,
                Dividends = expected is null ? ExpectedDividends.Of(knowledge, Underlying, Rules.Dividends with { Forecast = DividendForecastKind.None }, dates.Expiry) : [.. expected],
                Believed = believed,
                Benchmark = BelievedFunding.Benchmark(knowledge),
                Fees = Rules.Costs.Schedule,
                BorrowFee = borrowFee,
                BorrowBase = 1,
                Withholding = 0,
                PremiumShort = premium,
                PremiumLongCounted = 0,
            },
            tables.Calendar);
        PlanPath path = PlanPath.Run(plan, believed, tables.Calendar);
        Package = Opening.Book(
            book.State, plan, path, path.ExpectedProfit, terms.Key(knowledge.Instant), knowledge.Instant, plan.EdgePerShare, knowledge.Instant, tradedOn, Cash.Zero);
    }

    private ParityRules ParityRules() => new(Rules.Packages, Rules.Entry, Rules.Execution, Rules.Costs, Rules.Funding.Believed, Rules.Dividends, 1);

    private ReferenceTables Tables() => new()
    {
        Calendar = TradingCalendar.NewYork,
        Underlyings = [Underlying],
        Roots = [Root],
        Dividends = [.. _dividends],
        Rates = [new RateQuote(new DateOnly(2020, 1, 1), 1, 0.044), .. _rates],
        Borrow = [.. _borrow],
        CorporateActions = [],
        Settlements = [.. _settlements],
        Closes = [.. _closes],
    };

    private TradingDay DayOf(DateOnly date) => new(
        date,
        [.. _quotes.Where(q => q.Date == date).OrderBy(q => q.Time).Select(q => new Snapshot(TradingCalendar.ToUtc(date, q.Time), [ChainOf(q.Bid, q.Ask, q.Pairs)]))]);

    private Chain ChainOf(double bid, double ask, PairQuote[] pairs)
    {
        PairQuote[] sorted = [.. pairs.OrderBy(p => p.Expiry).ThenBy(p => p.Strike)];
        var slices = ImmutableArray.CreateBuilder<ExpirySlice>();
        for (int i = 0; i < sorted.Length; i++)
        {
            if (i == 0 || sorted[i].Expiry != sorted[i - 1].Expiry)
            {
                slices.Add(new ExpirySlice(On(sorted[i].Expiry), i, sorted.Count(p => p.Expiry == sorted[i].Expiry)));
            }
        }

        return new Chain
        {
            Root = Root,
            Underlying = Underlying,
            UnderlyingBid = bid,
            UnderlyingAsk = ask,
            Expiries = slices.ToImmutable(),
            Columns = new StrikeColumns
            {
                Count = sorted.Length,
                Strike = [.. sorted.Select(p => Strike.Of(p.Strike).Thousandths)],
                CallBid = [.. sorted.Select(p => p.CallBid)],
                CallAsk = [.. sorted.Select(p => p.CallAsk)],
                PutBid = [.. sorted.Select(p => p.PutBid)],
                PutAsk = [.. sorted.Select(p => p.PutAsk)],
            },
        };
    }

    private static FeeRow Fee(string line, FeeApplies applies, FeeSide side, FeeBasis basis, double rate, FeeRounding rounding = FeeRounding.Nearest) =>
        new() { Line = line, AppliesTo = applies, Side = side, Basis = basis, Rate = rate, Rounding = rounding, Source = "made up for these scenarios" };
}

/// <summary>The quotes of one pair; NaN = none.</summary>
internal sealed record PairQuote(string Expiry, double Strike, double CallBid = double.NaN, double CallAsk = double.NaN, double PutBid = double.NaN, double PutAsk = double.NaN);

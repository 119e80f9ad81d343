using CarryTest.Carry.Journal;
using CarryTest.Carry.Rules;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Reports.Runs;
using CarryTest.Studies;

namespace CarryTest.Reports.Tests.Samples;

/// <summary>A made-up run over a year, small and consistent: its journal balances, its cash flows and its lines add up, its funnel is conserved.</summary>
internal sealed class SampleRun
{
    private static readonly string[] Names = ["BRIXAMO", "TOLVENA", "HARNEKO", "SELDORI", "MUNDEX"];
    private readonly List<PostingRow> _journal = [];
    private readonly List<TradeRow> _trades = [];
    private readonly List<EventRow> _events = [];
    private readonly List<PackageRow> _packages = [];
    private readonly List<EquityRow> _equity = [];
    private readonly List<FunnelRow> _funnel = [];
    private readonly List<(DateOnly On, Action Do)> _agenda = [];
    private readonly Dictionary<int, DateOnly> _ended = [];
    private long _transaction;

    public SampleRun(int packages = 62, string? hostile = null, int days = 261)
    {
        Capital = new Cash(2_000_000_00);
        DateOnly first = new(2025, 1, 2);
        Days = [.. Enumerable.Range(0, 400).Select(first.AddDays).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).Take(days)];
        Post(first, 0, Cause.Opening, (Accounts.Cash, Capital, null, null, 0), (Accounts.Capital, -Capital, null, null, 0));
        for (int n = 1; n <= packages; n++)
        {
            Plan(n, hostile is not null && n % 7 == 0 ? hostile : Names[n % 4], packages);
        }

        foreach ((DateOnly _, Action act) in _agenda.OrderBy(a => a.On))
        {
            act();
        }

        Equity();
        Funnel(packages);
    }

    public Cash Capital { get; }

    public DateOnly[] Days { get; }

    public IReadOnlyList<PackageRow> Packages => _packages;

    public IReadOnlyList<TradeRow> Trades => _trades;

    public IReadOnlyList<PostingRow> Journal => _journal;

    public IReadOnlyList<EquityRow> EquityRows => _equity;

    public IReadOnlyList<EventRow> Events => _events;

    public IReadOnlyList<FunnelRow> FunnelRows => _funnel;

    public RunLedger Ledger => new([.. _packages.OrderBy(p => p.Package)], _trades, _journal, _equity, _events, _funnel);

    public static RunFacts Facts(SampleRun run, int? delay = 1, string? hostile = null) => new()
    {
        Name = "sample",
        Version = "0.1.0",
        Platform = "test platform",
        RuleBook = new RuleBook
        {
            Name = "sample",
            History = new HistorySettings { Folder = "/somewhere/history" },
            Book = new BookRules { Execution = new Parity.Fills.ExecutionSettings { DelayWritten = delay } },
            Text = $"name = \"sample\"\n[history]\nfolder = \"history\" # {hostile}\n",
            Effective = [("name", "\"sample\"", true), ("history.folder", "\"history\"", true), ("entry.per_share", "0.02", false), ("execution.delay", delay?.ToString(System.Globalization.CultureInfo.InvariantCulture) ?? "1", delay is not null)],
        },
        InitialCapital = run.Capital,
        FirstDay = run.Days[0],
        LastDay = run.Days[^1],
        RowsRead = 812_345,
        InputFiles = [new InputFile("chains/root=BRIXAMO/2025.parquet", 1_234_567, new string('a', 64))],
        Findings = [new FindingFact("crossed", "warning", "a bid lies above its ask", 17, [$"/somewhere/history/chains/root=BRIXAMO/2025.parquet, row group 3, row 12{hostile}"])],
        Notes = ["the history has no displayed sizes of the stock" + hostile],
        DayWarnings = [],
        ExitHints = [],
        Counts = [("snapshots", 783), ("grids solved", 1204)],
    };

    public void WriteTo(ILedger ledger)
    {
        _packages.ForEach(ledger.Write);
        _trades.ForEach(ledger.Write);
        _journal.ForEach(ledger.Write);
        _equity.ForEach(ledger.Write);
        _events.ForEach(ledger.Write);
        _funnel.ForEach(ledger.Write);
    }

    // A number in [0, 1) that depends on its keys alone.
    private static double Draw(int a, int b)
    {
        uint x = unchecked(((uint)a * 2654435761u) ^ ((uint)b * 40503u) ^ 0x9e3779b9u);
        x = unchecked((x ^ (x >> 15)) * 2246822519u);
        x = unchecked((x ^ (x >> 13)) * 3266489917u);
        return (x ^ (x >> 16)) / 4294967296.0;
    }

    private static DateOnly Settled(DateOnly on) => on.DayOfWeek == DayOfWeek.Friday ? on.AddDays(3) : on.AddDays(1);

    private void Plan(int n, string symbol, int packages)
    {
        int day = (int)(2 + ((Days.Length - 8.0) * n / (packages + 1)));
        DateOnly filled = Days[day];
        int life = 20 + (int)(40 * Draw(n, 1));
        DateOnly ends = day + life < Days.Length - 2 ? Days[day + life] : filled.AddDays((7 * life / 5) + 10);
        Kind kind = (Kind)(n % 4);
        bool box = kind is Kind.LongBox or Kind.ShortBox;
        bool open = day + life >= Days.Length - 2;
        bool pinned = !open && !box && n % 13 == 0;
        bool assigned = !open && !pinned && n % 9 == 0;
        double strike = 50 + (5 * (n % 11));
        double high = strike + 10;
        int units = 2 + (n % 9);
        int sign = kind is Kind.Conversion or Kind.LongBox ? 1 : -1;
        double pays = box ? high - strike : strike;
        double edge = 0.03 + (0.12 * Draw(n, 2) * Draw(n, 3));
        double years = (ends.DayNumber - filled.DayNumber) / 360.0;
        double netPerShare = (pays * (1 - (0.045 * years))) - (sign * edge);
        double stock = strike * (0.97 + (0.06 * Draw(n, 4)));
        double call = 4 + (2 * Draw(n, 5));
        double put = box ? 3 + Draw(n, 6) : netPerShare - stock + call;
        double callHigh = box ? 1 + Draw(n, 7) : double.NaN;
        double putHigh = box ? netPerShare - call + put + callHigh : double.NaN;
        DateTime at = filled.ToDateTime(new TimeOnly(18, 0), DateTimeKind.Utc);
        long shares = 100L * units;
        (string Account, string Instrument, long Quantity, double Price, Right? Right, double Strike)[] legs = box
            ?
            [
                ($"option:{symbol}", "", sign * units, call, Right.Call, strike), ($"option:{symbol}", "", -sign * units, put, Right.Put, strike),
                ($"option:{symbol}", "", -sign * units, callHigh, Right.Call, high), ($"option:{symbol}", "", sign * units, putHigh, Right.Put, high),
            ]
            : [($"stock:{symbol}", symbol, sign * shares, stock, null, 0), ($"option:{symbol}", "", sign * units, put, Right.Put, strike), ($"option:{symbol}", "", -sign * units, call, Right.Call, strike)];
        Cash[] amounts = [.. legs.Select(l => Cash.Round(-l.Quantity * (l.Right is null ? 1 : 100) * l.Price))];
        Cash fees = Cash.Round(0.65 * units * (legs.Length - (box ? 0 : 1)));
        Cash debit = -amounts.Total() + fees;
        DateOnly settles = Settled(filled);
        _agenda.Add((filled, () =>
        {
            var postings = new List<(string, Cash, DateOnly?, string?, long)>();
            for (int i = 0; i < legs.Length; i++)
            {
                string instrument = legs[i].Right is { } r ? $"{symbol} {ends:yyyy-MM-dd} {legs[i].Strike} {(r == Right.Call ? "call" : "put")}" : symbol;
                postings.Add((legs[i].Account, -amounts[i], null, instrument, legs[i].Quantity));
                postings.Add((Accounts.Unsettled, amounts[i], settles, null, 0));
                _trades.Add(new TradeRow
                {
                    Package = n,
                    Leg = i,
                    Action = TradeAction.Open,
                    BookedOn = filled,
                    TradedOn = filled,
                    TradedAt = at,
                    SettlesOn = settles,
                    Instrument = symbol,
                    Right = legs[i].Right,
                    Strike = legs[i].Right is null ? null : Strike.Of(legs[i].Strike),
                    Expiry = legs[i].Right is null ? null : ends,
                    Quantity = legs[i].Quantity,
                    Price = legs[i].Price,
                    Notional = amounts[i],
                    Fees = i == 0 ? fees : Cash.Zero,
                });
            }

            Post(filled, n, Cause.Plan, [.. postings]);
            Post(filled, n, Cause.Fees, (Accounts.Unsettled, -fees, settles, null, 0), (Accounts.Fee("commission"), fees, null, null, 0));
        }
        ));
        _agenda.Add((settles, () =>
        {
            Post(settles, n, Cause.Plan, (Accounts.Cash, amounts.Total(), null, null, 0), (Accounts.Unsettled, -amounts.Total(), settles, null, 0));
            Post(settles, n, Cause.Fees, (Accounts.Cash, -fees, null, null, 0), (Accounts.Unsettled, fees, settles, null, 0));
        }
        ));
        Cash shock = assigned ? Cash.Round(-40 - (2000 * Draw(n, 8))) : pinned ? Cash.Round(-100 - (900 * Draw(n, 9))) : Cash.Zero;
        Cash received = Cash.Round(sign * pays * shares) + shock;
        Cash interest = Cash.Round(-debit.ToDouble() * 0.046 * years);
        Cash realised = received - debit + interest;
        Cash rates = Cash.Round((Draw(n, 10) - 0.5) * 30);
        Cash fill = Cash.Round((Draw(n, 11) - 0.6) * 60);
        Cash dividends = n % 5 == 0 ? Cash.Round((Draw(n, 12) - 0.7) * 200) : Cash.Zero;
        var lines = new AttributionLines(fill, Cash.Zero, dividends, rates, Cash.Zero, kind == Kind.Reversal ? Cash.Round(-20 * Draw(n, 13)) : Cash.Zero, assigned ? shock : Cash.Zero, pinned ? shock : Cash.Zero, Cash.Zero, Cash.Zero, Cash.Zero);
        DateOnly paid = Settled(ends);
        var row = new PackageRow
        {
            Package = n,
            PackageKey = $"{symbol}|{kind}|{ends:yyyyMMdd}|{strike}|{at:O}",
            Underlying = symbol,
            Root = symbol,
            Kind = kind,
            Expiry = ends,
            StrikeLow = Strike.Of(strike),
            StrikeHigh = box ? Strike.Of(high) : null,
            Units = units,
            Multiplier = 100,
            DecidedAt = at.AddMinutes(-30),
            FilledAt = at,
            FillStock = box ? double.NaN : stock,
            FillCallLow = call,
            FillPutLow = put,
            FillCallHigh = callHigh,
            FillPutHigh = putHigh,
            EdgeDecided = edge * 1.1,
            EdgeFilled = edge,
            PremiumShort = 0.01 * Draw(n, 14),
            ImpliedRate = 0.045 + (edge / pays / years),
            FundingRate = 0.046,
            CashTiedUp = debit > Cash.Zero ? debit : -debit,
            Margin = Cash.Round(0.15 * stock * shares),
            ReturnOnCapital = double.NaN,
            ExpectedProfit = realised - lines.Sum,
            Ending = Ending.Open,
            Attribution = default,
        };
        _events.Add(new EventRow(filled, n, symbol, EventKind.Dividend, 100, 12.5, "ordinary dividend of 0.125 a share"));
        _ended[n] = open ? DateOnly.MaxValue : ends;
        if (open)
        {
            _agenda.Add((DateOnly.MaxValue, () => _packages.Add(row with { OpenMid = Cash.Round(5), OpenCarry = Cash.Round(25) })));
            return;
        }

        _agenda.Add((ends, () => End(n, symbol, legs, amounts, ends, paid, received, strike, assigned, pinned)));
        _agenda.Add((paid, () =>
        {
            Cause cause = assigned ? Cause.Early : pinned ? Cause.Expiry : Cause.Plan;
            Post(paid, n, cause, (Accounts.Cash, received, null, null, 0), (Accounts.Unsettled, -received, paid, null, 0));
            Post(paid, n, Cause.Funding, (Accounts.Cash, interest, null, null, 0), (interest < Cash.Zero ? Accounts.InterestPaid : Accounts.InterestEarned, -interest, null, null, 0));
            _packages.Add(row with
            {
                RealisedProfit = realised,
                Ending = assigned ? Ending.Assigned : Ending.Expired,
                EndedOn = ends,
                Attribution = lines,
                ReturnOnCapital = realised.ToDouble() / row.CashTiedUp.ToDouble() / years,
            });
        }
        ));
    }

    private void End(
        int n, string symbol, (string Account, string Instrument, long Quantity, double Price, Right? Right, double Strike)[] legs, Cash[] amounts, DateOnly ends, DateOnly paid, Cash received, double strike, bool assigned, bool pinned)
    {
        var postings = new List<(string, Cash, DateOnly?, string?, long)>();
        for (int i = 0; i < legs.Length; i++)
        {
            postings.Add((legs[i].Account, amounts[i], null, symbol, -legs[i].Quantity));
        }

        postings.Add((Accounts.Unsettled, received, paid, null, 0));
        postings.Add((Accounts.TradingGain, -received - amounts.Total(), null, null, 0));
        Post(ends, n, assigned ? Cause.Early : pinned ? Cause.Expiry : Cause.Plan, [.. postings]);
        _events.Add(new EventRow(ends, n, symbol, assigned ? EventKind.Assignment : pinned ? EventKind.Pin : EventKind.Expiry, 3, strike, assigned ? "calls assigned before the ex-date" : "the close lay at the strike"));
    }

    private void Post(DateOnly on, int package, Cause cause, params (string Account, Cash Amount, DateOnly? SettlesOn, string? Instrument, long Quantity)[] postings)
    {
        _transaction++;
        foreach ((string account, Cash amount, DateOnly? settlesOn, string? instrument, long quantity) in postings)
        {
            _journal.Add(new PostingRow(on, _transaction, account, package, cause, amount, settlesOn, instrument, quantity));
        }
    }

    private void Equity()
    {
        Cash last = Capital;
        Cash idle = Cash.Zero;
        Cash netting = Cash.Zero;
        Cash tiedUpBefore = Cash.Zero;
        for (int i = 0; i < Days.Length; i++)
        {
            DateOnly day = Days[i];
            PostingRow[] sofar = [.. _journal.Where(p => p.Date <= day)];
            Cash cash = sofar.Where(p => p.Account == Accounts.Cash).Total(p => p.Amount);
            Cash unsettled = sofar.Where(p => p.Account == Accounts.Unsettled).Total(p => p.Amount);
            Cash stock = sofar.Where(p => p.Account.StartsWith("stock:", StringComparison.Ordinal)).Total(p => p.Amount);
            PackageRow[] open = [.. _packages.Where(p => DateOnly.FromDateTime(p.FilledAt) <= day && _ended[p.Package] > day)];
            Cash options = sofar.Where(p => p.Account.StartsWith("option:", StringComparison.Ordinal)).Total(p => p.Amount) + Cash.Round(open.Length * 40 * (Draw(i, 20) - 0.5));
            idle += Cash.Round(i == 0 ? 0 : 95 + (i % 3));
            netting += Cash.Round(i == 0 ? 0 : 1.1);
            Cash mid = cash + unsettled + stock + options + idle + netting;
            Cash tiedUp = open.Total(p => p.CashTiedUp);
            _equity.Add(new EquityRow
            {
                Date = day,
                CashSettled = cash,
                Unsettled = unsettled,
                Accrued = idle + netting,
                DividendsDue = Cash.Zero,
                StockValue = stock,
                OptionValueMid = options,
                EquityMid = mid,
                EquityLiquidation = mid - Cash.Round(open.Length * 130),
                EquityCarry = mid + Cash.Round(open.Length * 35),
                Requirement = open.Total(p => p.Margin),
                FreeCapital = mid - open.Total(p => p.Margin),
                CashTiedUp = tiedUp,
                PackagesOpen = open.Length,
                ProfitPackages = mid - Capital - idle - netting,
                ProfitNetting = netting,
                ProfitIdle = idle,
                BorrowFees = Cash.Round(i * 0.31),
                Fees = sofar.Where(p => Accounts.IsFee(p.Account)).Total(p => p.Amount),
                PnlDay = mid - last,
                BenchmarkOnTiedUp = Cash.Round(tiedUpBefore.ToDouble() * 0.043 / 360),
            });
            last = mid;
            tiedUpBefore = tiedUp;
        }
    }

    private void Funnel(int packages)
    {
        int opened = 0;
        for (int i = 0; i < Days.Length; i++)
        {
            int today = (int)((long)packages * (i + 1) / Days.Length) - opened;
            opened += today;
            Lane(Days[i], null, 3000 + (i % 50), (int)Stage.Stale, 0, i);
            foreach (Kind kind in Enum.GetValues<Kind>())
            {
                Lane(Days[i], kind, 2500, (int)Stage.Opened, kind == Kind.Conversion ? today : 0, i);
            }
        }
    }

    private void Lane(DateOnly day, Kind? kind, long seen, int last, long opened, int salt)
    {
        for (int s = 0; s <= last; s++)
        {
            long refused = s == (int)Stage.Opened ? 0 : kind is not null && s == (int)Stage.EdgeGone ? seen - opened : (long)((seen - opened) * 0.3 * Draw(s, salt));
            _funnel.Add(new FunnelRow(day, Names[0], kind, (Stage)s, seen, refused));
            seen -= refused;
        }
    }
}

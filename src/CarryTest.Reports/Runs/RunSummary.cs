using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Parity.Screening;

namespace CarryTest.Reports.Runs;

/// <summary>The figures that a run is judged by. What is open is never counted as realised.</summary>
public sealed record RunSummary
{
    private const double DaysPerYear = 360;

    /// <summary>What the book started with.</summary>
    public required Cash InitialCapital { get; init; }

    /// <summary>Packages opened.</summary>
    public required int Opened { get; init; }

    /// <summary>Packages that are final.</summary>
    public required int Closed { get; init; }

    /// <summary>Packages that are final and lost.</summary>
    public required int Lost { get; init; }

    /// <summary>What the packages that lost have lost together, negative.</summary>
    public required Cash LostTogether { get; init; }

    /// <summary>Packages that the end of the history found open.</summary>
    public int Open => Opened - Closed;

    /// <summary>Profit expected of the packages that are final.</summary>
    public required Cash Expected { get; init; }

    /// <summary>Profit realised by the packages that are final.</summary>
    public required Cash Realised { get; init; }

    /// <summary>Profit so far of open packages, marked at mid.</summary>
    public required Cash OpenMid { get; init; }

    /// <summary>Profit so far of open packages, at the present value of what is still due.</summary>
    public required Cash OpenCarry { get; init; }

    /// <summary>What the account's net balance cost or earned beyond the packages one by one.</summary>
    public required Cash Netting { get; init; }

    /// <summary>Interest on capital that no package used.</summary>
    public required Cash Idle { get; init; }

    /// <summary>Fees paid, positive.</summary>
    public required Cash Fees { get; init; }

    /// <summary>Borrow fees paid, positive.</summary>
    public required Cash BorrowFees { get; init; }

    /// <summary>Equity at the end: mid, liquidation, carry.</summary>
    public required (Cash Mid, Cash Liquidation, Cash Carry) Equity { get; init; }

    /// <summary>Cash tied up, averaged over calendar days.</summary>
    public required Cash AverageTiedUp { get; init; }

    /// <summary>The most cash that was tied up at a close, and when first.</summary>
    public required (Cash Amount, DateOnly? On) MostTiedUp { get; init; }

    /// <summary>The highest margin requirement at a close, and when first.</summary>
    public required (Cash Amount, DateOnly? On) MostRequired { get; init; }

    /// <summary>Cash tied up times the years that it was, actual/360: what returns are measured on, in currency x years.</summary>
    public required double CapitalYears { get; init; }

    /// <summary>What the benchmark's overnight rate would have earned on the cash tied up.</summary>
    public required Cash Benchmark { get; init; }

    /// <summary>Realised profit with open packages at the carry mark, on the cash tied up, a fraction a year; NaN where nothing was tied up.</summary>
    public double ReturnOnTiedUp => CapitalYears > 0 ? (Realised + OpenCarry).ToDouble() / CapitalYears : double.NaN;

    /// <summary>The benchmark's average rate on the cash tied up, a fraction a year; NaN where nothing was tied up.</summary>
    public double BenchmarkRate => CapitalYears > 0 ? Benchmark.ToDouble() / CapitalYears : double.NaN;

    /// <summary>The deepest fall of equity at mid below its highest value before, negative or zero, and the days of that height and depth.</summary>
    public required (Cash Amount, DateOnly? From, DateOnly? To) Drawdown { get; init; }

    /// <summary>The package that realised least; null where none is final.</summary>
    public required PackageRow? Worst { get; init; }

    /// <summary>How many packages ended how, in the order of the words.</summary>
    public required IReadOnlyList<(Ending Ending, int Count)> Endings { get; init; }

    /// <summary>The lines from expected to realised, summed over the packages that are final.</summary>
    public required AttributionLines Attribution { get; init; }

    /// <summary>Pairs of options that the first test saw.</summary>
    public required long PairsSeen { get; init; }

    /// <summary>Of a ledger.</summary>
    public static RunSummary Of(RunLedger ledger, Cash initialCapital)
    {
        PackageRow[] final = [.. ledger.Packages.Where(p => p.RealisedProfit is not null)];
        PackageRow[] open = [.. ledger.Packages.Where(p => p.RealisedProfit is null)];
        EquityRow? last = ledger.Equity.Count > 0 ? ledger.Equity[^1] : null;
        (double years, Cash average) = TiedUp(ledger.Equity);
        return new RunSummary
        {
            InitialCapital = initialCapital,
            Opened = ledger.Packages.Count,
            Closed = final.Length,
            Lost = final.Count(p => p.RealisedProfit < Cash.Zero),
            LostTogether = final.Where(p => p.RealisedProfit < Cash.Zero).Total(p => p.RealisedProfit!.Value),
            Expected = final.Total(p => p.ExpectedProfit),
            Realised = final.Total(p => p.RealisedProfit!.Value),
            OpenMid = open.Total(p => p.OpenMid ?? Cash.Zero),
            OpenCarry = open.Total(p => p.OpenCarry ?? Cash.Zero),
            Netting = last?.ProfitNetting ?? Cash.Zero,
            Idle = last?.ProfitIdle ?? Cash.Zero,
            Fees = last?.Fees ?? Cash.Zero,
            BorrowFees = last?.BorrowFees ?? Cash.Zero,
            Equity = last is null ? (initialCapital, initialCapital, initialCapital) : (last.EquityMid, last.EquityLiquidation, last.EquityCarry),
            AverageTiedUp = average,
            MostTiedUp = Most(ledger.Equity, e => e.CashTiedUp),
            MostRequired = Most(ledger.Equity, e => e.Requirement),
            CapitalYears = years,
            Benchmark = ledger.Equity.Total(e => e.BenchmarkOnTiedUp),
            Drawdown = DeepestFall(ledger.Equity, initialCapital),
            Worst = final.MinBy(p => p.RealisedProfit!.Value),
            Endings = [.. Enum.GetValues<Ending>().Select(e => (e, ledger.Packages.Count(p => p.Ending == e)))],
            Attribution = Sum(final),
            PairsSeen = ledger.Funnel.Where(f => f.Kind is null && f.Stage == Stage.Quoted).Sum(f => f.Seen),
        };
    }

    private static (double Years, Cash Average) TiedUp(IReadOnlyList<EquityRow> equity)
    {
        double currencyDays = 0;
        int days = 0;
        for (int i = 1; i < equity.Count; i++)
        {
            int nights = equity[i].Date.DayNumber - equity[i - 1].Date.DayNumber;
            currencyDays += equity[i - 1].CashTiedUp.ToDouble() * nights;
            days += nights;
        }

        return (currencyDays / DaysPerYear, days == 0 ? Cash.Zero : Cash.Round(currencyDays / days));
    }

    private static (Cash Amount, DateOnly? On) Most(IReadOnlyList<EquityRow> equity, Func<EquityRow, Cash> amountOf)
    {
        (Cash Amount, DateOnly? On) most = (Cash.Zero, null);
        foreach (EquityRow row in equity)
        {
            most = amountOf(row) > most.Amount ? (amountOf(row), row.Date) : most;
        }

        return most;
    }

    private static (Cash Amount, DateOnly? From, DateOnly? To) DeepestFall(IReadOnlyList<EquityRow> equity, Cash initialCapital)
    {
        (Cash Amount, DateOnly? From, DateOnly? To) deepest = (Cash.Zero, null, null);
        Cash height = initialCapital;
        DateOnly? on = null;
        foreach (EquityRow row in equity)
        {
            if (row.EquityMid >= height)
            {
                height = row.EquityMid;
                on = row.Date;
            }

            deepest = row.EquityMid - height < deepest.Amount ? (row.EquityMid - height, on ?? equity[0].Date, row.Date) : deepest;
        }

        return deepest;
    }

    private static AttributionLines Sum(PackageRow[] packages) => new(
        packages.Total(p => p.Attribution.Fill),
        packages.Total(p => p.Attribution.Fees),
        packages.Total(p => p.Attribution.Dividends),
        packages.Total(p => p.Attribution.FundingRates),
        packages.Total(p => p.Attribution.FundingBalances),
        packages.Total(p => p.Attribution.Borrow),
        packages.Total(p => p.Attribution.EarlyExercise),
        packages.Total(p => p.Attribution.Expiry),
        packages.Total(p => p.Attribution.RecallAndUnwind),
        packages.Total(p => p.Attribution.CorporateActions),
        packages.Total(p => p.Attribution.Rounding));
}

using CarryTest.Carry.Assignment;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Rules;
using CarryTest.Market.Money;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Studies.Pass;
using CarryTest.Testing.Ledgers;

namespace CarryTest.Studies.Tests.Pass;

/// <summary>What must hold of every book, on a small invented history and under rules that bring about every event.</summary>
public sealed class BooksOfAPassTests(InventedHistory history)
{
    public static TheoryData<string> Variants => ["eager", "no delay", "keep", "cover", "close", "half assigned", "strategy margin", "no netting"];

    [Theory]
    [MemberData(nameof(Variants))]
    public void Journal_EveryTransactionBalances_AndFinalPackagesCloseTheirAccounts(string variant)
    {
        RecordingLedger ledger = history.Of(variant, RulesOf(variant));
        Assert.All(ledger.Postings.GroupBy(p => p.Transaction), t => Assert.Equal(Cash.Zero, t.Total(p => p.Amount)));
        foreach (PackageRow package in Final(ledger))
        {
            PostingRow[] own = [.. ledger.Postings.Where(p => p.Package == package.Package)];
            Assert.Equal(-package.RealisedProfit!.Value, own.Where(p => Accounts.IsProfit(p.Account)).Total(p => p.Amount));
            Assert.All(own.Where(p => !Accounts.IsProfit(p.Account) && p.Account != Accounts.Cash).GroupBy(p => p.Account), a => Assert.Equal(Cash.Zero, a.Total(p => p.Amount)));
            Assert.All(own.Where(p => p.Instrument is not null).GroupBy(p => p.Instrument), i => Assert.Equal(0, i.Sum(p => p.Quantity)));
        }
    }

    [Theory]
    [MemberData(nameof(Variants))]
    public void Attribution_LeadsFromExpectedToRealised_WithNothingRounded(string variant)
    {
        RecordingLedger ledger = history.Of(variant, RulesOf(variant));
        Assert.True(Final(ledger).Count() > 5, "too few packages to tell");
        Assert.All(Final(ledger), p => Assert.Equal(p.RealisedProfit!.Value, p.ExpectedProfit + p.Attribution.Sum));
        Assert.All(Final(ledger), p => Assert.Equal(Cash.Zero, p.Attribution.Rounding));
    }

    [Theory]
    [MemberData(nameof(Variants))]
    public void Equity_RebuiltFromTheJournal_EqualsTheTable(string variant)
    {
        BookRules rules = RulesOf(variant);
        RecordingLedger ledger = history.Of(variant, rules);
        Cash capital = Cash.Round(rules.Capital.Initial);
        foreach (EquityRow row in ledger.Equity)
        {
            PostingRow[] until = [.. ledger.Postings.Where(p => p.Date <= row.Date)];
            Cash cash = until.Where(p => p.Account == Accounts.Cash).Total(p => p.Amount);
            Cash unsettled = until.Where(p => p.Account == Accounts.Unsettled).Total(p => p.Amount);
            Cash dividends = until.Where(p => p.Account is Accounts.DividendsReceivable or Accounts.DividendsPayable).Total(p => p.Amount);
            Assert.Equal((cash, unsettled, dividends), (row.CashSettled, row.Unsettled, row.DividendsDue));
            Assert.Equal(row.EquityMid, cash + unsettled + dividends + row.Accrued + row.StockValue + row.OptionValueMid);
            Assert.Equal(row.EquityMid, capital + row.ProfitPackages + row.ProfitNetting + row.ProfitIdle);
        }
    }

    [Theory]
    [MemberData(nameof(Variants))]
    public void Postings_NeverFallIntoADayThatHasItsEquityRow(string variant)
    {
        RecordingLedger ledger = history.Of(variant, RulesOf(variant));
        Assert.Equal(ledger.Postings.Select(p => p.Date), ledger.Postings.Select(p => p.Date).Order());
        Assert.Equal(ledger.Postings[^1].Transaction, ledger.Postings.Select(p => p.Transaction).Distinct().Count());
    }

    [Fact]
    public void Funnel_WhatAStageLeaves_IsWhatTheNextSees()
    {
        RecordingLedger ledger = history.Of("eager", InventedHistory.Eager);
        foreach (IGrouping<(DateOnly, string, Kind?), FunnelRow> lane in ledger.Funnel.GroupBy(f => (f.Date, f.Underlying, f.Kind)))
        {
            FunnelRow[] stages = [.. lane.OrderBy(f => f.Stage)];
            for (int i = 1; i < stages.Length; i++)
            {
                Assert.Equal(stages[i - 1].Seen - stages[i - 1].Refused, stages[i].Seen);
            }
        }

        Assert.Equal(ledger.Packages.Count, ledger.Funnel.Where(f => f.Stage == Stage.Opened).Sum(f => f.Seen));
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    public void Pass_OfManyBooks_WritesWhatEachWritesAlone(int threads)
    {
        string[] variants = ["eager", "keep", "no delay"];
        RecordingLedger[] together = [.. variants.Select(_ => new RecordingLedger())];
        HistoryPass.Run(history.Days, history.Tables, [.. variants.Select((v, i) => new PassBook(RulesOf(v), together[i]))], threads, null, TestContext.Current.CancellationToken);
        for (int i = 0; i < variants.Length; i++)
        {
            RecordingLedger alone = history.Of(variants[i], RulesOf(variants[i]));
            Assert.Equal(alone.Packages, together[i].Packages);
            Assert.Equal(alone.Postings, together[i].Postings);
            Assert.Equal(alone.Equity, together[i].Equity);
        }
    }

    private static IEnumerable<PackageRow> Final(RecordingLedger ledger) => ledger.Packages.Where(p => p.RealisedProfit is not null);

    private static BookRules RulesOf(string variant)
    {
        BookRules eager = InventedHistory.Eager;
        BookRules After(AfterAssignment after) => eager with { Assignment = eager.Assignment with { After = after } };
        return variant switch
        {
            "no delay" => eager with { Execution = new ExecutionSettings { DelayWritten = 0 } },
            "keep" => After(AfterAssignment.Keep),
            "cover" => After(AfterAssignment.Cover),
            "close" => After(AfterAssignment.Close),
            "half assigned" => eager with { Assignment = eager.Assignment with { Fraction = 0.37, PinBand = 0.60 } },
            "strategy margin" => eager with { Capital = eager.Capital with { Margin = Carry.Margin.MarginMethod.Strategy } },
            "no netting" => eager with { Funding = eager.Funding with { Netting = false } },
            _ => eager,
        };
    }
}

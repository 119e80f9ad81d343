using CarryTest.History.Reading;
using CarryTest.History.Tests.Building;
using CarryTest.Market.Faults;
using CarryTest.Market.Quotes;

namespace CarryTest.History.Tests.Reading;

/// <summary>Rows with errors: left out and counted with their place, or the end of the reading where the rule book says so.</summary>
public sealed class RowErrorTests
{
    // Of the twelve rows the query spoils the one at 13:00, first expiry, strike 95: row 4 of row group 0.
    private const string Spoiled = "epoch_us(quoted_at) = 1741024800000000 and expiry = date '2026-03-20' and strike = 95";

    public static TheoryData<string, FindingKind> Errors => new()
    {
        { $"select * replace (case when {Spoiled} then 0.000 else strike end as strike) from rows", FindingKind.Strike },
        { $"select * replace (case when {Spoiled} then -5.000 else strike end as strike) from rows", FindingKind.Strike },
        { $"select * replace (case when {Spoiled} then -0.01 else put_ask end::decimal(9,4) as put_ask) from rows", FindingKind.NegativePrice },
        { $"select * replace (case when {Spoiled} then -0.01 else underlying_bid end::decimal(9,4) as underlying_bid) from rows", FindingKind.NegativePrice },
        { $"select * replace (case when {Spoiled} then date '2025-03-02' else expiry end as expiry) from rows", FindingKind.Expired },
    };

    [Theory]
    [MemberData(nameof(Errors))]
    public void Row_WithAnError_IsLeftOutAndCounted(string query, FindingKind kind)
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay().Rewrite(query.Replace("0.000 else", "0::decimal(9,3) else", StringComparison.Ordinal).Replace("-5.000 else", "-5::decimal(9,3) else", StringComparison.Ordinal));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Finding finding = Assert.Single(findings);
        Assert.Equal((kind, Severity.Error, 1L), (finding.Kind, finding.Severity, finding.Count));
        string place = Assert.Single(finding.FirstPlaces);
        Assert.StartsWith("chains/root=KESTREL/2025.parquet, row group 0, row 4, KESTREL ", place, StringComparison.Ordinal);
        Assert.EndsWith(" at 2025-03-03T18:00:00Z", place, StringComparison.Ordinal);
        Assert.Equal(11, days[0].Snapshots[0].Chains[0].Columns.Count);
        Assert.Equal(3, days[0].Snapshots[1].Chains[0].Expiries.Sum(e => e.Count));
    }

    [Theory]
    [MemberData(nameof(Errors))]
    public void Row_WithAnError_EndsTheReadingWhereAsked(string query, FindingKind kind)
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay().Rewrite(query.Replace("0.000 else", "0::decimal(9,3) else", StringComparison.Ordinal).Replace("-5.000 else", "-5::decimal(9,3) else", StringComparison.Ordinal));
        InputException refusal = Assert.Throws<InputException>(() => history.Read(new HistoryChoice(["*"], StopOnError: true)));
        Assert.Contains("chains/root=KESTREL/2025.parquet, row group 0, row 4", refusal.Message, StringComparison.Ordinal);
        Assert.Contains(Market.Words.Vocabulary.Sentence(kind), refusal.Message, StringComparison.Ordinal);
        Assert.Contains("quarantine", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Row_OnItsExpiryDay_IsKept()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay().Rewrite("select * replace (case when expiry = date '2026-03-20' then date '2025-03-03' else expiry end as expiry) from rows");
        Assert.Empty(history.Read().Findings);
    }

    [Fact]
    public void Rows_Duplicated_KeepTheFirst()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Rewrite($"from (select * from rows union all select * replace ((call_bid + 1)::decimal(9,4) as call_bid) from rows where {Spoiled}) order by quoted_at, expiry, strike, call_bid");
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Equal((FindingKind.DuplicateKey, 1L), Assert.Single(findings.Select(f => (f.Kind, f.Count))));
        Assert.Equal(1.2395, days[0].Snapshots[1].Chains[0].Columns.CallBid[4]);
        Assert.Equal(12, days[0].Snapshots[0].Chains[0].Columns.Count);
    }

    [Fact]
    public void Underlying_QuotedTwiceAtOneInstant_KeepsTheFirst()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Rewrite("select * replace (case when strike = 100 and expiry = date '2026-06-19' then 100.02 else underlying_bid end::decimal(9,4) as underlying_bid) from rows");
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Equal((FindingKind.UnderlyingDiffers, 3L), Assert.Single(findings.Select(f => (f.Kind, f.Count))));
        Assert.Equal(9, days[0].Snapshots[0].Chains[0].Columns.Count);
        Assert.All(days[0].Snapshots, s => Assert.Equal(100.01, s.Chains[0].UnderlyingBid));
    }

    [Theory]
    [InlineData("2025-03-01", "12:00")] // a Saturday
    [InlineData("2025-03-03", "09:29")]
    [InlineData("2025-03-03", "16:16")]
    [InlineData("2025-07-04", "12:00")]
    public void Instant_OutsideAnySession_IsLeftOut(string date, string time)
    {
        using HistoryOnDisk history = new();
        history.Chains(
            "KESTREL",
            HistoryOnDisk.Day("2025-02-28").Append(HistoryOnDisk.Row(HistoryOnDisk.At(date, time), "2026-03-20", 95_000)).Concat(HistoryOnDisk.Day("2025-03-03"))
                .OrderBy(r => r.QuotedAt).ThenBy(r => r.Expiry).ThenBy(r => r.Strike));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Finding finding = Assert.Single(findings, f => f.Severity == Severity.Error);
        Assert.Equal((FindingKind.OutsideSession, 1L), (finding.Kind, finding.Count));
        Assert.Equal(6, days.Sum(d => d.Snapshots.Length));
    }

    [Fact]
    public void Quotes_Crossed_AreKeptAndCountedWithThreePlaces()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Rewrite("select * replace ((call_ask - 0.10)::decimal(9,4) as call_ask) from rows");
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Finding finding = Assert.Single(findings);
        Assert.Equal((FindingKind.Crossed, Severity.Warning, 12L, 3), (finding.Kind, finding.Severity, finding.Count, finding.FirstPlaces.Length));
        Assert.Equal(12, days[0].Snapshots[0].Chains[0].Columns.Count);
    }
}

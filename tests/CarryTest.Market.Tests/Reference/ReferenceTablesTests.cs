using System.Globalization;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Reference;
using static CarryTest.Market.Tests.Reference.TablesOfATest;

namespace CarryTest.Market.Tests.Reference;

public sealed class ReferenceTablesTests
{
    [Fact]
    public void LookUps_OfListedKeys_GiveTheirRows()
    {
        ReferenceTables tables = Tables(settlements: [new SettlementValue("MERIDIAN", Date("2025-06-20"), 5012.34)], closes: [new OfficialClose("KESTREL", Date("2025-06-20"), 101.5)]);

        Assert.Equal("Kestrel Works", tables.UnderlyingOf("KESTREL").Name);
        Assert.Equal("MERIDIAN", tables.RootOf("MERIDIAN").Symbol);
        Assert.True(tables.HasUnderlying("KESTREL") && tables.HasRoot("KESTREL"));
        Assert.False(tables.HasUnderlying("kestrel") || tables.HasRoot("OTHERS"));
        Assert.Equal(5012.34, tables.SettlementOf("MERIDIAN", Date("2025-06-20")));
        Assert.Null(tables.SettlementOf("MERIDIAN", Date("2025-06-21")));
        Assert.Equal(101.5, tables.CloseOf("KESTREL", Date("2025-06-20")));
        Assert.Null(tables.CloseOf("MERIDIAN", Date("2025-06-20")));
    }

    [Fact]
    public void LookUps_OfOthers_NameTableAndKey()
    {
        string symbol = Assert.Throws<InputException>(() => Tables().UnderlyingOf("QUILLAN")).Message;
        Assert.Contains("`underlyings`", symbol, StringComparison.Ordinal);
        Assert.Contains("QUILLAN", symbol, StringComparison.Ordinal);

        string root = Assert.Throws<InputException>(() => Tables().RootOf("QUILLAN")).Message;
        Assert.Contains("`roots`", root, StringComparison.Ordinal);
        Assert.Contains("QUILLAN", root, StringComparison.Ordinal);
    }

    // The night from a day costs the newest overnight rate dated on or before it; other terms do not count.
    [Theory]
    [InlineData("2025-03-02", null)]
    [InlineData("2025-03-03", 0.043)]
    [InlineData("2025-03-04", 0.043)]
    [InlineData("2025-03-05", 0.044)]
    [InlineData("2025-12-31", 0.044)]
    public void OvernightRate_OfADay_IsTheNewestOnOrBefore(string day, double? expected)
        => Assert.Equal(expected, Tables(rates: [Rate("2025-03-05", 1, 0.044), Rate("2025-03-03", 1, 0.043), Rate("2025-03-01", 30, 0.05), Rate("2025-03-06", 30, 0.05)]).OvernightRate(Date(day)));

    [Theory]
    [InlineData("2025-03-02", null)]
    [InlineData("2025-03-03", 0.01)]
    [InlineData("2025-03-09", 0.01)]
    [InlineData("2025-03-10", 0.08)]
    public void BorrowOf_ADay_IsTheNewestOnOrBefore(string day, double? expected)
        => Assert.Equal(expected, Tables(borrow: [Borrow("2025-03-10", 0.08), Borrow("2025-03-03", 0.01)]).BorrowOf("KESTREL", Date(day))?.Fee);

    [Fact]
    public void Rows_InAnyOrder_AreFoundInTheSameOne()
    {
        Dividend[] dividends =
        [
            Dividend("2025-01-20", "2025-02-10"), Dividend("2025-04-20", "2025-05-10"), Dividend("2025-04-21", "2025-05-10", 1, kind: DividendKind.Special), Dividend("2024-10-20", "2024-11-10"),
        ];
        CorporateAction[] actions = [Split("2025-03-01", "2025-03-10"), Split("2024-03-01", "2024-03-10"), Split("2025-03-01", "2025-03-10") with { Kind = CorporateActionKind.CashTakeover }];
        ReferenceTables forward = Tables(dividends, actions: actions);
        ReferenceTables backward = Tables(dividends.Reverse(), actions: actions.Reverse());

        Assert.Equal(["2024-11-10", "2025-02-10", "2025-05-10", "2025-05-10"], forward.DividendsOf("KESTREL").Select(d => d.ExOn.ToString("O", CultureInfo.InvariantCulture)));
        Assert.Equal(forward.DividendsOf("KESTREL").AsEnumerable(), backward.DividendsOf("KESTREL"));
        Assert.Equal(forward.CorporateActionsOf("KESTREL").AsEnumerable(), backward.CorporateActionsOf("KESTREL"));
        Assert.Empty(forward.DividendsOf("MERIDIAN").ToArray());
        Assert.Empty(forward.CorporateActionsOf("MERIDIAN").ToArray());
        Assert.Null(forward.BorrowOf("KESTREL", Date("2025-03-03")));
        Assert.Null(forward.OvernightRate(Date("2025-03-03")));
    }

    public static TheoryData<string, string, ReferenceTables> Doubled => new()
    {
        { "underlyings", "KESTREL", Tables(underlyings: [Name("KESTREL"), Name("KESTREL")], roots: []) },
        { "roots", "KESTREL", Tables(roots: [Root("KESTREL", "KESTREL"), Root("KESTREL", "MERIDIAN")]) },
        { "dividends", "2025-02-10", Tables(dividends: [Dividend("2025-01-20", "2025-02-10"), Dividend("2025-01-21", "2025-02-10", 0.3)]) },
        { "rates", "days 30", Tables(rates: [Rate("2025-03-03", 30, 0.04), Rate("2025-03-03", 30, 0.05)]) },
        { "borrow", "2025-03-03", Tables(borrow: [Borrow("2025-03-03", 0.01), Borrow("2025-03-03", 0.02)]) },
        { "corporate_actions", "2025-03-10", Tables(actions: [Split("2025-03-01", "2025-03-10"), Split("2025-03-02", "2025-03-10")]) },
        { "settlements", "2025-06-20", Tables(settlements: [new SettlementValue("MERIDIAN", Date("2025-06-20"), 1), new SettlementValue("MERIDIAN", Date("2025-06-20"), 2)]) },
        { "closes", "2025-06-20", Tables(closes: [new OfficialClose("KESTREL", Date("2025-06-20"), 1), new OfficialClose("KESTREL", Date("2025-06-20"), 1)]) },
    };

    [Theory]
    [MemberData(nameof(Doubled))]
    public void Check_AKeyTwice_NamesTableAndKey(string table, string key, ReferenceTables tables)
    {
        string message = Assert.Throws<InputException>(() => tables.Check()).Message;

        Assert.Contains($"`{table}`", message, StringComparison.Ordinal);
        Assert.Contains(key, message, StringComparison.Ordinal);
        Assert.Contains("twice", message, StringComparison.Ordinal);
    }

    public static TheoryData<string, string, ReferenceTables> Unlisted => new()
    {
        { "roots", "`underlyings`", Tables(roots: [Root("QUILLAN", "QUILLAN")]) },
        { "dividends", "`underlyings`", Tables(dividends: [Dividend("2025-01-20", "2025-02-10", symbol: "QUILLAN")]) },
        { "borrow", "`underlyings`", Tables(borrow: [Borrow("2025-03-03", 0.01) with { Symbol = "QUILLAN" }]) },
        { "corporate_actions", "`underlyings`", Tables(actions: [Split("2025-03-01", "2025-03-10") with { Symbol = "QUILLAN" }]) },
        { "closes", "`underlyings`", Tables(closes: [new OfficialClose("QUILLAN", Date("2025-06-20"), 1)]) },
        { "settlements", "`roots`", Tables(settlements: [new SettlementValue("QUILLAN", Date("2025-06-20"), 1)]) },
    };

    [Theory]
    [MemberData(nameof(Unlisted))]
    public void Check_AnUnlistedName_NamesTableRowAndWhereToAddIt(string table, string addTo, ReferenceTables tables)
    {
        string message = Assert.Throws<InputException>(() => tables.Check()).Message;

        Assert.Contains($"`{table}`", message, StringComparison.Ordinal);
        Assert.Contains("QUILLAN", message, StringComparison.Ordinal);
        Assert.Contains(addTo, message, StringComparison.Ordinal);
    }

    // The Thai calendar counts from another year; dates in messages do not.
    [Fact]
    public void Check_InAnotherCulture_WritesTheSameMessage()
    {
        ReferenceTables tables = Tables(dividends: [Dividend("2025-01-20", "2025-02-10"), Dividend("2025-01-21", "2025-02-10")]);
        CultureInfo before = Thread.CurrentThread.CurrentCulture;
        try
        {
            Thread.CurrentThread.CurrentCulture = new CultureInfo("th-TH");
            Assert.Contains("2025-02-10", Assert.Throws<InputException>(() => tables.Check()).Message, StringComparison.Ordinal);
        }
        finally
        {
            Thread.CurrentThread.CurrentCulture = before;
        }
    }

    private static Underlying Name(string symbol) => new(symbol, symbol, UnderlyingKind.Equity, "new-york", "USD");

    private static OptionRoot Root(string root, string symbol) => new(root, symbol, ExerciseStyle.American, SettlementStyle.Shares, 100, 100, 0);
}

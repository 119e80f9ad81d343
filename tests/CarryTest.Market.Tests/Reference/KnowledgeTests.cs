using CarryTest.Market.Calendars;
using CarryTest.Market.Reference;
using CsCheck;
using static CarryTest.Market.Tests.Reference.TablesOfATest;

namespace CarryTest.Market.Tests.Reference;

public sealed class KnowledgeTests
{
    // A row dated d is known from the first snapshot of the next trading day on: dated on Friday, known on Monday.
    [Theory]
    [InlineData("2025-03-07", false)]
    [InlineData("2025-03-10", true)]
    [InlineData("2025-03-11", true)]
    public void DatedRow_AroundTheNextTradingDay_IsKnownFromThenOn(string today, bool known)
    {
        ReferenceTables tables = Tables(
            [Dividend("2025-03-07", "2025-03-20")],
            [Rate("2025-03-07", 1, 0.044), Rate("2025-03-07", 30, 0.045)],
            [Borrow("2025-03-07", 0.02)],
            [Split("2025-03-07", "2025-03-24")]);

        Knowledge knowledge = At(tables, today);

        Assert.Equal(known ? 1 : 0, knowledge.Dividends("KESTREL").Count);
        Assert.Equal(known ? 0.044 : null, knowledge.OvernightRate);
        Assert.Equal(known ? [(1, 0.044), (30, 0.045)] : Array.Empty<(int, double)>(), knowledge.Curve);
        Assert.Equal(known ? 0.02 : null, knowledge.Borrow("KESTREL")?.Fee);
        Assert.Equal(known ? 1 : 0, knowledge.CorporateActions("KESTREL").Count);
    }

    // An instant of its own goes before the rule of the date, either way.
    [Theory]
    [InlineData("2025-03-07", 14, 59, false)]
    [InlineData("2025-03-07", 15, 0, true)]
    [InlineData("2025-03-07", 20, 45, true)]
    [InlineData("2025-03-06", 20, 45, false)]
    public void KnownAt_AroundItsInstant_Decides(string today, int hourUtc, int minute, bool known)
    {
        var announced = new DateTime(2025, 3, 7, 15, 0, 0, DateTimeKind.Utc);
        ReferenceTables tables = Tables(
            [Dividend("2025-03-07", "2025-03-20", knownAt: announced)],
            [Rate("2025-03-06", 1, 0.044, announced)],
            [Borrow("2025-03-05", 0.02, announced)],
            [Split("2025-02-03", "2025-03-24", announced)]);

        Knowledge knowledge = Knowledge.Of(tables, Date(today), Date(today).ToDateTime(new TimeOnly(hourUtc, minute), DateTimeKind.Utc));

        Assert.Equal(known ? 1 : 0, knowledge.Dividends("KESTREL").Count);
        Assert.Equal(known ? 0.044 : null, knowledge.OvernightRate);
        Assert.Equal(known ? 0.02 : null, knowledge.Borrow("KESTREL")?.Fee);
        Assert.Equal(known ? 1 : 0, knowledge.CorporateActions("KESTREL").Count);
    }

    // Without a declaration date: on the ex-date, or trading days before it. Monday 2025-05-26 is a holiday: three trading days before Wednesday the 28th is Thursday the 22nd.
    [Theory]
    [InlineData("2025-05-27", 0, false)]
    [InlineData("2025-05-28", 0, true)]
    [InlineData("2025-05-21", 3, false)]
    [InlineData("2025-05-22", 3, true)]
    [InlineData("2025-05-26", 1, false)]
    [InlineData("2025-05-27", 1, true)]
    public void Dividends_WithoutDeclaration_AreKnownOnTheExDateOrAsAssumed(string today, int assumeDeclaredDays, bool known)
        => Assert.Equal(known ? 1 : 0, At(Tables([Dividend(null, "2025-05-28")]), today).Dividends("KESTREL", assumeDeclaredDays).Count);

    // What is declared is known by its declaration, whatever is assumed of others.
    [Fact]
    public void Dividends_WithDeclaration_DoNotFollowTheAssumption()
        => Assert.Empty(At(Tables([Dividend("2025-05-27", "2025-05-28")]), "2025-05-27").Dividends("KESTREL", 10));

    [Theory]
    [InlineData("2025-03-21", false)]
    [InlineData("2025-03-24", true)]
    public void CorporateActions_WithoutAnnouncement_AreKnownOnTheEffectiveDate(string today, bool known)
        => Assert.Equal(known ? 1 : 0, At(Tables(actions: [Split(null, "2025-03-24")]), today).CorporateActions("KESTREL").Count);

    [Fact]
    public void Dividends_PastAndToCome_StandByExDate()
    {
        ReferenceTables tables = Tables([Dividend("2025-03-03", "2025-06-10"), Dividend("2024-12-02", "2025-01-10"), Dividend("2025-02-03", "2025-03-12"), Dividend("2025-06-02", "2025-09-10")]);

        Assert.Equal([Date("2025-01-10"), Date("2025-03-12"), Date("2025-06-10")], At(tables, "2025-03-10").Dividends("KESTREL").Select(d => d.ExOn));
        Assert.Empty(At(tables, "2025-03-10").Dividends("MERIDIAN"));
    }

    // Each term has its own newest row.
    [Fact]
    public void Curve_TermsOfSeveralDates_TakesTheNewestKnownOfEach()
    {
        ReferenceTables tables = Tables(rates:
        [
            Rate("2025-03-03", 90, 0.0430), Rate("2025-03-05", 1, 0.0441), Rate("2025-03-04", 1, 0.0440), Rate("2025-03-06", 1, 0.0500), Rate("2025-03-04", 30, 0.0435), Rate("2025-03-06", 90, 0.0600),
        ]);

        Assert.Equal([(1, 0.0441), (30, 0.0435), (90, 0.0430)], At(tables, "2025-03-06").Curve);
        Assert.Equal(0.0441, At(tables, "2025-03-06").OvernightRate);
    }

    [Fact]
    public void OvernightRate_OtherTermsOnly_IsNotThere() => Assert.Null(At(Tables(rates: [Rate("2025-03-03", 30, 0.043)]), "2025-03-10").OvernightRate);

    // Announced on Monday for Thursday: until Thursday the older terms hold.
    [Theory]
    [InlineData("2025-03-11", 0.01, 0.043)]
    [InlineData("2025-03-12", 0.01, 0.043)]
    [InlineData("2025-03-13", 0.08, 0.030)]
    public void RowsKnownAhead_BeforeTheirDate_DoNotHoldYet(string today, double fee, double rate)
    {
        var monday = new DateTime(2025, 3, 10, 15, 0, 0, DateTimeKind.Utc);
        ReferenceTables tables = Tables(
            rates: [Rate("2025-03-03", 1, 0.043), Rate("2025-03-13", 1, 0.030, monday)],
            borrow: [Borrow("2025-03-03", 0.01), Borrow("2025-03-13", 0.08, monday)]);

        Assert.Equal(fee, At(tables, today).Borrow("KESTREL")?.Fee);
        Assert.Equal(rate, At(tables, today).OvernightRate);
    }

    // A row published late, here after the first snapshot of the 12th, leaves the one before it in force.
    [Fact]
    public void Borrow_NewestRowPublishedLate_KeepsTheOneBefore()
    {
        ReferenceTables tables = Tables(borrow: [Borrow("2025-03-03", 0.01), Borrow("2025-03-05", 0.08, new DateTime(2025, 3, 12, 15, 0, 0, DateTimeKind.Utc))]);

        Assert.Equal(0.01, At(tables, "2025-03-12").Borrow("KESTREL")?.Fee);
        Assert.Equal(0.08, At(tables, "2025-03-13").Borrow("KESTREL")?.Fee);
    }

    // What lies in the future and is not known yet changes nothing that is known today.
    [Fact]
    public void Knowledge_OfAnyDay_DoesNotDependOnWhatIsDatedLater() => Gen.Select(Gen.Int[0, 400].List[1, 40], Gen.Int[0, 400]).Sample((offsets, cut) =>
    {
        var start = new DateOnly(2025, 1, 2);
        DateOnly today = start.AddDays(cut);
        int[] days = [.. offsets.Distinct()];
        int[] past = [.. days.Where(d => start.AddDays(d) < today)];

        Knowledge all = At(Of(days), today);
        Knowledge cutOff = At(Of(past), today);

        Assert.Equal(cutOff.Curve.AsEnumerable(), all.Curve);
        Assert.Equal(cutOff.Borrow("KESTREL"), all.Borrow("KESTREL"));
        Assert.Equal(cutOff.Dividends("KESTREL"), all.Dividends("KESTREL"));
        Assert.Equal(cutOff.CorporateActions("KESTREL"), all.CorporateActions("KESTREL"));

        // The plain meaning beside the search: the newest row dated before today.
        Assert.Equal(past.Length == 0 ? null : past.Max() / 10_000.0, all.Borrow("KESTREL")?.Fee);

        ReferenceTables Of(int[] dated) => Tables(
            dated.Select(d => Dividend(null, "2025-01-02") with { DeclaredOn = start.AddDays(d), ExOn = start.AddDays(d + 20) }),
            dated.Select(d => new RateQuote(start.AddDays(d), d % 3 == 0 ? 30 : 1, d / 10_000.0)),
            dated.Select(d => new BorrowTerms("KESTREL", start.AddDays(d), d / 10_000.0, null, false)),
            dated.Select(d => Split(null, "2025-01-02") with { AnnouncedOn = start.AddDays(d), EffectiveOn = start.AddDays(d + 30) }));
    });

    [Fact]
    public void Of_AnInstant_KeepsDateInstantAndCalendar()
    {
        var instant = new DateTime(2025, 3, 7, 15, 0, 0, DateTimeKind.Utc);
        Knowledge knowledge = Knowledge.Of(Tables(), Date("2025-03-07"), instant);

        Assert.Equal(Date("2025-03-07"), knowledge.Date);
        Assert.Equal(instant, knowledge.Instant);
        Assert.Same(TradingCalendar.NewYork, knowledge.Calendar);
    }

    private static Knowledge At(ReferenceTables tables, string today) => At(tables, Date(today));

    private static Knowledge At(ReferenceTables tables, DateOnly today) => Knowledge.Of(tables, today, TradingCalendar.ToUtc(today, new TimeOnly(10, 0)));
}

using CarryTest.Market.Contracts;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Screening;

/// <summary>Asks the screen and one variant what they make of a package.</summary>
internal static class Desk
{
    /// <summary>The test that refuses the only package of a kind that the day's only pairs make; null where it is listed.</summary>
    public static Stage? ReasonOfScreen(MarketDay day, Kind kind, ParityRules? rules = null)
    {
        Shortlist shortlist = new Screen([rules ?? TestRules.Plain]).Run(day);
        FunnelLine[] lines = [.. shortlist.Funnel.Where(l => l.Kind == kind)];
        Assert.Equal(1, lines[0].Seen);
        Stage? refused = lines.Where(l => l.Refused == 1).Select(l => (Stage?)l.Stage).SingleOrDefault();
        Assert.Equal(refused is null ? 1 : 0, shortlist.At(0).Count(c => c.Terms.Kind.Kind == kind));
        return refused;
    }

    /// <summary>The candidate of the shortlist that expires on 2025-07-18; null where it is not listed.</summary>
    public static Candidate? Listed(MarketDay day, Kind kind, double low, double high, ParityRules rules, int snapshot = 0) =>
        new Screen([rules]).Run(day).At(snapshot).SingleOrDefault(c => c.Terms.Expiry == Dates.On("2025-07-18") && c.Terms.Kind.Kind == kind && c.Terms.Low == Strike.Of(low) && c.Terms.High == Strike.Of(high));

    /// <summary>What a variant makes of a listed candidate.</summary>
    public static Judgement Judge(MarketDay day, Kind kind, double low, double high, ParityRules rules, int units = 1)
    {
        Candidate? listed = Listed(day, kind, low, high, rules);
        Assert.NotNull(listed);
        return new Entry(rules, new Premia()).Judge(listed, day, units);
    }
}

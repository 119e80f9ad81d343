using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Money;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Day;

/// <summary>The row of a package in the ledger.</summary>
internal static class PackageRows
{
    /// <summary>Of a package that is done.</summary>
    public static PackageRow Final(Package package, Cash realised, AttributionLines lines)
    {
        int days = package.LastSettlement.DayNumber - package.Plan.Dates.PremiumSettles.DayNumber;
        double onCapital = realised.ToDouble() / package.CashTiedUp.ToDouble() * 360 / Math.Max(days, 1);
        return Row(package) with
        {
            RealisedProfit = realised,
            ReturnOnCapital = package.CashTiedUp == Cash.Zero ? double.NaN : onCapital,
            Ending = package.Ending,
            EndedOn = package.EndedOn,
            Attribution = lines,
        };
    }

    /// <summary>Of a package that the end of the history found open.</summary>
    public static PackageRow Open(Package package, Cash mid, Cash carry) => Row(package) with { OpenMid = mid, OpenCarry = carry };

    private static PackageRow Row(Package package)
    {
        PackageTerms terms = package.Terms;
        double PriceOf(LegOf of, int slot)
        {
            for (int i = 0; i < terms.Kind.Legs.Length; i++)
            {
                if (terms.Kind.Legs[i].Of == of && terms.Kind.Legs[i].StrikeSlot == slot)
                {
                    return package.Plan.LegPrices[i];
                }
            }

            return double.NaN;
        }

        return new PackageRow
        {
            Package = package.Number,
            PackageKey = package.Key,
            Underlying = terms.Underlying.Symbol,
            Root = terms.Root.Root,
            Kind = terms.Kind.Kind,
            Expiry = terms.Expiry,
            StrikeLow = terms.Low,
            StrikeHigh = terms.Kind.Strikes == 2 ? terms.High : null,
            Units = package.Plan.Units,
            Multiplier = terms.Root.Multiplier,
            DecidedAt = package.DecidedAt,
            FilledAt = package.FilledAt,
            FillStock = PriceOf(LegOf.Stock, 0),
            FillCallLow = PriceOf(LegOf.Call, 0),
            FillPutLow = PriceOf(LegOf.Put, 0),
            FillCallHigh = PriceOf(LegOf.Call, 1),
            FillPutHigh = PriceOf(LegOf.Put, 1),
            EdgeDecided = package.EdgeDecided,
            EdgeFilled = package.Plan.EdgePerShare,
            PremiumShort = package.Plan.PremiumShort,
            ImpliedRate = package.Plan.ImpliedRate,
            FundingRate = package.Plan.FundingRate,
            CashTiedUp = package.CashTiedUp,
            Margin = package.Margin,
            ReturnOnCapital = double.NaN,
            ExpectedProfit = package.ExpectedProfit,
            Ending = Ending.Open,
            Attribution = default,
        };
    }
}

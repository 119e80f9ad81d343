using CarryTest.Invention.Chains;
using CarryTest.Market.Calendars;
using CarryTest.Pricing.Options;

namespace CarryTest.Invention.Planted;

/// <summary>The edge of a package at the touch on a day, on the benchmark moved by a spread, early exercise of the short legs taken off; before fees.</summary>
/// <param name="chain">fair values</param>
/// <param name="cycle">settlement cycles</param>
/// <param name="today">trade date</param>
internal sealed class PlantedEdge(FairChain chain, SettlementCycle cycle, DateOnly today)
{
    /// <summary>Currency per share.</summary>
    /// <param name="plant">which package</param>
    /// <param name="price">middle of the underlying</param>
    /// <param name="stockHalfSpread">currency per share</param>
    /// <param name="low">quotes of the low strike</param>
    /// <param name="high">quotes of the high strike; the same where there is one</param>
    /// <param name="debitSpread">a fraction a year, on what is lent</param>
    /// <param name="creditSpread">a fraction a year, on what is borrowed</param>
    public double Of(Plant plant, double price, double stockHalfSpread, PairQuote low, PairQuote high, double debitSpread, double creditSpread)
    {
        bool lends = plant.Kind is PlantKind.Conversion or PlantKind.LongBox;
        double spread = lends ? debitSpread : -creditSpread;
        double zs = chain.Z(cycle.OfStock(today), spread);
        double zo = chain.Z(cycle.OfPremium(today), spread);
        double zx = chain.Z(chain.DeliveryOf(plant.Expiry), spread);
        double dividends = chain.Expected(plant.Expiry).Sum(d => d.Amount * chain.Z(d.CashOn, spread));
        double borrow = price * chain.TermsOf(plant.Expiry).BorrowShare;
        double k1 = plant.Low / 1000.0;
        double k2 = plant.High / 1000.0;
        return plant.Kind switch
        {
            PlantKind.Conversion => (k1 * zx) + dividends - ((price + stockHalfSpread) * zs) + (low.SyntheticBid * zo) - A(plant.Low, OptionRight.Call),
            PlantKind.Reversal => ((price - stockHalfSpread) * zs) - (low.SyntheticAsk * zo) - (k1 * zx) - dividends - borrow - A(plant.Low, OptionRight.Put),
            PlantKind.LongBox => ((k2 - k1) * zx) - ((low.SyntheticAsk - high.SyntheticBid) * zo) - A(plant.Low, OptionRight.Put) - A(plant.High, OptionRight.Call),
            _ => ((low.SyntheticBid - high.SyntheticAsk) * zo) - ((k2 - k1) * zx) - A(plant.Low, OptionRight.Call) - A(plant.High, OptionRight.Put),
        };

        double A(int strike, OptionRight right) => chain.Premium(plant.Expiry, strike, right, price);
    }
}

using CarryTest.Invention.Chains;
using CarryTest.Market.Calendars;
using CarryTest.Pricing.Options;

namespace CarryTest.Invention.Planted;

/// <summary>Bid and ask of a pair, currency per share; 0 = none.</summary>
internal readonly record struct Pair(double CallBid, double CallAsk, double PutBid, double PutAsk);

/// <summary>The edge of a package at the touch, on the benchmark moved by a spread, early exercise of the short legs taken off; before fees.</summary>
internal static class PlantedEdge
{
    /// <summary>Currency per share.</summary>
    /// <param name="plant">which package</param>
    /// <param name="chain">fair values</param>
    /// <param name="cycle">settlement cycles</param>
    /// <param name="today">trade date</param>
    /// <param name="price">middle of the underlying</param>
    /// <param name="stockHalfSpread">currency per share</param>
    /// <param name="pairOf">quotes of a strike</param>
    /// <param name="debitSpread">a fraction a year, on what is lent</param>
    /// <param name="creditSpread">a fraction a year, on what is borrowed</param>
    /// <param name="cashSettled">whether exercise pays cash</param>
    public static double Of(
        Plant plant, FairChain chain, SettlementCycle cycle, DateOnly today, double price, double stockHalfSpread, Func<int, Pair> pairOf, double debitSpread, double creditSpread, bool cashSettled)
    {
        bool lends = plant.Kind is PlantKind.Conversion or PlantKind.LongBox;
        double spread = lends ? debitSpread : -creditSpread;
        double zs = chain.Z(cycle.OfStock(today), spread);
        double zo = chain.Z(cycle.OfPremium(today), spread);
        double zx = chain.Z(cashSettled ? cycle.OfCashExercise(plant.Expiry) : cycle.OfDelivery(plant.Expiry), spread);
        double dividends = chain.Expected(plant.Expiry).Sum(d => d.Amount * chain.Z(d.CashOn, spread));
        double borrow = price * chain.TermsOf(plant.Expiry).BorrowShare;
        Pair low = pairOf(plant.Low);
        Pair high = pairOf(plant.High);
        double k1 = plant.Low / 1000.0;
        double k2 = plant.High / 1000.0;
        double A(int strike, OptionRight right) => chain.Premium(plant.Expiry, strike, right, price, chain.VolatilityAt(plant.Expiry, strike, price));
        return plant.Kind switch
        {
            PlantKind.Conversion => (k1 * zx) + dividends - ((price + stockHalfSpread) * zs) - ((low.PutAsk - low.CallBid) * zo) - A(plant.Low, OptionRight.Call),
            PlantKind.Reversal => ((price - stockHalfSpread) * zs) + ((low.PutBid - low.CallAsk) * zo) - (k1 * zx) - dividends - borrow - A(plant.Low, OptionRight.Put),
            PlantKind.LongBox => ((k2 - k1) * zx) - ((low.CallAsk - low.PutBid - high.CallBid + high.PutAsk) * zo) - A(plant.Low, OptionRight.Put) - A(plant.High, OptionRight.Call),
            _ => ((low.CallBid - low.PutAsk - high.CallAsk + high.PutBid) * zo) - ((k2 - k1) * zx) - A(plant.Low, OptionRight.Call) - A(plant.High, OptionRight.Put),
        };
    }

    /// <summary>In which direction the moved leg's quote must go for the package to gain: + up where the leg is sold, - down where it is bought.</summary>
    public static int Direction(Plant plant)
    {
        bool atLow = plant.Moved.Strike == plant.Low;
        bool soldCall = plant.Kind switch
        {
            PlantKind.Conversion => true,
            PlantKind.Reversal => false,
            PlantKind.LongBox => !atLow,
            _ => atLow,
        };
        return soldCall == plant.Moved.Call ? 1 : -1;
    }
}

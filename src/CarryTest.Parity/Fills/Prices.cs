using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Fills;

/// <summary>At which price a leg trades: between the middle and the touch, worsened by slippage.</summary>
public static class Prices
{
    /// <summary>Price of a leg, currency per share; NaN where the side is not quoted.</summary>
    public static double Of(Chain chain, int row, Leg leg, ExecutionSettings execution, CostSettings costs)
    {
        Touch touch = leg.Of == LegOf.Stock ? chain.Stock : chain.Option(row, leg.Of == LegOf.Call ? Right.Call : Right.Put);
        return Of(touch, leg.Sign > 0, execution.HalfSpreadPaid, costs);
    }

    /// <summary>Price at a touch, currency per share.</summary>
    /// <param name="touch">bid and ask</param>
    /// <param name="buys">whether it is bought</param>
    /// <param name="halfSpreadPaid">1 = the touch, 0 = the middle</param>
    /// <param name="costs">slippage</param>
    public static double Of(Touch touch, bool buys, double halfSpreadPaid, CostSettings costs)
    {
        double side = buys ? touch.Ask : touch.Bid;
        double bid = double.IsNaN(touch.Bid) ? 0 : touch.Bid;
        double price = double.IsNaN(side) ? double.NaN : halfSpreadPaid >= 1 ? side : ((bid + touch.Ask) / 2 * (1 - halfSpreadPaid)) + (side * halfSpreadPaid);
        double slippage = costs.SlippagePerShare + (costs.SlippageFraction * price);
        return buys ? price + slippage : Math.Max(0, price - slippage);
    }
}

using CarryTest.Carry.Positions;
using CarryTest.Market.Money;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Margin;

/// <summary>Prices that a requirement looks at, currency per share.</summary>
/// <param name="Stock">middle of the stock</param>
/// <param name="Option">middle of a leg's option, by leg</param>
internal readonly record struct MarginPrices(double Stock, Func<int, double> Option);

/// <summary>The capital that packages need: the entry figure decides whether one is opened, the later figure whether there is a breach.</summary>
internal static class Requirement
{
    /// <summary>Of one unit at its fill.</summary>
    /// <param name="settings">method and parameters</param>
    /// <param name="terms">the package</param>
    /// <param name="stockMid">currency per share</param>
    /// <param name="legPrices">currency per share, one a leg</param>
    public static Cash OfUnitAtEntry(CapitalSettings settings, PackageTerms terms, double stockMid, IReadOnlyList<double> legPrices)
    {
        int multiplier = terms.Root.Multiplier;
        if (settings.Margin == MarginMethod.House)
        {
            int options = terms.Kind.Legs.Count(l => l.Of != LegOf.Stock);
            double stock = terms.Kind.HasStock ? settings.House.StockFraction * stockMid * multiplier : 0;
            return Cash.Round(stock + (settings.House.PerContract * options));
        }

        return Cash.Round(multiplier * StrategyMargin.AtEntry(terms, stockMid, legPrices));
    }

    /// <summary>Of a package as it stands.</summary>
    public static Cash Of(CapitalSettings settings, Package package, MarginPrices prices) => package.Parts.Total(p => OfPart(settings, package.Terms, p, prices));

    private static Cash OfPart(CapitalSettings settings, PackageTerms terms, Part part, MarginPrices prices)
    {
        if (!part.Holds)
        {
            return Cash.Zero;
        }

        if (settings.Margin == MarginMethod.House)
        {
            return Cash.Round((settings.House.StockFraction * Math.Abs(part.Stock) * prices.Stock) + (settings.House.PerContract * part.Contracts.Sum(Math.Abs)));
        }

        return Cash.Round(StrategyMargin.Later(terms, part, prices));
    }
}

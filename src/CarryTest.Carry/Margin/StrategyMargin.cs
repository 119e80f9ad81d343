using CarryTest.Carry.Positions;
using CarryTest.Market.Contracts;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Margin;

/// <summary>
/// Fixed percentages by kind of position, simplified. Stock: half its value at entry (Regulation T, 12 CFR 220.12(a) and (c)); conversions and reversals 10 % of the strike later,
/// boxes, naked stock and naked options after FINRA Rule 4210(c), (f)(2) (percentages from memory). Equity counts every option at its mark, so that the rule that stock
/// of a conversion counts at no more than the strike while the call is in the money holds by itself.
/// </summary>
internal static class StrategyMargin
{
    private const double InitialStock = 0.50;
    private const double HedgedLater = 0.10;
    private const double LongBoxEuropean = 0.50;
    private const double LongStockLater = 0.25;
    private const double ShortStockLater = 0.30;
    private const double ShortStockFloorPerShare = 5.00;
    private const double NakedOption = 0.20;
    private const double NakedIndexOption = 0.15;
    private const double NakedOptionFloor = 0.10;

    /// <summary>Currency per share of one unit at its fill.</summary>
    public static double AtEntry(PackageTerms terms, double stockMid, IReadOnlyList<double> legPrices)
    {
        double paid = 0;
        for (int i = 0; i < terms.Kind.Legs.Length; i++)
        {
            paid += terms.Kind.Legs[i].Sign * legPrices[i];
        }

        return terms.Kind.Kind switch
        {
            Kind.Conversion => InitialStock * stockMid,
            Kind.Reversal => terms.Root.Exercise == ExerciseStyle.American && terms.Low.PerShare <= legPrices[0] ? 0 : InitialStock * stockMid,
            Kind.LongBox => LongBox(terms, paid),
            _ => Math.Max(0, terms.Delivered + paid),
        };
    }

    /// <summary>Currency, of a part as it stands: each recognised pair first, then what is naked.</summary>
    public static double Later(PackageTerms terms, Part part, MarginPrices prices)
    {
        int multiplier = terms.Root.Multiplier;
        long stock = part.Stock;
        long[] contracts = (long[])part.Contracts.Clone();
        double required = 0;
        for (int slot = 0; slot < terms.Kind.Strikes; slot++)
        {
            required += Hedged(terms, slot, ref stock, contracts, prices);
        }

        if (terms.Kind.Strikes == 2)
        {
            required += Box(terms, contracts, prices);
        }

        required += stock > 0 ? LongStockLater * stock * prices.Stock : -stock * Math.Max(ShortStockLater * prices.Stock, ShortStockFloorPerShare);
        for (int leg = 0; leg < contracts.Length; leg++)
        {
            required += contracts[leg] < 0 ? -contracts[leg] * multiplier * Naked(terms, leg, prices) : 0;
        }

        return required;
    }

    private static double LongBox(PackageTerms terms, double debit) =>
        terms.Root.Exercise == ExerciseStyle.European && terms.Root.CashSettled ? LongBoxEuropean * terms.Delivered : Math.Max(0, debit);

    // Long stock, long put, short call of a strike: 10 % of it. Short stock, short put, long call: 10 % and what the put is in the money.
    private static double Hedged(PackageTerms terms, int slot, ref long stock, long[] contracts, MarginPrices prices)
    {
        int call = LegAt(terms, LegOf.Call, slot);
        int put = LegAt(terms, LegOf.Put, slot);
        bool conversion = stock > 0 && contracts[call] < 0 && contracts[put] > 0;
        bool reversal = stock < 0 && contracts[call] > 0 && contracts[put] < 0;
        if (!conversion && !reversal)
        {
            return 0;
        }

        long n = Math.Min(Math.Abs(stock) / terms.Root.Multiplier, Math.Min(Math.Abs(contracts[call]), Math.Abs(contracts[put])));
        stock -= Math.Sign(stock) * n * terms.Root.Multiplier;
        contracts[call] -= Math.Sign(contracts[call]) * n;
        contracts[put] -= Math.Sign(contracts[put]) * n;
        double strike = (slot == 0 ? terms.Low : terms.High).PerShare;
        double perShare = (HedgedLater * strike) + (reversal ? Math.Max(0, strike - prices.Stock) : 0);
        return n * terms.Root.Multiplier * perShare;
    }

    // A box that is whole: the width less what it is marked at where it is short, its own mark (or half the width, European and cash-settled) where it is long.
    private static double Box(PackageTerms terms, long[] contracts, MarginPrices prices)
    {
        int lowCall = LegAt(terms, LegOf.Call, 0);
        int lowPut = LegAt(terms, LegOf.Put, 0);
        int highCall = LegAt(terms, LegOf.Call, 1);
        int highPut = LegAt(terms, LegOf.Put, 1);
        bool isLong = contracts[lowCall] > 0;
        bool whole = isLong
            ? contracts[lowPut] < 0 && contracts[highCall] < 0 && contracts[highPut] > 0
            : contracts[lowCall] < 0 && contracts[lowPut] > 0 && contracts[highCall] > 0 && contracts[highPut] < 0;
        if (!whole)
        {
            return 0;
        }

        int[] legs = [lowCall, lowPut, highCall, highPut];
        long n = legs.Min(l => Math.Abs(contracts[l]));
        foreach (int leg in legs)
        {
            contracts[leg] -= Math.Sign(contracts[leg]) * n;
        }

        double mark = prices.Option(lowCall) - prices.Option(lowPut) - prices.Option(highCall) + prices.Option(highPut);
        double perShare = isLong ? LongBox(terms, mark) : Math.Max(0, terms.Delivered - mark);
        return n * terms.Root.Multiplier * perShare;
    }

    private static double Naked(PackageTerms terms, int leg, MarginPrices prices)
    {
        Leg definition = terms.Kind.Legs[leg];
        double strike = terms.StrikeOf(definition).PerShare;
        bool call = definition.Of == LegOf.Call;
        double outOfTheMoney = Math.Max(0, call ? strike - prices.Stock : prices.Stock - strike);
        double rate = terms.Underlying.Kind == UnderlyingKind.Index ? NakedIndexOption : NakedOption;
        double floor = NakedOptionFloor * (call ? prices.Stock : strike);
        return prices.Option(leg) + Math.Max((rate * prices.Stock) - outOfTheMoney, floor);
    }

    private static int LegAt(PackageTerms terms, LegOf of, int slot)
    {
        for (int i = 0; i < terms.Kind.Legs.Length; i++)
        {
            if (terms.Kind.Legs[i].Of == of && terms.Kind.Legs[i].StrikeSlot == slot)
            {
                return i;
            }
        }

        throw new InvalidOperationException($"{terms.Kind.Kind} has no {of} at slot {slot}");
    }
}

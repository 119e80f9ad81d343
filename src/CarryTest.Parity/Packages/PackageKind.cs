using System.Collections.Immutable;
using CarryTest.Market.Words;
using CarryTest.Parity.Funding;

namespace CarryTest.Parity.Packages;

/// <summary>The kinds of package, in the order that breaks ties.</summary>
public enum Kind
{
    /// <summary>Long stock, long put, short call.</summary>
    [Word("conversion", "long stock, long put and short call at one strike: lends money until expiry")]
    Conversion,

    /// <summary>Short stock, short put, long call.</summary>
    [Word("reversal", "short stock, short put and long call at one strike: borrows money until expiry")]
    Reversal,

    /// <summary>A synthetic bought at the lower strike and sold at the higher.</summary>
    [Word("long-box", "a synthetic bought at the lower strike and sold at the higher: lends the width until expiry")]
    LongBox,

    /// <summary>The opposite of a long box.</summary>
    [Word("short-box", "a synthetic sold at the lower strike and bought at the higher: borrows the width until expiry")]
    ShortBox,
}

/// <summary>A package kind as data: its legs and on which side of the money market it stands.</summary>
/// <param name="Kind">which one</param>
/// <param name="Legs">in the order in which trades are booked</param>
/// <param name="Funding">the side on which it is funded while it lives</param>
/// <param name="Strikes">1 or 2</param>
public sealed record PackageKind(Kind Kind, ImmutableArray<Leg> Legs, Side Funding, int Strikes)
{
    /// <summary>Whether a leg is stock.</summary>
    public bool HasStock => Strikes == 1;

    /// <summary>The leg with the other right at the same strike; -1 for stock.</summary>
    public int TwinOf(int leg)
    {
        if (Legs[leg].Of == LegOf.Stock)
        {
            return -1;
        }

        for (int i = 0; i < Legs.Length; i++)
        {
            if (i != leg && Legs[i].Of != LegOf.Stock && Legs[i].StrikeSlot == Legs[leg].StrikeSlot)
            {
                return i;
            }
        }

        return -1;
    }

    /// <summary>What delivery at expiry pays per share, signed: + received. The strike for a conversion, less the strike for a reversal, the width for a long box, less the width for a short one.</summary>
    /// <param name="low">the lower or only strike per share, as it will stand at expiry</param>
    /// <param name="high">the higher strike per share; ignored for one strike</param>
    public double PaysAtExpiry(double low, double high)
    {
        // A synthetic (long call, short put) held at expiry buys the share at its strike; a sold one sells it. Stock cancels.
        double paid = 0;
        foreach (Leg leg in Legs)
        {
            if (leg.Of == LegOf.Call)
            {
                paid -= leg.Sign * (leg.StrikeSlot == 0 ? low : high);
            }
        }

        return paid;
    }
}

/// <summary>All package kinds.</summary>
public static class PackageKinds
{
    /// <summary>Long stock, long put, short call.</summary>
    public static readonly PackageKind Conversion = new(Kind.Conversion, [new(LegOf.Stock, 1), new(LegOf.Put, 1), new(LegOf.Call, -1)], Side.Debit, 1);

    /// <summary>Short stock, short put, long call.</summary>
    public static readonly PackageKind Reversal = new(Kind.Reversal, [new(LegOf.Stock, -1), new(LegOf.Put, -1), new(LegOf.Call, 1)], Side.Credit, 1);

    /// <summary>Long the lower synthetic, short the higher.</summary>
    public static readonly PackageKind LongBox =
        new(Kind.LongBox, [new(LegOf.Call, 1, 0), new(LegOf.Put, -1, 0), new(LegOf.Call, -1, 1), new(LegOf.Put, 1, 1)], Side.Debit, 2);

    /// <summary>Short the lower synthetic, long the higher. Legs in the order of the worked trade: calls and puts of the lower strike, then of the higher.</summary>
    public static readonly PackageKind ShortBox =
        new(Kind.ShortBox, [new(LegOf.Call, -1, 0), new(LegOf.Put, 1, 0), new(LegOf.Call, 1, 1), new(LegOf.Put, -1, 1)], Side.Credit, 2);

    /// <summary>In the order that breaks ties.</summary>
    public static readonly ImmutableArray<PackageKind> All = [Conversion, Reversal, LongBox, ShortBox];

    /// <summary>The definition of a kind.</summary>
    public static PackageKind Of(Kind kind) => All[(int)kind];
}

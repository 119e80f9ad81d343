using System.Globalization;
using CarryTest.Market.Contracts;

namespace CarryTest.Parity.Packages;

/// <summary>What one package is, before its size and prices: its kind and its contracts.</summary>
/// <param name="Kind">the kind as data</param>
/// <param name="Root">the option root of all its legs</param>
/// <param name="Underlying">what it is written on</param>
/// <param name="Expiry">the expiry date that the contracts carry</param>
/// <param name="Low">the lower or only strike</param>
/// <param name="High">the higher strike; equals <paramref name="Low"/> for one strike</param>
public sealed record PackageTerms(PackageKind Kind, OptionRoot Root, Underlying Underlying, DateOnly Expiry, Strike Low, Strike High)
{
    /// <summary>The strike of a leg; for stock the only strike.</summary>
    public Strike StrikeOf(Leg leg) => leg.StrikeSlot == 0 ? Low : High;

    /// <summary>A leg in words: call 70, put 65, stock.</summary>
    public string NameOf(int leg) => Kind.Legs[leg].Of switch
    {
        LegOf.Call => $"call {StrikeOf(Kind.Legs[leg])}",
        LegOf.Put => $"put {StrikeOf(Kind.Legs[leg])}",
        _ => "stock",
    };

    /// <summary>What delivery pays per share, signed: + received.</summary>
    public double PaysAtExpiry => Kind.PaysAtExpiry(Low.PerShare, High.PerShare);

    /// <summary>What delivery pays per share without its sign: the strike, or the width of a box.</summary>
    public double Delivered => Math.Abs(PaysAtExpiry);

    /// <summary>Whether a leg has this right at this strike.</summary>
    public bool Touches(DateOnly expiry, Strike strike) => Expiry == expiry && (Low == strike || High == strike);

    /// <summary>root|kind|expiry|strikes|decided_at: the same package in two variants has the same key.</summary>
    public string Key(DateTime decidedAt) => string.Create(
        CultureInfo.InvariantCulture,
        $"{Root.Root}|{Market.Words.Vocabulary.Word(Kind.Kind)}|{Expiry:yyyy-MM-dd}|{Low}{(Kind.Strikes == 2 ? "/" + High : "")}|{decidedAt:yyyy-MM-dd'T'HH:mm:ss'Z'}");
}

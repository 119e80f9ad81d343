using System.Globalization;

namespace CarryTest.Market.Contracts;

/// <summary>A strike price per share as a whole number of thousandths, so that it can be a key.</summary>
/// <param name="Thousandths">thousandths of the currency, per share</param>
public readonly record struct Strike(int Thousandths) : IComparable<Strike>
{
    /// <summary>Currency per share.</summary>
    public double PerShare => Thousandths / 1000.0;

    /// <summary>The strike nearest to a price per share.</summary>
    public static Strike Of(double perShare) => new((int)Math.Round(perShare * 1000.0));

    /// <inheritdoc/>
    public int CompareTo(Strike other) => Thousandths.CompareTo(other.Thousandths);

    /// <summary>Compares.</summary>
    public static bool operator <(Strike a, Strike b) => a.Thousandths < b.Thousandths;

    /// <summary>Compares.</summary>
    public static bool operator >(Strike a, Strike b) => a.Thousandths > b.Thousandths;

    /// <summary>Compares.</summary>
    public static bool operator <=(Strike a, Strike b) => a.Thousandths <= b.Thousandths;

    /// <summary>Compares.</summary>
    public static bool operator >=(Strike a, Strike b) => a.Thousandths >= b.Thousandths;

    /// <summary>Without trailing zeros: 100, 97.5, 26.625.</summary>
    public override string ToString() => (Thousandths / 1000m).ToString("0.###", CultureInfo.InvariantCulture);
}

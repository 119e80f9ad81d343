using System.Globalization;

namespace CarryTest.Market.Money;

/// <summary>An amount of money in whole cents: everything that is booked. Positive is received, negative is paid, unless a member says otherwise.</summary>
/// <param name="Cents">whole cents</param>
public readonly record struct Cash(long Cents) : IComparable<Cash>
{
    // A product such as 0.0125 x 10 is a tie in decimal and may miss it in binary, by more the larger it is: whole and half cents are looked for within this of
    // the amount, a millionth of a cent or some units of its last binary place.
    private const double NearInCents = 5e-7;
    private const double NearRelative = 1e-15;

    /// <summary>No money.</summary>
    public static Cash Zero => default;

    /// <summary>The amount in currency.</summary>
    public decimal Amount => Cents / 100m;

    /// <summary>The amount in currency, as a double for ratios and figures.</summary>
    public double ToDouble() => Cents / 100.0;

    /// <summary>The one place where a computed amount becomes money: to the nearest cent, half to even.</summary>
    /// <param name="currency">an amount in currency; not NaN, not infinite, below 9e13</param>
    /// <exception cref="ArgumentOutOfRangeException">the amount is NaN, infinite or too large</exception>
    public static Cash Round(double currency) => new((long)Math.Round(CentsOf(currency), MidpointRounding.ToEven));

    /// <summary>To the next cent away from zero: the rounding of fees that are rounded up.</summary>
    /// <param name="currency">an amount in currency; not NaN, not infinite, below 9e13</param>
    /// <exception cref="ArgumentOutOfRangeException">the amount is NaN, infinite or too large</exception>
    public static Cash RoundUp(double currency)
    {
        double cents = CentsOf(currency);
        return new Cash((long)(cents < 0 ? Math.Floor(cents) : Math.Ceiling(cents)));
    }

    /// <summary>The part of this amount that falls on <paramref name="part"/> of <paramref name="whole"/> units, half to even.</summary>
    public Cash Share(long part, long whole)
    {
        if (whole == part)
        {
            return this;
        }

        decimal cents = decimal.Round((decimal)Cents * part / whole, 0, MidpointRounding.ToEven);
        return new Cash((long)cents);
    }

    private static double CentsOf(double currency)
    {
        if (!(Math.Abs(currency) < 9e13))
        {
            throw new ArgumentOutOfRangeException(nameof(currency), currency, "not an amount of money");
        }

        double cents = currency * 100.0;
        double half = Math.Round(cents * 2) / 2;
        return Math.Abs(cents - half) <= Math.Max(NearInCents, Math.Abs(cents) * NearRelative) ? half : cents;
    }

    /// <summary>Adds.</summary>
    public static Cash operator +(Cash a, Cash b) => new(a.Cents + b.Cents);

    /// <summary>Subtracts.</summary>
    public static Cash operator -(Cash a, Cash b) => new(a.Cents - b.Cents);

    /// <summary>Changes the sign.</summary>
    public static Cash operator -(Cash a) => new(-a.Cents);

    /// <summary>Compares.</summary>
    public static bool operator <(Cash a, Cash b) => a.Cents < b.Cents;

    /// <summary>Compares.</summary>
    public static bool operator >(Cash a, Cash b) => a.Cents > b.Cents;

    /// <summary>Compares.</summary>
    public static bool operator <=(Cash a, Cash b) => a.Cents <= b.Cents;

    /// <summary>Compares.</summary>
    public static bool operator >=(Cash a, Cash b) => a.Cents >= b.Cents;

    /// <inheritdoc/>
    public int CompareTo(Cash other) => Cents.CompareTo(other.Cents);

    /// <summary>Currency with two decimals, invariant.</summary>
    public override string ToString() => Amount.ToString("0.00", CultureInfo.InvariantCulture);
}

/// <summary>Sums of money.</summary>
public static class CashSums
{
    /// <summary>The sum, in the order given.</summary>
    public static Cash Total(this IEnumerable<Cash> amounts)
    {
        long cents = 0;
        foreach (Cash amount in amounts)
        {
            cents += amount.Cents;
        }

        return new Cash(cents);
    }

    /// <summary>The sum of what <paramref name="amountOf"/> takes from each item.</summary>
    public static Cash Total<T>(this IEnumerable<T> items, Func<T, Cash> amountOf) => items.Select(amountOf).Total();
}

using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Faults;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Expiry;

/// <summary>
/// Step 7 on the expiry day: own long options are exercised by exception, short ones are assigned. Within the pin band of a short option nobody knows how much is assigned until the morning:
/// the part waits for it as a pin.
/// </summary>
internal static class Expiring
{
    /// <summary>An own option is exercised where it is in the money by at least this, currency per share (exercise by exception).</summary>
    public const double ByException = 0.01;

    /// <summary>Prices this near count as equal, currency per share.</summary>
    public const double Tolerance = 1e-9;

    /// <summary>Books expiries of today; returns the pins, which are booked on the next morning.</summary>
    public static List<Pin> Run(BookState book, DateOnly today)
    {
        var pins = new List<Pin>();
        foreach (Package package in book.Packages)
        {
            if (package.Plan.Dates.Expiry != today || !package.Holds)
            {
                continue;
            }

            double price = SettlementPrice(book, package, today);
            book.Event(today, package, EventKind.Expiry, package.Plan.Units, price, package.Terms.Root.CashSettled ? "official settlement value" : "close of the expiry day");
            foreach (Part part in package.Parts.Where(p => p.Contracts.Any(c => c != 0)).ToArray())
            {
                if (!package.Terms.Root.CashSettled && InPinBand(book, package.Terms, part, price))
                {
                    pins.Add(new Pin(package, part, price, today));
                    continue;
                }

                Expire(book, package, part, price, today, today, [.. ShortAssigned(book, package.Terms, part, price)]);
            }
        }

        return pins;
    }

    /// <summary>Books the expiry of one part: what is exercised, assigned and lapsed, per leg.</summary>
    /// <param name="book">whose</param>
    /// <param name="package">the package</param>
    /// <param name="part">the part</param>
    /// <param name="price">settlement price per share</param>
    /// <param name="bookedOn">date of the books</param>
    /// <param name="expiry">trade date: the expiry day</param>
    /// <param name="assigned">contracts assigned, one a leg; 0 for long legs</param>
    public static void Expire(BookState book, Package package, Part part, double price, DateOnly bookedOn, DateOnly expiry, long[] assigned)
    {
        PackageTerms terms = package.Terms;
        Deal deal = book.Deal(package, part, bookedOn, expiry, null);
        for (int leg = 0; leg < part.Contracts.Length; leg++)
        {
            long held = part.Contracts[leg];
            if (held == 0)
            {
                continue;
            }

            long taken = held > 0 ? (InTheMoney(terms, leg, price) >= ByException - Tolerance ? held : 0) : assigned[leg];
            if (taken > 0)
            {
                deal.Exercise(leg, taken, price);
            }

            if (Math.Abs(held) > taken)
            {
                deal.Lapse(leg, Math.Abs(held) - taken);
            }
        }

        package.Mark(Ending.Expired);
        deal.Book();
        if (part.Stock != 0)
        {
            part.Leftover = Leftover.Close;
        }
    }

    /// <summary>How far an option is in the money at a price, currency per share; negative out of it.</summary>
    public static double InTheMoney(PackageTerms terms, int leg, double price)
    {
        Leg definition = terms.Kind.Legs[leg];
        double strike = terms.StrikeOf(definition).PerShare;
        return definition.Of == LegOf.Call ? price - strike : strike - price;
    }

    /// <summary>Contracts assigned of each short leg: all in the money, none out of it, a fraction within the band.</summary>
    public static IEnumerable<long> ShortAssigned(BookState book, PackageTerms terms, Part part, double price)
    {
        for (int leg = 0; leg < part.Contracts.Length; leg++)
        {
            long contracts = Math.Max(0, -part.Contracts[leg]);
            double fraction = contracts == 0 ? 0
                : terms.Root.CashSettled ? (InTheMoney(terms, leg, price) > 0 ? 1 : 0)
                : Fraction(InTheMoney(terms, leg, price), book.Rules.Assignment.PinBand, book.Rules.Assignment.PinFraction);
            yield return (long)Math.Round(contracts * fraction, MidpointRounding.ToEven);
        }
    }

    /// <summary>The fraction of a short option that is assigned at expiry: 1 from the band on, falling over the strike to 0 at the band's other end.</summary>
    /// <param name="inTheMoney">currency per share, negative out of the money</param>
    /// <param name="band">the pin band, currency per share</param>
    /// <param name="atTheStrike">the fraction exactly at the strike</param>
    public static double Fraction(double inTheMoney, double band, double atTheStrike)
    {
        if (inTheMoney >= band - Tolerance)
        {
            return inTheMoney > Tolerance || band > 0 ? 1 : atTheStrike;
        }

        if (inTheMoney <= -band + Tolerance)
        {
            return 0;
        }

        return inTheMoney >= 0
            ? atTheStrike + ((1 - atTheStrike) * inTheMoney / band)
            : atTheStrike * (1 + (inTheMoney / band));
    }

    private static bool InPinBand(BookState book, PackageTerms terms, Part part, double price)
    {
        for (int leg = 0; leg < part.Contracts.Length; leg++)
        {
            if (part.Contracts[leg] < 0 && Math.Abs(InTheMoney(terms, leg, price)) < book.Rules.Assignment.PinBand - Tolerance)
            {
                return true;
            }
        }

        return false;
    }

    private static double SettlementPrice(BookState book, Package package, DateOnly today)
    {
        PackageTerms terms = package.Terms;
        if (terms.Root.CashSettled)
        {
            return book.Tables.SettlementOf(terms.Root.Root, terms.Expiry) ?? throw new InputException(
                $"reference table `settlements`: no row for root {terms.Root.Root}, expiry {terms.Expiry:yyyy-MM-dd}, which the book holds. Add its official settlement value.");
        }

        if (book.Tables.CloseOf(terms.Underlying.Symbol, today) is { } close)
        {
            return close;
        }

        if (book.ChainOf(terms.Root.Root, today) is { } chain && !double.IsNaN(chain.UnderlyingMid))
        {
            return chain.UnderlyingMid;
        }

        double last = book.LastMid(terms);
        book.MustLook = true;
        book.Event(today, package, EventKind.MissingPrice, package.Plan.Units, last, "the expiry day has neither a close nor a snapshot; the last known price was used");
        return last;
    }
}

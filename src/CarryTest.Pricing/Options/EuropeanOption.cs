using CarryTest.Pricing.Normal;

namespace CarryTest.Pricing.Options;

/// <summary>
/// Options exercisable at expiry only, on a lognormal price at expiry (F. Black, The pricing of commodity contracts,
/// Journal of Financial Economics 3, 1976).
/// </summary>
public static class EuropeanOption
{
    /// <summary>Value today, per share.</summary>
    /// <param name="right">call or put</param>
    /// <param name="forward">expected price at expiry; at or below 0 the price is taken as certain to be 0 at expiry</param>
    /// <param name="strike">not negative</param>
    /// <param name="discount">value today of 1 paid when the exercise settles</param>
    /// <param name="standardDeviation">of the logarithm of the price at expiry: volatility times the root of the years of
    /// variance; at or below 0 the price is taken as certain; infinite gives the upper bound</param>
    public static double Price(OptionRight right, double forward, double strike, double discount, double standardDeviation)
    {
        // The out-of-the-money side is computed and the other follows by parity: no digits are lost in the tails.
        double certain = Math.Max(forward, 0);
        double intrinsic = right == OptionRight.Call ? Math.Max(certain - strike, 0) : Math.Max(strike - certain, 0);
        return discount * (intrinsic + TimeValue(certain, strike, standardDeviation));
    }

    /// <summary>Change of the undiscounted value per unit of the forward: 0 to 1 for a call, -1 to 0 for a put; the middle at the kink.</summary>
    public static double ForwardDelta(OptionRight right, double forward, double strike, double standardDeviation)
    {
        double call;
        if (!(forward > 0) || !(strike > 0) || !(standardDeviation > 0))
        {
            double certain = Math.Max(forward, 0);
            call = certain > strike ? 1 : certain < strike ? 0 : 0.5;
        }
        else
        {
            call = NormalDistribution.Below((Math.Log(forward / strike) / standardDeviation) + (0.5 * standardDeviation));
        }

        return right == OptionRight.Call ? call : call - 1;
    }

    /// <summary>Change of the value per unit of standard deviation, the same for calls and puts; multiply by the root of the years for vega per unit of volatility.</summary>
    public static double Vega(double forward, double strike, double discount, double standardDeviation)
    {
        if (!(forward > 0) || !(strike > 0))
        {
            return 0;
        }

        double moneyness = Math.Log(forward / strike);
        if (!(standardDeviation > 0))
        {
            return moneyness is 0 ? discount * forward * NormalDistribution.Density(0) : 0;
        }

        return discount * forward * NormalDistribution.Density((moneyness / standardDeviation) + (0.5 * standardDeviation));
    }

    /// <summary>Undiscounted value of the out-of-the-money option of the pair.</summary>
    private static double TimeValue(double forward, double strike, double standardDeviation)
    {
        if (!(forward > 0) || !(strike > 0) || !(standardDeviation > 0))
        {
            return double.IsNaN(forward + strike + standardDeviation) ? double.NaN : 0;
        }

        double low = Math.Min(forward, strike);
        double high = Math.Max(forward, strike);
        double distance = Math.Log(low / high) / standardDeviation;
        double half = 0.5 * standardDeviation;
        return Math.Max((low * NormalDistribution.Below(distance + half)) - (high * NormalDistribution.Below(distance - half)), 0);
    }
}

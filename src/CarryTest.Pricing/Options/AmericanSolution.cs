namespace CarryTest.Pricing.Options;

/// <summary>
/// Values of one contract with and without the right to exercise early, both from one backward sweep, as functions of the spot.
/// Any number of threads may read it.
/// </summary>
public sealed class AmericanSolution
{
    private readonly OptionTerms _terms;
    private readonly Func<double, double> _european;
    private readonly Func<double, double>? _premium;

    /// <param name="terms">the contract</param>
    /// <param name="spotLow">lowest spot that may be asked for</param>
    /// <param name="spotHigh">highest spot that may be asked for</param>
    /// <param name="european">value without early exercise</param>
    /// <param name="premium">worth of early exercise; null where exercise never pays</param>
    internal AmericanSolution(
        OptionTerms terms, double spotLow, double spotHigh, Func<double, double> european, Func<double, double>? premium)
    {
        _terms = terms;
        SpotLow = spotLow;
        SpotHigh = spotHigh;
        _european = european;
        _premium = premium;
    }

    /// <summary>Lowest spot that may be asked for.</summary>
    public double SpotLow { get; }

    /// <summary>Highest spot that may be asked for.</summary>
    public double SpotHigh { get; }

    /// <summary>Value with the right to exercise early, per share; never below what exercise pays now.</summary>
    /// <exception cref="ArgumentOutOfRangeException">the spot lies outside the range that was asked for</exception>
    public double American(double spot)
    {
        double european = European(spot);
        return european + PremiumOver(european, spot);
    }

    /// <summary>Value without the right to exercise early, per share, in the same model of dividends.</summary>
    /// <exception cref="ArgumentOutOfRangeException">the spot lies outside the range that was asked for</exception>
    public double European(double spot)
    {
        if (!(spot >= SpotLow && spot <= SpotHigh))
        {
            throw new ArgumentOutOfRangeException(nameof(spot), spot, FormattableString.Invariant($"The option was solved for spots from {SpotLow} to {SpotHigh}."));
        }

        return _european(spot);
    }

    /// <summary>What the right to exercise early is worth, per share: American less European; never negative.</summary>
    /// <exception cref="ArgumentOutOfRangeException">the spot lies outside the range that was asked for</exception>
    public double Premium(double spot) => PremiumOver(European(spot), spot);

    private double PremiumOver(double european, double spot)
    {
        if (_premium is null)
        {
            return 0;
        }

        // At the exercise price the value bends, and an interpolated curve may pass a hair under what exercise pays.
        return Math.Max(Math.Max(_premium(spot), 0), _terms.Exercise(spot) - european);
    }
}

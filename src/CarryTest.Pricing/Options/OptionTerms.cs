namespace CarryTest.Pricing.Options;

/// <summary>One contract in its market, checked.</summary>
/// <param name="Right">call or put</param>
/// <param name="Strike">above 0</param>
/// <param name="Years">of variance, not negative</param>
/// <param name="Rate">continuous, per year of variance</param>
/// <param name="Yield">continuous, not negative</param>
/// <param name="Volatility">not negative</param>
internal readonly record struct OptionTerms(OptionRight Right, double Strike, double Years, double Rate, double Yield, double Volatility)
{
    /// <summary>Makes terms or says which argument is out of range.</summary>
    public static OptionTerms Checked(OptionRight right, double strike, double years, double rate, double yield, double volatility)
    {
        Require(right is OptionRight.Call or OptionRight.Put, nameof(right), (double)right, "call or put");
        Require(strike > 0 && double.IsFinite(strike), nameof(strike), strike, "above 0");
        Require(years >= 0 && double.IsFinite(years), nameof(years), years, "0 or more");
        Require(double.IsFinite(rate), nameof(rate), rate, "a number");
        Require(yield >= 0 && double.IsFinite(yield), nameof(yield), yield, "0 or more");
        Require(volatility >= 0 && double.IsFinite(volatility), nameof(volatility), volatility, "0 or more");
        return new OptionTerms(right, strike, years, rate, yield, volatility);
    }

    /// <summary>Growth of the logarithm of the price, a year.</summary>
    public double Drift => Rate - Yield - (0.5 * Volatility * Volatility);

    /// <summary>What exercise pays now; negative where it costs.</summary>
    public double Exercise(double spot) => Right == OptionRight.Call ? spot - Strike : Strike - spot;

    /// <summary>What exercise pays now, or nothing.</summary>
    public double Intrinsic(double spot) => Math.Max(Exercise(spot), 0);

    /// <summary>European value without cash dividends.</summary>
    public double BlackValue(double spot) => BlackValue(spot, Years);

    /// <summary>European value some years before expiry, no cash dividends between.</summary>
    public double BlackValue(double spot, double years) => EuropeanOption.Price(
        Right, spot * Math.Exp((Rate - Yield) * years), Strike, Math.Exp(-Rate * years), Volatility * Math.Sqrt(years));

    /// <summary>Whether exercise can pay between two ex-dates: puts earn interest on the strike, calls the yield or a negative rate.</summary>
    public bool ExercisedBetweenExDates => Right == OptionRight.Put ? Rate > 0 : Rate < 0 || Yield > 0;

    /// <summary>Whether exercise before expiry can pay at all; a call is also exercised just before an ex-date.</summary>
    public bool MayBeExercisedEarly(bool dividends) => ExercisedBetweenExDates || (Right == OptionRight.Call && dividends);

    private static void Require(bool holds, string name, double found, string expected)
    {
        if (!holds)
        {
            throw new ArgumentException(FormattableString.Invariant($"{name} must be {expected}, found {found}."), name);
        }
    }
}

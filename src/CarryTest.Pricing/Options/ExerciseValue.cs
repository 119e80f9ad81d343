namespace CarryTest.Pricing.Options;

/// <summary>What exercise pays at one instant, in u = value exp(rate τ), as a straight line in exp(x).</summary>
/// <param name="Level">at exp(x) = 0: the strike, its sign that of the payoff</param>
/// <param name="Slope">per unit of exp(x)</param>
/// <param name="LevelLoss">what is lost a year by waiting, at exp(x) = 0: the interest on the strike</param>
/// <param name="SlopeLoss">the same per unit of exp(x): the yield of the price</param>
internal readonly record struct ExerciseValue(double Level, double Slope, double LevelLoss, double SlopeLoss)
{
    /// <summary>The line at a row.</summary>
    public double At(double exponential) => Level + (Slope * exponential);

    /// <summary>Lost a year by waiting where exercise pays.</summary>
    public double LossOfWaiting(double exponential) => LevelLoss + (SlopeLoss * exponential);
}

/// <summary>
/// The first row that is held, counted from the side on which exercise pays, and how much a year the part of its cell where
/// exercise pays adds to its value; row 0: none.
/// </summary>
/// <param name="Row">of the grid</param>
/// <param name="SourcePerYear">in u</param>
internal readonly record struct ExerciseEdge(int Row, double SourcePerYear);

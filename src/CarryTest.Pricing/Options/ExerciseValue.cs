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

/// <summary>The first row that is held, counted from the side on which exercise pays.</summary>
/// <param name="Row">of the grid; 0: none</param>
/// <param name="Distance">from the exercise price to the row, in steps, at most 1</param>
/// <param name="Curve">gain of holding one step beyond the exercise price, in u; it grows with the square of the distance</param>
/// <param name="Exercise">what exercise pays at that instant</param>
internal readonly record struct ExerciseEdge(int Row, double Distance, double Curve, ExerciseValue Exercise);

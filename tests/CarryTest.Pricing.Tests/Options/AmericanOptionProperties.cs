using CarryTest.Pricing.Options;
using CsCheck;

namespace CarryTest.Pricing.Tests.Options;

public sealed class AmericanOptionProperties
{
    /// <summary>Error of the grid, as a fraction of the strike.</summary>
    private const double Tolerance = 2e-5;

    private const int Cases = 600;

    private static readonly Gen<CashDividend[]> Dividends =
        Gen.Select(Gen.Double[0.001, 2.0], Gen.Double[0.01, 4.0], (years, amount) => new CashDividend(years, amount)).Array[0, 4];

    private static readonly Gen<Case> Any = Gen.Select(
        Gen.Select(Gen.Bool, Gen.Double[50, 200]), Gen.Double[0.003, 2], Gen.Double[-0.03, 0.12], Gen.Double[0.03, 1], Dividends,
        (contract, years, rate, volatility, dividends) => new Case(
            contract.Item1 ? OptionRight.Call : OptionRight.Put, contract.Item2, years, rate, volatility, dividends));

    [Fact]
    public void American_AnyMarket_IsWorthAtLeastEuropeanAndExercise() => Any.Sample(
        c =>
        {
            AmericanSolution solution = c.Solve(GridSize.Fast);
            for (double spot = 40; spot <= 250; spot += 7)
            {
                double exercise = c.Right == OptionRight.Call ? spot - c.Strike : c.Strike - spot;
                Assert.True(solution.European(spot) >= 0);
                Assert.True(solution.Premium(spot) >= 0);
                Assert.True(solution.American(spot) >= solution.European(spot));
                Assert.True(solution.American(spot) >= exercise - 1e-9);
            }
        },
        iter: Cases);

    [Fact]
    public void European_DividendsBelowThePrice_ObeysParity() => Any.Where(c => c.Volatility * Math.Sqrt(c.Years) < 0.6).Sample(
        c =>
        {
            AmericanSolution call = (c with { Right = OptionRight.Call }).Solve(GridSize.Standard);
            AmericanSolution put = (c with { Right = OptionRight.Put }).Solve(GridSize.Standard);
            double present = c.Kept.Sum(d => d.Amount * Math.Exp(-c.Rate * d.Years));
            foreach (double spot in new[] { 80.0, 100, 125 })
            {
                double expected = spot - present - (c.Strike * Math.Exp(-c.Rate * c.Years));

                // Where a dividend may exceed the price it is not paid in full, and parity with the full amounts does not hold.
                Assert.InRange((call.European(spot) - put.European(spot) - expected) / c.Strike, -Tolerance, Tolerance);
            }
        },
        iter: Cases);

    [Fact]
    public void American_AnyMarket_LiesWithinParityBounds() => Any.Sample(
        c =>
        {
            AmericanSolution call = (c with { Right = OptionRight.Call }).Solve(GridSize.Standard);
            AmericanSolution put = (c with { Right = OptionRight.Put }).Solve(GridSize.Standard);
            double present = c.Kept.Sum(d => d.Amount * Math.Exp(-c.Rate * d.Years));
            double dearest = c.Strike * Math.Max(1, Math.Exp(-c.Rate * c.Years));
            double cheapest = c.Strike * Math.Min(1, Math.Exp(-c.Rate * c.Years));
            foreach (double spot in new[] { 80.0, 100, 125 })
            {
                double difference = call.American(spot) - put.American(spot);
                double slack = 2e-4 * c.Strike;
                Assert.InRange(difference, spot - present - dearest - slack, spot - cheapest + slack);
            }
        },
        iter: Cases);

    [Fact]
    public void American_MoreVolatility_IsNotWorthLess() => Any.Sample(
        c =>
        {
            AmericanSolution less = c.Solve(GridSize.Standard);
            AmericanSolution more = (c with { Volatility = c.Volatility * 1.05 }).Solve(GridSize.Standard);
            foreach (double spot in new[] { 70.0, 90, 100, 110, 140 })
            {
                Assert.True(more.American(spot) >= less.American(spot) - (Tolerance * c.Strike));
            }
        },
        iter: Cases);

    [Fact]
    public void American_HigherSpot_MovesTheRightWayAndNoFasterThanThePrice() => Any.Sample(
        c =>
        {
            AmericanSolution solution = c.Solve(GridSize.Standard);
            for (double spot = 60; spot < 200; spot += 5)
            {
                double change = solution.American(spot + 1) - solution.American(spot);
                double signed = c.Right == OptionRight.Call ? change : -change;
                Assert.InRange(signed, -Tolerance * c.Strike, 1 + (Tolerance * c.Strike));
            }
        },
        iter: Cases);

    [Fact]
    public void Premium_AnyMarket_LiesWithinItsBounds() => Any.Where(c => c.Volatility * Math.Sqrt(c.Years) < 0.6).Sample(
        c =>
        {
            AmericanSolution solution = c.Solve(GridSize.Standard);
            double upper = PremiumBounds.Upper(c.Right, c.Strike, c.Years, c.Rate, c.Dividends);
            foreach (double spot in new[] { 45.0, 70, 90, 100, 110, 140, 240 })
            {
                double lower = PremiumBounds.Lower(c.Right, spot, c.Strike, solution.European(spot));
                Assert.InRange(solution.Premium(spot), lower - 1e-9, upper + (Tolerance * c.Strike));
            }
        },
        iter: Cases);

    [Fact]
    public void Solve_EverythingScaled_ScalesThePremium() => Any.Sample(
        c =>
        {
            Case scaled = c with
            {
                Strike = 2 * c.Strike,
                Dividends = [.. c.Dividends.Select(d => d with { Amount = 2 * d.Amount })],
            };
            AmericanSolution one = AmericanOption.Solve(
                c.Right, c.Strike, c.Years, c.Rate, c.Volatility, c.Dividends, 90, 110, GridSize.Fast);
            AmericanSolution two = AmericanOption.Solve(
                scaled.Right, scaled.Strike, scaled.Years, scaled.Rate, scaled.Volatility, scaled.Dividends, 180, 220, GridSize.Fast);

            // Rounding may lay one row more or less.
            Assert.Equal(2 * one.American(100), two.American(200), 1e-3);
        },
        iter: Cases);

    [Fact]
    public void Solve_StandardGrid_AgreesWithTheFineOne() => Any.Sample(
        c =>
        {
            // Of the strike: within a year at common volatilities, up to a deviation of 0.8, and beyond.
            double deviation = c.Volatility * Math.Sqrt(c.Years);
            double tolerance = c.Years <= 1 && c.Volatility <= 0.6 ? 1e-5 : deviation <= 0.8 ? 6e-5 : 5e-4;
            AmericanSolution standard = c.Solve(GridSize.Standard);
            AmericanSolution fine = c.Solve(GridSize.Fine);
            foreach (double spot in new[] { 70.0, 90, 100, 110, 140 })
            {
                Assert.InRange((standard.American(spot) - fine.American(spot)) / c.Strike, -tolerance, tolerance);
                Assert.InRange((standard.Premium(spot) - fine.Premium(spot)) / c.Strike, -tolerance, tolerance);
            }
        },
        iter: 400);

    private sealed record Case(
        OptionRight Right, double Strike, double Years, double Rate, double Volatility, CashDividend[] Dividends)
    {
        public IEnumerable<CashDividend> Kept => Dividends.Where(d => d.Years > 0 && d.Years <= Years);

        public AmericanSolution Solve(GridSize size)
            => AmericanOption.Solve(Right, Strike, Years, Rate, Volatility, Dividends, 40, 260, size);

        public override string ToString()
            => FormattableString.Invariant($"{Right} K={Strike:R} T={Years:R} r={Rate:R} v={Volatility:R} [{string.Join(", ", Dividends)}]");
    }
}

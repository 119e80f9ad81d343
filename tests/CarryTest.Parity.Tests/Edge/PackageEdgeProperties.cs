using CarryTest.Parity.Packages;
using CsCheck;

namespace CarryTest.Parity.Tests.Edge;

public sealed class PackageEdgeProperties
{
    private const double Tolerance = 1e-5;

    private static readonly Gen<double> Cents = Gen.Int[100, 2000].Select(c => c / 100.0);
    private static readonly Gen<double> Spread = Gen.Int[0, 50].Select(c => c / 100.0);

    [Fact]
    public void ConversionAndReversal_AtOneRate_LoseExactlyTheSpreads() =>
        Gen.Select(Cents, Spread, Cents, Spread, Spread, Gen.Int[90, 110]).Sample((call, callSpread, put, putSpread, stockSpread, strike) =>
        {
            const double stock = 100;
            double conversion = Edge(Kind.Conversion, strike, strike, [stock + stockSpread, put + putSpread, call]);
            double reversal = Edge(Kind.Reversal, strike, strike, [stock, put, call + callSpread]);

            double zs = Week.ToFill(0.0001);
            Assert.Equal(-zs * (stockSpread + callSpread + putSpread), conversion + reversal, Tolerance);
        });

    [Fact]
    public void Box_IsAConversionAtOneStrikeAndAReversalAtTheOther() =>
        Gen.Select(Cents, Cents, Cents, Cents, Gen.Int[80, 99], Gen.Int[101, 120]).Sample((callLow, putLow, callHigh, putHigh, low, high) =>
        {
            // With one stock price the stock of the two cancels. A long box is bought at the lower strike: a reversal there, a conversion at the higher.
            double box = Edge(Kind.LongBox, low, high, [callLow, putLow, callHigh, putHigh]);
            double reversal = Edge(Kind.Reversal, low, low, [100, putLow, callLow]);
            double conversion = Edge(Kind.Conversion, high, high, [100, putHigh, callHigh]);
            Assert.Equal(reversal + conversion, box, Tolerance);

            double opposite = Edge(Kind.ShortBox, low, high, [callLow, putLow, callHigh, putHigh]);
            Assert.Equal(-box, opposite, Tolerance);
        });

    [Fact]
    public void Prices_ScaledTogether_ScaleTheEdge() =>
        Gen.Select(Cents, Cents, Gen.Bool, Gen.Int[2, 20]).Sample((call, put, converts, scale) =>
        {
            Kind kind = converts ? Kind.Conversion : Kind.Reversal;
            double edge = Edge(kind, 100, 100, [100, put, call]);
            double scaled = Edge(kind, 100 * scale, 100 * scale, [100 * scale, put * scale, call * scale]);
            Assert.Equal(scale * edge, scaled, Tolerance * scale);
        });

    private static double Edge(Kind kind, double low, double high, double[] prices) => Week.Plan(kind, low, high, prices, believed: Week.OneRate).EdgePerShare;
}

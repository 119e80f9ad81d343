using CarryTest.Reports.Figures;

namespace CarryTest.Reports.Tests.Figures;

public sealed class ScaleTests
{
    [Theory]
    [InlineData(0, 10, 5, "0,2,4,6,8,10")]
    [InlineData(-5, 5, 5, "\u22124,\u22122,0,2,4")]
    [InlineData(0, 0.1, 4, "0.00,0.05,0.10")]
    [InlineData(1_999_000, 2_011_000, 4, "2\u00b4000\u00b4000,2\u00b4005\u00b4000,2\u00b4010\u00b4000")]
    public void Ticks_OfNumbers_AreRoundSteps(double low, double high, int most, string expected)
    {
        var axis = new Axis(AxisKind.Numbers, "");
        Assert.Equal(expected, string.Join(',', new Scale(low, high, AxisKind.Numbers).Ticks(axis, most).Select(t => t.Text.Replace(',', '\u00b4'))));
    }

    [Fact]
    public void Ticks_OfAYear_AreMonths()
    {
        var scale = new Scale(new DateOnly(2025, 1, 2).DayNumber, new DateOnly(2025, 12, 31).DayNumber, AxisKind.Dates);
        Assert.Equal(["2025-04", "2025-07", "2025-10"], scale.Ticks(new Axis(AxisKind.Dates, ""), 4).Select(t => t.Text));
    }

    [Fact]
    public void Scale_OfOneValue_HasRoom()
    {
        var panel = new Panel(new Axis(AxisKind.Numbers, ""), new Axis(AxisKind.Numbers, ""), [new Dots("", Tone.First, Shape.Circle, [3], [0])], 100);
        Assert.InRange(Scale.OfX(panel).Place(3), 0.4, 0.6);
        Assert.InRange(Scale.OfY(panel).Place(0), 0.4, 0.6);
    }

    [Fact]
    public void Place_OnALogarithmicAxis_IsByPowersOfTen()
    {
        var scale = new Scale(0, 4, AxisKind.Logarithm);
        Assert.Equal(0.5, scale.Place(100), 12);
        Assert.Equal(0.75, scale.Place(1000), 12);
    }
}

using System.Collections.Immutable;
using CarryTest.Parity.Costs;

namespace CarryTest.Rules.Tests;

/// <summary>The files that a rule book names: the fee schedule and the table of forecast dividends.</summary>
public sealed class SideFileTests : IDisposable
{
    private const string Row = "[[fee]]\nline = \"clearing\"\napplies_to = \"equity-option\"\nbasis = \"contract\"\nrate = 0.02\nsource = \"invented\"\n";

    private const string Header = "symbol,ex_on,paid_on,amount,known_on\n";

    private readonly RuleBookFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void FeeSchedule_IsReadRowByRow()
    {
        ImmutableArray<FeeRow> rows = Schedule("# comment\n" + Row + "minimum = 0.1\ncap = 55\ncap_basis = \"order\"\nrounding = \"up\"\nside = \"sell\"\nfrom = 2025-01-02\nto = 2025-12-31\nknown_on = 2024-12-01\n\n" + Row).Rows;
        Assert.Equal(2, rows.Length);
        Assert.Equal(
            new FeeRow
            {
                Line = "clearing",
                AppliesTo = FeeApplies.EquityOption,
                Side = FeeSide.Sell,
                Basis = FeeBasis.Contract,
                Rate = 0.02,
                Minimum = 0.1,
                Cap = 55,
                CapBasis = FeeCapBasis.Order,
                Rounding = FeeRounding.Up,
                From = new DateOnly(2025, 1, 2),
                To = new DateOnly(2025, 12, 31),
                KnownOn = new DateOnly(2024, 12, 1),
                Source = "invented",
            },
            rows[0]);
        Assert.Equal(new FeeRow { Line = "clearing", AppliesTo = FeeApplies.EquityOption, Basis = FeeBasis.Contract, Rate = 0.02, Source = "invented" }, rows[1]);
    }

    [Theory]
    [InlineData(Row + "form = 2025-01-02", "fees.toml:7:1: unknown key `fee.form`; the nearest known one is `fee.from`")]
    [InlineData(Row + "from = 2025-02-01\nto = 2025-01-31", "fees.toml:8:6: `fee.to`, 2025-01-31, lies before `fee.from`, 2025-02-01")]
    [InlineData(Row + "minimum = 2\ncap = 1", "fees.toml:8:7: `fee.cap`, 1, is less than `fee.minimum`, 2")]
    [InlineData(Row + "side = \"long\"", "fees.toml:7:8: `fee.side` must be one of buy | sell | both; found \"long\"")]
    [InlineData("[[fee]]\nline = \"Clearing fee\"\napplies_to = \"stock\"\nbasis = \"share\"\nrate = 1\nsource = \"x\"", "fees.toml:2:8: `fee.line` must be the name of an account in quotes: lower-case letters, digits and hyphens; found \"Clearing fee\"")]
    [InlineData(Row + "[[fee]]\nline = \"x\"\napplies_to = \"stock\"\nbasis = \"share\"\nrate = 1", "fees.toml:7:3: `fee.source` is missing; it must be where the figure comes from, in quotes")]
    [InlineData("name = \"x\"\n" + Row, "fees.toml:1:1: unknown key `name`; the nearest known one is `fee`")]
    [InlineData("# nothing", "fees.toml:1:1: `fee` is missing: a fee schedule has one [[fee]] or more; for no fees write costs.schedule = \"none\" in the rule book")]
    public void FeeSchedule_WithAMistake_IsRefusedAtItsPlace(string schedule, string message)
    {
        _folder.Write("fees.toml", schedule);
        Assert.Equal(message, _folder.Refusal(Texts.Shortest, "costs.schedule=fees.toml"));
    }

    [Fact]
    public void FeeSchedule_ThatIsMissing_IsAskedForWhereItIsNamed()
    {
        string text = Texts.Shortest.Replace("\"none\"", "\"fees/nowhere.toml\"", StringComparison.Ordinal);
        Assert.Equal("rules.toml:3:18: the fee schedule fees/nowhere.toml does not exist; a file is expected there", _folder.Refusal(text).Replace('\\', '/'));
    }

    [Theory]
    [InlineData("symbol,ex_on,paid_on,amount\n", "forecast.csv:1:1: column `known_on` is missing; the first line must name symbol,ex_on,paid_on,amount,known_on")]
    [InlineData("symbol,ex_on,paid_on,amount,known_on,notes\n", "forecast.csv:1:38: unknown column `notes`; the nearest known one is `ex_on`")]
    [InlineData("symbol,ex_on,paid_on,amount,known_on,amount\n", "forecast.csv:1:38: column `amount` is given twice")]
    [InlineData(Header + "KESTREL,2025-03-10,2025-03-24,0.45\n", "forecast.csv:2:1: this line has 4 values, the first line names 5 columns")]
    [InlineData(Header + "KESTREL,10.03.2025,2025-03-24,0.45,2025-01-02\n", "forecast.csv:2:9: `ex_on` must be a date as 2025-01-02; found \"10.03.2025\"")]
    [InlineData(Header + "KESTREL,2025-03-10,2025-03-24,-1,2025-01-02\n", "forecast.csv:2:31: `amount` must be a number above 0, at most 1000, currency per share, with a point; found \"-1\"")]
    [InlineData(Header + "KESTREL,2025-03-10,2025-03-24,1,2025-03-10\n", "forecast.csv:2:33: `known_on` must lie before ex_on: a row is believed from the day after known_on on; found \"2025-03-10\"")]
    [InlineData(Header + "\"KESTREL\",2025-03-10,2025-03-24,1,2025-01-02\r\n", "forecast.csv:2:1: `symbol` must be a name without spaces and quotes; found \"\\\"KESTREL\\\"\"")]
    [InlineData(Header + "KESTREL,2025-03-10,2025-03-24,1,2025-01-02\nKESTREL,2025-03-10,2025-03-24,2,2025-01-02\n", "forecast.csv:3:1: KESTREL has this ex_on and known_on in an earlier line already; one of them must go")]
    public void ForecastTable_WithAMistake_IsRefusedAtItsPlace(string table, string message)
    {
        _folder.Write("forecast.csv", table);
        Assert.Equal(message, _folder.Refusal(Texts.Shortest, "dividends.forecast=forecast.csv"));
    }

    private FeeSchedule Schedule(string text)
    {
        _folder.Write("fees.toml", text);
        return _folder.Read(Texts.Shortest, "costs.schedule=fees.toml").Book.Costs.Schedule;
    }
}

using CarryTest.Carry.Assignment;
using CarryTest.Parity.Funding;
using CarryTest.Studies;

namespace CarryTest.Rules.Tests;

public sealed class OverrideTests : IDisposable
{
    private readonly RuleBookFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void Override_OfAWrittenKey_TakesItsPlace()
    {
        RuleBook read = _folder.Read(Texts.Shortest + "entry.per_share = 0.02\n", "entry.per_share=0.05", "entry.per_share = 0.06");
        Assert.Equal(0.06, read.Book.Entry.PerShare);
        Assert.Equal(["entry.per_share=0.05", "entry.per_share = 0.06"], read.Overrides);
    }

    [Fact]
    public void Override_WithAWord_NeedsNoQuotes()
    {
        RuleBook read = _folder.Read(Texts.Shortest, "assignment.rule=none", "history.folder=../some where", "funding.believed.day_count=act/365", "name=\"2025\"", "history.from=2025-01-02");
        Assert.Equal(AssignmentRule.None, read.Book.Assignment.Rule);
        Assert.EndsWith("some where", read.History.Folder, StringComparison.Ordinal);
        Assert.Equal(DayCount.Act365, read.Book.Funding.Believed.DayCount);
        Assert.Equal("2025", read.Name);
        Assert.Equal(new DateOnly(2025, 1, 2), read.History.From);
    }

    [Fact]
    public void Override_OfATable_ReplacesIt_AndOfAKeyInIt_OnlyThatKey()
    {
        const string Text = Texts.Shortest + "funding.believed = { kind = \"flat\", rate = 0.05, debit_spread_bps = 10 }\n";
        Assert.Equal(new FundingAssumption { Kind = FundingKind.Overnight }, _folder.Read(Text, "funding.believed={ kind = \"overnight\" }").Book.Funding.Believed);
        Assert.Equal(new FundingAssumption { Kind = FundingKind.Flat, Rate = 0.04, DebitSpreadBps = 10 }, _folder.Read(Text, "funding.believed.rate=0.04").Book.Funding.Believed);
    }

    [Fact]
    public void Override_MendsWhatTheFileHasWrong() =>
        Assert.Equal(AssignmentRule.Chain, _folder.Read(Texts.Shortest + "assignment.rule = \"boundary\"\n", "assignment.rule=chain").Book.Assignment.Rule);

    [Theory]
    [InlineData("entry.per_shar=1", "--set entry.per_shar=1: unknown key `entry.per_shar`; the nearest known one is `entry.per_share`")]
    [InlineData("entry.too_good=2", "--set entry.too_good=2: `entry.too_good` must be a number above 0, at most 1; found 2")]
    [InlineData("entry.too_good=0,01", "--set entry.too_good=0,01: `entry.too_good` must be a number above 0, at most 1; found \"0,01\"")]
    [InlineData("assignment.rule=every", "--set assignment.rule=every: `assignment.rule = \"every\"` comes with a later version; this one knows chain | none")]
    [InlineData("borrow.notice_days=2", "--set borrow.notice_days=2: `borrow.notice_days` has no effect in this version: recalls of borrowed stock come with a later version; take the key out")]
    [InlineData("entry=5", "--set entry=5: `entry` is a table of keys (per_share, bps_per_year, times_costs, too_good, max_spread_fraction, min_price_for_spread, stale_after_sessions, stock_agrees, ex_date_margin_days, max_undeclared_dividend, max_dividend_loss, long_exercise_value); found 5")]
    [InlineData("entry.per_share", "--set entry.per_share: write a setting and its value, as --set entry.per_share=0.05")]
    [InlineData("name=2025", "--set name=2025: `name` must be a name fit for a folder in quotes (letters, digits, spaces, `-`, `_` and `.`, at most 100); found 2025")]
    [InlineData("history.from=2025-06-02", "rules.toml:4:14: `history.to`, 2025-01-31, lies before `history.from`, 2025-06-02")]
    public void Override_ThatIsWrong_IsNamedAsItWasGiven(string change, string message) =>
        Assert.Equal(message, _folder.Refusal(Texts.Shortest + "history.to = 2025-01-31\n", change));

    [Theory]
    [InlineData("packages.kinds=[\"conversion\"")]
    [InlineData("name=\"open")]
    [InlineData("seed=")]
    public void Override_WithAValueThatDoesNotClose_IsRefused(string change) =>
        Assert.StartsWith($"--set {change}: ", _folder.Refusal(Texts.Shortest, change), StringComparison.Ordinal);

    [Fact]
    public void Override_WithASecondLine_AddsNoSecondSetting() =>
        Assert.Contains("`seed` must be", _folder.Refusal(Texts.Shortest, "seed=1\nname = \"x\""), StringComparison.Ordinal);
}

namespace CarryTest.Rules.Tests;

/// <summary>Wrong rule books, a row a mistake, with the message that the person who must mend it reads. The shortest rule book is lines 1 to 3, the mistake begins in line 4.</summary>
public sealed class RefusalTests : IDisposable
{
    private readonly RuleBookFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Theory]
    [InlineData("x = 1", "rules.toml:4:1: unknown key `x`; the nearest known one is `history.to`")]
    [InlineData("entry.per_shar = 1", "rules.toml:4:7: unknown key `entry.per_shar`; the nearest known one is `entry.per_share`")]
    [InlineData("execution.per_share = 1", "rules.toml:4:11: unknown key `execution.per_share`; the nearest known one is `entry.per_share`")]
    [InlineData("[funding.believd]\nkind = \"flat\"", "rules.toml:4:10: unknown key `funding.believd`; the nearest known one is `funding.believed`")]
    [InlineData("[[entry]]\nper_share = 1", "rules.toml:4:3: `entry` is a table of keys (per_share, bps_per_year, times_costs, too_good, max_spread_fraction, min_price_for_spread, stale_after_sessions, stock_agrees, ex_date_margin_days, max_undeclared_dividend, max_dividend_loss, long_exercise_value); found a list")]
    [InlineData("entry = 5", "rules.toml:4:9: `entry` is a table of keys (per_share, bps_per_year, times_costs, too_good, max_spread_fraction, min_price_for_spread, stale_after_sessions, stock_agrees, ex_date_margin_days, max_undeclared_dividend, max_dividend_loss, long_exercise_value); found 5")]
    [InlineData("[[varian]]\nname = \"x\"", "rules.toml:4:3: unknown key `varian`; the nearest known one is `variant`")]
    [InlineData("funding.believed = { kind = \"flat\", rates = 1 }", "rules.toml:4:37: unknown key `funding.believed.rates`; the nearest known one is `funding.believed.rate`")]
    [InlineData("seed = \"7\"", "rules.toml:4:8: `seed` must be a whole number, at least 0; found \"7\"")]
    [InlineData("seed = -1", "rules.toml:4:8: `seed` must be a whole number, at least 0; found -1")]
    [InlineData("seed = 7.0", "rules.toml:4:8: `seed` must be a whole number, at least 0; found 7.0")]
    [InlineData("capital.initial = \"much\"", "rules.toml:4:19: `capital.initial` must be a number above 0, at most 1000000000000; found \"much\"")]
    [InlineData("capital.initial = inf", "rules.toml:4:19: `capital.initial` must be a number above 0, at most 1000000000000; found inf")]
    [InlineData("capital.initial = nan", "rules.toml:4:19: `capital.initial` must be a number above 0, at most 1000000000000; found nan")]
    [InlineData("entry.per_share = \"some\"", "rules.toml:4:19: `entry.per_share` must be a number from -1000 to 1000, or \"none\"; found \"some\"")]
    [InlineData("packages.kinds = [\"conversion\", \"butterfly\"]", "rules.toml:4:33: `packages.kinds` must be one of conversion | reversal | long-box | short-box; found \"butterfly\"")]
    [InlineData("packages.kinds = []", "rules.toml:4:18: `packages.kinds` must be a list of kinds in brackets, not empty, each one of conversion | reversal | long-box | short-box; found a list")]
    [InlineData("packages.kinds = \"conversion\"", "rules.toml:4:18: `packages.kinds` must be a list of kinds in brackets, not empty, each one of conversion | reversal | long-box | short-box; found \"conversion\"")]
    [InlineData("packages.kinds = [\"conversion\", \"conversion\"]", "rules.toml:4:33: `packages.kinds` has \"conversion\" twice")]
    [InlineData("packages.days_to_expiry = [190, 7]", "rules.toml:4:27: `packages.days_to_expiry` must be [least, most], least not above most, each a whole number from 0 to 3660; found [190, 7]")]
    [InlineData("packages.days_to_expiry = [7.5, 190]", "rules.toml:4:27: `packages.days_to_expiry` must be [least, most], least not above most, each a whole number from 0 to 3660; found [7.5, 190]")]
    [InlineData("packages.days_to_expiry = 7", "rules.toml:4:27: `packages.days_to_expiry` must be [least, most], least not above most, each a whole number from 0 to 3660; found 7")]
    [InlineData("history.from = \"2025-01-02\"", "rules.toml:4:16: `history.from` must be a date without quotes, as 2025-01-02; found \"2025-01-02\"")]
    [InlineData("history.from = 2025-01-02T00:00:00Z", "rules.toml:4:16: `history.from` must be a date without quotes, as 2025-01-02; found 2025-01-02T00:00:00Z")]
    [InlineData("history.from = 2025-06-02\nhistory.to = 2025-01-02", "rules.toml:5:14: `history.to`, 2025-01-02, lies before `history.from`, 2025-06-02")]
    [InlineData("name = \"a/b\"", "rules.toml:4:8: `name` must be a name fit for a folder in quotes (letters, digits, spaces, `-`, `_` and `.`, at most 100); found \"a/b\"")]
    [InlineData("name = \"con\"", "rules.toml:4:8: `name` must be a name fit for a folder in quotes (letters, digits, spaces, `-`, `_` and `.`, at most 100); found \"con\"")]
    [InlineData("execution.across_sessions = 1", "rules.toml:4:29: `execution.across_sessions` must be true or false; found 1")]
    [InlineData("dividends.forecast = \"sometimes\"", "rules.toml:4:22: `dividends.forecast` must be one of repeat | same-quarter | none, or the file of a table (its name has a dot); found \"sometimes\"")]
    [InlineData("dividends.forecast = \"nowhere.csv\"", "rules.toml:4:22: the table of forecast dividends nowhere.csv does not exist; a file is expected there")]
    [InlineData("funding.believed.kind = \"flat\"", "rules.toml:4:25: `funding.believed.kind = \"flat\"` needs `funding.believed.rate`, a fraction a year: 0.05 is five percent")]
    [InlineData("funding.believed.rate = 0.05", "rules.toml:4:25: `funding.believed.rate` has a meaning for kind \"flat\" only; `funding.believed.kind` is \"curve\"")]
    [InlineData("funding.believed = { kind = \"flat\", rate = 5 }", "rules.toml:4:44: `funding.believed.rate` must be a number from -0.1 to 1 (a fraction a year: 0.05 is five percent); found 5")]
    [InlineData("entry.per_share = 1\nentry.per_share = 2", "rules.toml:5:1: this is not TOML: ")]
    [InlineData("[entry]\nper_share = 1\n[entry]", "rules.toml:6:1: this is not TOML: ")]
    [InlineData("entry = { per_share = 1 }\n[entry]\nbps_per_year = 2", "rules.toml:5:1: this is not TOML: ")]
    [InlineData("a = = 1\nb = [1,", "rules.toml:4:5: this is not TOML: ")]
    [InlineData("seed = 1 2", "rules.toml:4:10: this is not TOML: ")]
    [InlineData("history.from = 2025-02-30", "rules.toml:4:16: this is not TOML: ")]
    [InlineData("[sweep]\nvary = [{ setting = \"entry.per_shar\", from = 1, to = 2, step = 1 }]", "rules.toml:5:21: unknown key `entry.per_shar`; the nearest known one is `entry.per_share`")]
    [InlineData("[sweep]\nvary = [{ setting = \"marks.equity\", from = 1, to = 2, step = 1 }]", "rules.toml:5:21: `marks.equity` holds no number and cannot be varied over a range; write a [[variant]] for each of its values")]
    [InlineData("[sweep]\nvary = [{ setting = \"entry.too_good\", from = 0.5, to = 2, step = 1 }]", "rules.toml:5:56: `sweep.vary.to` must be a number above 0, at most 1; found 2")]
    [InlineData("[sweep]\nvary = [{ setting = \"entry.too_good\", from = 0.5, to = 0.2, step = 1 }]", "rules.toml:5:56: `sweep.vary.to`, 0.2, is less than `sweep.vary.from`, 0.5")]
    [InlineData("[sweep]\nvary = [{ setting = \"entry.too_good\", from = 0.5, to = 0.2 }]", "rules.toml:5:9: `sweep.vary.step` is missing; it must be a number above 0")]
    [InlineData("[sweep]\nvary = [{ setting = \"entry.too_good\", from = 0.1, to = 0.2, step = 0.000001 }]", "rules.toml:5:68: `sweep.vary.step` makes more than 10000 values; take a larger step or a shorter range")]
    [InlineData("[sweep]\nvary = [1]", "rules.toml:5:9: `sweep.vary` must be a list of at most 2 tables; found 1 in it")]
    [InlineData("[[variant]]\nset = { \"execution.delay\" = 0 }", "rules.toml:4:3: `variant.name` is missing; it must be a name in quotes")]
    [InlineData("[[variant]]\nname = \"a\"\nset = { \"execution.delai\" = 0 }", "rules.toml:6:9: unknown key `execution.delai`; the nearest known one is `execution.delay`")]
    [InlineData("[[variant]]\nname = \"a\"\nset = { \"execution.delay\" = 0.5 }", "rules.toml:6:29: `execution.delay` must be a whole number from 0 to 1000; found 0.5")]
    [InlineData("[[variant]]\nname = \"a\"\nset = { variant = 0 }", "rules.toml:6:9: unknown key `variant`; the nearest known one is `capital.margin`")]
    [InlineData("[[variant]]\nname = \"a\"\nset = { \"seed\" = 1 }\n[[variant]]\nname = \"A\"\nset = { \"seed\" = 2 }", "rules.toml:8:8: `variant.name` \"A\" is given twice; each needs a name of its own")]
    [InlineData("[[surprise]]\nname = \"a\"\ndividend = { change = \"scale\" }", "rules.toml:6:23: `surprise.dividend.change = \"scale\"` needs `surprise.dividend.factor`, a number from 0 to 100")]
    [InlineData("[[surprise]]\nname = \"a\"\ndividend = { factor = 0.5 }", "rules.toml:6:23: `surprise.dividend.change` is missing; it must be one of scale | set | omit | add | move")]
    [InlineData("[[surprise]]\nname = \"a\"\ndividend = { change = \"omit\", amount = 1 }", "rules.toml:6:40: `surprise.dividend.amount` has a meaning for \"set\" and \"add\" only; `surprise.dividend.change` is \"omit\"")]
    [InlineData("[[surprise]]\nname = \"a\"\ngap = { symbol = \"KESTREL\", move = 0.1, when = \"overnight\" }", "rules.toml:6:18: `surprise.gap.expiry` is missing; it must be a date without quotes, as 2025-01-02")]
    [InlineData("[[surprise]]\nname = \"a\"\nfunding = { shift = 5 }", "rules.toml:6:13: unknown key `surprise.funding.shift`; the nearest known one is `surprise.funding.shift_bps`")]
    [InlineData("[surprise]\nname = \"a\"", "rules.toml:4:2: `surprise` must be a list of tables, each under [[surprise]]; found a table")]
    [InlineData("[[funding_case]]\nname = \"a\"\nbelieved = { kind = \"flat\" }", "rules.toml:6:21: `funding_case.believed.kind = \"flat\"` needs `funding_case.believed.rate`, a fraction a year: 0.05 is five percent")]
    [InlineData("[[funding_case]]\nname = \"a\"\nbelieved = { kind = \"flit\" }", "rules.toml:6:21: `funding_case.believed.kind` must be one of flat | curve | overnight | implied; found \"flit\"")]
    [InlineData("assignment.rule = \"boundary\"", "rules.toml:4:19: `assignment.rule = \"boundary\"` comes with a later version; this one knows chain | none")]
    [InlineData("assignment.rule = \"every\"", "rules.toml:4:19: `assignment.rule = \"every\"` comes with a later version; this one knows chain | none")]
    [InlineData("assignment.draw = \"sampled\"", "rules.toml:4:19: `assignment.draw = \"sampled\"` comes with a later version; this one knows expected")]
    [InlineData("capital.on_breach = \"unwind\"", "rules.toml:4:21: `capital.on_breach = \"unwind\"` comes with a later version; this one knows report")]
    [InlineData("capital.allocation = \"per-name\"", "rules.toml:4:22: `capital.allocation = \"per-name\"` comes with a later version; this one knows shared")]
    [InlineData("funding.believed.kind = \"implied\"", "rules.toml:4:25: `funding.believed.kind = \"implied\"` comes with a later version; this one knows flat | curve | overnight")]
    [InlineData("funding.believed.from = \"own\"", "rules.toml:4:18: `funding.believed.from` has no effect in this version: rates that chains imply come with a later version; take the key out")]
    [InlineData("funding.charged = { kind = \"curve\" }", "rules.toml:4:28: `funding.charged.kind = \"curve\"` comes with a later version; this one knows flat | overnight")]
    [InlineData("funding.box_proceeds = \"offset-debit\"", "rules.toml:4:24: `funding.box_proceeds = \"offset-debit\"` comes with a later version; this one knows credit")]
    [InlineData("funding.marginal = \"book\"", "rules.toml:4:20: `funding.marginal = \"book\"` comes with a later version; this one knows side")]
    [InlineData("dividends.forecast = \"implied\"", "rules.toml:4:22: `dividends.forecast = \"implied\"` comes with a later version; this one knows repeat | same-quarter | none and the file of a table")]
    [InlineData("unwind.after_days = 300", "rules.toml:4:8: `unwind.after_days` has no effect in this version: closing before expiry comes with a later version; take the key out")]
    [InlineData("execution.across_sessions = true", "rules.toml:4:29: `execution.across_sessions = true` comes with a later version; this one knows false")]
    [InlineData("borrow.on_recall = \"close-package\"", "rules.toml:4:8: `borrow.on_recall` has no effect in this version: recalls of borrowed stock come with a later version; take the key out")]
    [InlineData("borrow.notice_days = 1", "rules.toml:4:8: `borrow.notice_days` has no effect in this version: recalls of borrowed stock come with a later version; take the key out")]
    [InlineData("\u00e4 = \"\u00e4\"", "rules.toml:4:1: this is not TOML: ")]
    [InlineData("settlement = { \"sto ck\" = 1, stock.x = 2 }", "rules.toml:4:16: unknown key `settlement.sto ck`; the nearest known one is `settlement.stock`\nrules.toml:4:30: `settlement.stock` must be a whole number from 0 to 10; found a table")]
    public void RuleBook_WithAMistake_IsRefusedAtItsPlace(string mistake, string message)
    {
        // How the parser words a broken text is its own affair; the place and the words before are ours.
        string found = _folder.Refusal(Texts.Shortest + mistake + "\n");
        Assert.Equal(message, message.EndsWith("TOML: ", StringComparison.Ordinal) ? found[..message.Length] : found);
    }

    [Theory]
    [InlineData("", "rules.toml:1:1: `history.folder` is missing: name the folder of the history, as folder = \"../data-sample\" under [history]\nrules.toml:1:1: `capital.margin` is missing: its default, \"portfolio\", comes with a later version; write margin = \"house\" or margin = \"strategy\" under [capital]")]
    [InlineData("[history]\nfolder = \"h\"\n[capital]\ninitial = 5\n", "rules.toml:3:2: `capital.margin` is missing: its default, \"portfolio\", comes with a later version; write margin = \"house\" or margin = \"strategy\" under [capital]")]
    [InlineData("[history]\nfolder = \"h\"\n[capital]\nmargin = \"portfolio\"\n", "rules.toml:4:10: `capital.margin = \"portfolio\"` comes with a later version; this one knows strategy | house")]
    [InlineData("[history]\nfolder = \"\"\n[capital]\nmargin = \"house\"\n", "rules.toml:2:10: `history.folder` must be the path of the history's folder in quotes, relative to the rule book; found \"\"")]
    [InlineData("history.folder = \"h\"\ncapital.margin = \"house\"\n", "rules.toml:1:1: the fee schedule fees/us-listed.toml does not exist; a file is expected there")]
    public void RuleBook_WithoutWhatItNeeds_SaysWhatToWrite(string text, string message) =>
        Assert.Equal(message, _folder.Refusal(text).Replace('\\', '/'));

    [Fact]
    public void RuleBook_WithManyMistakes_NamesThemAllInTheOrderOfTheText()
    {
        string[] found = _folder.Refusal("seeds = 1\n[history]\nfolder = 5\n[capital]\nmargin = \"house\"\nreserve = 2\n[assignment]\nrule = \"every\"\n", "entry.too_god=1").Split('\n');
        Assert.Equal(["rules.toml:1:1:", "rules.toml:3:10:", "rules.toml:6:11:", "rules.toml:8:8:", "--set entry.too_god=1:"], found.Select(f => f[..(f.IndexOf(": ", StringComparison.Ordinal) + 1)]));
    }

    [Fact]
    public void RuleBook_NestedBeyondReason_IsRefusedWithoutAFall() =>
        Assert.Contains("this is not TOML", _folder.Refusal($"{Texts.Shortest}packages.kinds = {new string('[', 100_000)}"), StringComparison.Ordinal);
}

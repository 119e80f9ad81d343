using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using CarryTest.Carry.Assignment;
using CarryTest.Carry.Margin;
using CarryTest.Carry.Rules;
using CarryTest.Market.Faults;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Reading;
using CarryTest.Rules.Sections;
using CarryTest.Studies;

namespace CarryTest.Rules.Tests;

public sealed class ReadingTests : IDisposable
{
    private readonly RuleBookFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void ShortestRuleBook_HasTheDefaultsOfTheRecords()
    {
        RuleBook read = _folder.Read(Texts.Shortest);

        Assert.Equal("rules", read.Name);
        Assert.Equal(_folder.File("history"), read.History.Folder);
        Assert.Null(read.History.From);
        Assert.Equal(["*"], read.History.Underlyings);
        var usual = new BookRules();
        Assert.Equal(usual.Capital with { Margin = MarginMethod.House }, read.Book.Capital);
        Assert.Equal(usual.Entry, read.Book.Entry);
        Assert.Equal(usual.Execution, read.Book.Execution);
        Assert.Equal(usual.Funding, read.Book.Funding);
        Assert.Equal(usual.Assignment, read.Book.Assignment);
        Assert.Equal(usual.Borrow, read.Book.Borrow);
        Assert.Equal(usual.Settlement, read.Book.Settlement);
        Assert.Equal(usual.Unwind, read.Book.Unwind);
        Assert.Equal(usual.Mark, read.Book.Mark);
        Assert.Equal(usual.Seed, read.Book.Seed);
        Assert.Equal(usual.Packages with { Kinds = read.Book.Packages.Kinds, Block = read.Book.Packages.Block }, read.Book.Packages);
        Assert.Equal(usual.Packages.Kinds, read.Book.Packages.Kinds);
        Assert.Null(read.Book.Dividends.Forecast);
        Assert.Empty(read.Book.Costs.Schedule.Rows);
        Assert.Equal(Texts.Shortest, read.Text);
        Assert.Empty(read.StudyTables);
    }

    [Fact]
    public void EveryKeyWrittenAtItsDefault_BindsAsIfAbsent()
    {
        string written = string.Join('\n', RuleBookKeys.OfBook.Where(k => k.DefaultText is not null && k.Path != "costs.schedule").Select(k => $"{k.Path} = {k.DefaultText}"));

        RuleBook all = _folder.Read(Texts.Shortest + written);
        RuleBook none = _folder.Read(Texts.Shortest);

        Assert.Equal(Shown(none), Shown(all));
        Assert.All(all.Effective.Where(e => RuleBookKeys.Shape.Find(e.Key)!.DefaultText is not null), e => Assert.True(e.Written, e.Key));
        Assert.Equal(1, all.Book.Execution.DelayWritten);
        Assert.Null(none.Book.Execution.DelayWritten);
    }

    [Fact]
    public void EveryKey_WhenChanged_ChangesWhatIsBound()
    {
        // A key that is read and goes nowhere would be a setting without effect.
        const string Changes = """
            name=other
            seed=8
            history.folder=elsewhere
            history.from=2025-02-03
            history.to=2025-02-03
            history.underlyings=["KESTREL"]
            history.on_error=stop
            capital.initial=1
            capital.reserve=0.2
            capital.margin=strategy
            capital.house.stock_fraction=0.2
            capital.house.per_contract=60
            packages.kinds=["reversal"]
            packages.days_to_expiry=[8, 9]
            packages.moneyness=[0.9, 1]
            packages.box_width=[0.1, 0.2]
            packages.units_per_package=2
            packages.packages_per_name=2
            packages.packages_per_expiry=2
            packages.packages_per_strike=2
            packages.equity_fraction_per_name=0.5
            packages.block=["KESTREL"]
            entry.per_share=0.05
            entry.bps_per_year=30
            entry.times_costs=1
            entry.too_good=0.02
            entry.max_spread_fraction=0.5
            entry.min_price_for_spread=1
            entry.stale_after_sessions=3
            entry.stock_agrees=0.001
            entry.ex_date_margin_days=6
            entry.max_undeclared_dividend=0.5
            entry.max_dividend_loss=0.01
            entry.long_exercise_value=0.5
            execution.half_spread_paid=0.5
            execution.delay=2
            execution.refuse_below=0.01
            execution.participation=1
            execution.default_size=11
            execution.stock_limit=60000
            costs.schedule=fees.toml
            costs.slippage_per_share=0.01
            costs.slippage_fraction=0.01
            funding.believed.kind=overnight
            funding.believed.debit_spread_bps=61
            funding.believed.credit_spread_bps=41
            funding.believed.day_count=act/365
            funding.charged.debit_spread_bps=61
            funding.charged.credit_spread_bps=41
            funding.charged.day_count=act/365
            funding.netting=false
            dividends.forecast=same-quarter
            dividends.assume_declared_days=5
            dividends.withholding=0.15
            assignment.rule=none
            assignment.quote=bid
            assignment.fraction=0.5
            assignment.after=keep
            assignment.exercise_cost_per_share=0.02
            assignment.exercise_long=never
            assignment.pin_band=0.1
            assignment.pin_fraction=0.4
            borrow.base=1.02
            settlement.stock=2
            settlement.premium=2
            marks.equity=carry
            """;
        string[] together =
        [
            "funding.believed.kind=flat funding.believed.rate=0.05", "funding.believed.kind=flat funding.believed.rate=0.06",
            "funding.charged.kind=flat funding.charged.rate=0.05", "funding.charged.kind=flat funding.charged.rate=0.06",
        ];

        // Of these this version knows one value.
        string[] fixedForNow = ["capital.on_breach", "capital.allocation", "execution.across_sessions", "funding.box_proceeds", "funding.marginal", "assignment.draw"];
        _folder.Write("fees.toml", "[[fee]]\nline = \"commission\"\napplies_to = \"stock\"\nbasis = \"share\"\nrate = 0.005\nsource = \"invented\"\n");
        var seen = new HashSet<string> { Shown(_folder.Read(Texts.Shortest)) };

        string[] lines = Changes.ReplaceLineEndings("\n").Split('\n');
        foreach (string line in lines)
        {
            Assert.True(seen.Add(Shown(_folder.Read(Texts.Shortest, line))), line);
        }

        foreach (string line in together)
        {
            Assert.True(seen.Add(Shown(_folder.Read(Texts.Shortest, line.Split(' ')))), line);
        }

        IEnumerable<string> changed = lines.Concat(together.SelectMany(t => t.Split(' '))).Select(c => c.Split('=')[0]);
        Assert.Equal(RuleBookKeys.OfBook.Select(k => k.Path).Order(), changed.Concat(fixedForNow).Distinct().Order());
    }

    [Fact]
    public void Tables_WrittenUnderHeadersInlineOrDotted_AreTheSame()
    {
        const string Head = "costs.schedule = \"none\"\n[history]\nfolder = \"h\"\n[capital]\nmargin = \"house\"\n";
        RuleBook header = _folder.Read(Head + "[funding.believed]\nkind = \"flat\"\nrate = 0.05\n[funding]\nnetting = false");
        RuleBook inline = _folder.Read(Head + "[funding]\nbelieved = { kind = \"flat\", rate = 0.05 }\nnetting = false");
        RuleBook dotted = _folder.Read(Head + "[funding]\nbelieved.kind = \"flat\"\n\"believed\".rate = 0.05\nnetting = false");

        Assert.Equal(new FundingSettings { Believed = new() { Kind = FundingKind.Flat, Rate = 0.05 }, Netting = false }, header.Book.Funding);
        Assert.Equal(header.Book.Funding, inline.Book.Funding);
        Assert.Equal(header.Book.Funding, dotted.Book.Funding);
    }

    [Fact]
    public void WindowsLinesAndByteOrderMark_ReadTheSameAndKeepTheirPlaces()
    {
        string text = "\uFEFF" + Texts.Shortest.Replace("\n", "\r\n", StringComparison.Ordinal);
        Assert.Equal(Shown(_folder.Read(Texts.Shortest)), Shown(_folder.Read(text)));

        Assert.StartsWith("rules.toml:4:1: unknown key `entri`", _folder.Refusal(text + "entri.per_share = 1\r\n"), StringComparison.Ordinal);
        Assert.StartsWith("rules.toml:1:1: unknown key `nam`", _folder.Refusal("\uFEFFnam = \"x\"\r\n" + Texts.Shortest), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("tr-TR")]
    [InlineData("de-DE")]
    [InlineData("sv-SE")]
    public void Culture_MakesNoDifference(string culture)
    {
        const string Text = Texts.Shortest + "capital.initial = 1_234_567.5\nentry.per_share = -0.125\nhistory.from = 2025-03-04\nassignment.pin_fraction = 2\n";
        string fineText = Text.Replace("= 2\n", "= 0.25\n", StringComparison.Ordinal);
        string refusal = _folder.Refusal(Text);
        RuleBook fine = _folder.Read(fineText);
        CultureInfo before = Thread.CurrentThread.CurrentCulture;
        string refusalThere;
        RuleBook there;
        try
        {
            Thread.CurrentThread.CurrentCulture = CultureInfo.GetCultureInfo(culture);
            refusalThere = _folder.Refusal(Text);
            there = _folder.Read(fineText);
        }
        finally
        {
            Thread.CurrentThread.CurrentCulture = before;
        }

        Assert.Equal("rules.toml:7:27: `assignment.pin_fraction` must be a number from 0 to 1; found 2", refusal);
        Assert.Equal(refusal, refusalThere);
        Assert.Equal(Shown(fine), Shown(there));
        Assert.Equal(fine.Effective, there.Effective);
        Assert.Contains(("capital.initial", "1234567.5", true), there.Effective);
        Assert.Contains(("entry.per_share", "-0.125", true), there.Effective);
    }

    [Fact]
    public void Words_OfEveryEnum_AreRead()
    {
        foreach (AssignmentQuote quote in Enum.GetValues<AssignmentQuote>())
        {
            Assert.Equal(quote, _folder.Read(Texts.Shortest, $"assignment.quote={Market.Words.Vocabulary.Word(quote)}").Book.Assignment.Quote);
        }

        foreach (Key key in RuleBookKeys.OfBook.Where(k => k.Words.Count > 0))
        {
            foreach ((string word, _) in key.Words)
            {
                bool list = key is Key<ImmutableArray<Kind>>;
                string[] extra = word == "flat" ? [$"{key.Path.Replace("kind", "rate", StringComparison.Ordinal)}=0.05"] : [];
                RuleBook read = _folder.Read(Texts.Shortest, [$"{key.Path}={(list ? $"[\"{word}\"]" : word)}", .. extra]);
                Assert.Equal(list ? $"[\"{word}\"]" : $"\"{word}\"", read.Effective.Single(e => e.Key == key.Path).Value);
            }
        }
    }

    [Fact]
    public void Thresholds_CalledNone_AreNotAsked()
    {
        RuleBook read = _folder.Read(Texts.Shortest + "entry.per_share = \"none\"\nentry.bps_per_year = \"none\"\n");
        Assert.Null(read.Book.Entry.PerShare);
        Assert.Null(read.Book.Entry.BpsPerYear);
    }

    [Fact]
    public void StudyTables_AreCheckedAndNamed()
    {
        RuleBook read = _folder.Read(Texts.Shortest + """
            [[surprise]]
            name = "cut"
            dividend = { change = "scale", factor = 0.5 }
            gap = { symbol = "KESTREL", expiry = 2025-06-20, move = -0.1, when = "after-close" }
            [[surprise]]
            name = "nothing"
            [sweep]
            vary = [{ setting = "entry.per_share", from = 0.01, to = 0.3, step = 0.01 }, { setting = "execution.delay", from = 0, to = 2, step = 1 }]
            [[variant]]
            name = "quoted"
            set = { "execution.delay" = 0, "funding.believed.kind" = "overnight" }
            [[variant]]
            name = "dotted"
            set.execution.delay = 0
            """);
        Assert.Equal(["sweep", "variant", "surprise"], read.StudyTables);
    }

    [Fact]
    public void Effective_ListsEverySettingInCanonicalForm()
    {
        RuleBook read = _folder.Read(Texts.Shortest + "capital.initial = 3e6\nhistory.to = 2025-06-30\n", "entry.per_share=0.05");
        Assert.Contains(("capital.initial", "3000000", true), read.Effective);
        Assert.Contains(("history.to", "2025-06-30", true), read.Effective);
        Assert.Contains(("history.from", "the first day of the history", false), read.Effective);
        Assert.Contains(("entry.per_share", "0.05", true), read.Effective);
        Assert.Contains(("packages.days_to_expiry", "[7, 190]", false), read.Effective);
        Assert.Contains(("name", "\"rules\"", false), read.Effective);
        Assert.Equal(["entry.per_share=0.05"], read.Overrides);
        Assert.Equal(RuleBookKeys.OfBook.Select(k => k.Path), read.Effective.Select(e => e.Key));
    }

    [Fact]
    public void FileThatIsMissingOrNoText_IsRefusedByName()
    {
        string nowhere = _folder.File("nowhere.toml");
        Assert.Equal($"the rule book {nowhere} does not exist; a file is expected there", Assert.Throws<InputException>(() => RuleBookReader.Read(nowhere, [])).Message);
        Assert.Contains("is a folder", Assert.Throws<InputException>(() => RuleBookReader.Read(_folder.Path, [])).Message, StringComparison.Ordinal);

        File.WriteAllBytes(_folder.File("latin.toml"), Encoding.Latin1.GetBytes("name = \"\u00e9\"\n"));
        Assert.Contains("is not text in UTF-8", Assert.Throws<InputException>(() => RuleBookReader.Read(_folder.File("latin.toml"), [])).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Forecast_NamesAWordOrATable()
    {
        Assert.Equal(DividendForecastKind.None, _folder.Read(Texts.Shortest + "dividends.forecast = \"none\"\n").Book.Dividends.Forecast);

        _folder.Write("forecast.csv", "symbol,ex_on,paid_on,known_on,amount\nKESTREL,2025-03-10,2025-03-24,2025-01-02,0.45\nKESTREL,2025-06-10,2025-06-24,2025-01-02,0.5\n");
        DividendSettings read = _folder.Read(Texts.Shortest + "dividends.forecast = \"forecast.csv\"\n").Book.Dividends;
        Assert.Equal(DividendForecastKind.Table, read.Forecast);
        Assert.Equal(new ForecastRow("KESTREL", new DateOnly(2025, 3, 10), new DateOnly(2025, 3, 24), 0.45, new DateOnly(2025, 1, 2)), read.Table[0]);
        Assert.Equal(2, read.Table.Length);
    }

    [Fact]
    public void Configs_OfTheRepository_AreRead()
    {
        foreach (string name in new[] { "sample-year", "edge-threshold", "dividend-surprise", "financing-assumptions" })
        {
            string file = Path.Combine(Repository.Root, "configs", name + ".toml");
            string[] overrides = File.Exists(Path.Combine(Repository.Root, "configs", "fees", "us-listed.toml")) ? [] : ["costs.schedule=none"];
            RuleBook read = RuleBookReader.Read(file, overrides);
            Assert.Equal(name, read.Name);
            Assert.Equal(Path.Combine(Repository.Root, "data-sample"), read.History.Folder);
            Assert.Equal(
                name switch
                {
                    "edge-threshold" => ["sweep", "variant"],
                    "dividend-surprise" => ["surprise"],
                    "financing-assumptions" => ["funding_case"],
                    _ => [],
                },
                read.StudyTables);
        }
    }

    [Fact]
    public void SampleYear_HoldsTheDefaults()
    {
        RuleBook sample = RuleBookReader.Read(Path.Combine(Repository.Root, "configs", "sample-year.toml"), ["costs.schedule=none"]);
        RuleBook plain = _folder.Read(Texts.Shortest);
        Assert.Equal(
            plain.Effective.Where(e => e.Key is not ("name" or "history.folder")).Select(e => (e.Key, e.Value)),
            sample.Effective.Where(e => e.Key is not ("name" or "history.folder")).Select(e => (e.Key, e.Value)));
    }

    /// <summary>Everything that a rule book decides, as text: records with lists do not compare by their items.</summary>
    private static string Shown(RuleBook read)
    {
        BookRules book = read.Book with { Execution = read.Book.Execution with { DelayWritten = read.Book.Execution.Delay } };
        return string.Join(
            '\n',
            read.Name,
            read.History.ToString(),
            string.Join(',', read.History.Underlyings),
            book.ToString(),
            string.Join(',', book.Packages.Kinds),
            string.Join(',', book.Packages.Block),
            string.Join(',', book.Costs.Schedule.Rows),
            string.Join(',', book.Dividends.Table));
    }
}

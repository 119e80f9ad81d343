using System.Net;
using System.Security.Cryptography;
using System.Text;
using System.Text.RegularExpressions;
using CarryTest.Reports.Figures;
using CarryTest.Reports.Pages;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tests.Samples;

namespace CarryTest.Reports.Tests.Pages;

public sealed partial class ReportPageTests
{
    private const string Hostile = "<script>alert(1)</script>\"'&\u202e\U0001f600 \u05d0\u05d1";

    [Fact]
    public void Page_OfNamesThatAreMarkup_HoldsThemAsText()
    {
        var run = new SampleRun(hostile: Hostile);
        string page = Page(run, SampleRun.Facts(run, hostile: Hostile));
        Assert.DoesNotContain("<script>alert", page, StringComparison.Ordinal);
        Assert.Contains("&lt;script&gt;alert(1)&lt;/script&gt;&quot;&#x27;&amp;", page, StringComparison.Ordinal);
        Assert.Single(Scripts().Matches(page));
        Assert.Contains(Hostile, WebUtility.HtmlDecode(page), StringComparison.Ordinal);
    }

    [Fact]
    public void Page_NeedsNothingFromOutside()
    {
        var run = new SampleRun();
        string page = Page(run);
        Assert.DoesNotContain("http:", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("https", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("<link", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("<img", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain("src=", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain(" style=", page, StringComparison.OrdinalIgnoreCase);
        Assert.DoesNotContain(" onclick=", page, StringComparison.OrdinalIgnoreCase);
        Assert.All(Urls().Matches(page), url => Assert.StartsWith("url(data:font/woff2;base64,", url.Value, StringComparison.Ordinal));
    }

    [Fact]
    public void Policy_OfThePage_AllowsItsOwnScriptAndStyleAlone()
    {
        string page = Page(new SampleRun());
        string policy = Policy().Match(page).Groups["policy"].Value;
        Assert.StartsWith("default-src 'none';", policy, StringComparison.Ordinal);
        Assert.Contains($"script-src '{Hash(Scripts().Match(page).Groups["text"].Value)}'", policy, StringComparison.Ordinal);
        Assert.Contains($"style-src '{Hash(Styles().Match(page).Groups["text"].Value)}'", policy, StringComparison.Ordinal);
    }

    [Fact]
    public void Page_WithoutItsScript_HoldsEveryTableAndFigure()
    {
        var run = new SampleRun();
        string page = Scripts().Replace(Page(run), "");
        foreach (string caption in new[]
        {
            "From expected to realised, all final packages", "Tests of candidates, all kinds", "Results by kind", "Results by name", "Results by month of the ending", "Events by kind",
            "The packages that realised least", "Packages", "Findings in the history", "Settings as they held",
        })
        {
            Assert.Contains($"<caption>{caption}</caption>", page, StringComparison.Ordinal);
        }

        foreach (string figure in new[] { "equity", "bridge", "funnel", "edge", "capital", "by-kind", "by-name", "by-month" })
        {
            Assert.Contains($"<figure id=\"figure-{figure}\"", page, StringComparison.Ordinal);
        }

        Assert.Equal(2 * 8, Drawings().Count(page));
        foreach (int package in run.Packages.Select(p => p.Package))
        {
            Assert.Contains($"<div id=\"package-{package}\"", page, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Identities_InThePage_OccurOnceAndLinksLeadToOne()
    {
        string page = Page(new SampleRun());
        string[] ids = [.. Ids().Matches(page).Select(m => m.Groups["id"].Value)];
        Assert.Equal(ids.Length, ids.Distinct().Count());
        Assert.All(Links().Matches(page), link => Assert.Contains(link.Groups["id"].Value, ids));
    }

    [Fact]
    public void FirstScreen_WithoutDelay_SaysThatItIsAnUpperBound()
    {
        var run = new SampleRun();
        Assert.Contains("<strong>Upper bound.</strong>", Page(run, SampleRun.Facts(run, delay: 0)), StringComparison.Ordinal);
        Assert.DoesNotContain("Upper bound", Page(run), StringComparison.Ordinal);
    }

    [Fact]
    public void FirstScreen_KeepsThreeFiguresApartAndOpenPackagesOut()
    {
        var run = new SampleRun();
        RunSummary summary = RunSummary.Of(run.Ledger, run.Capital);
        string first = WebUtility.HtmlDecode(Page(run));
        first = first[first.IndexOf("id=\"earned\"", StringComparison.Ordinal)..first.IndexOf("id=\"equity\"", StringComparison.Ordinal)];
        Assert.True(summary.Open > 0);
        Assert.Contains(Show.Change(summary.Realised), first, StringComparison.Ordinal);
        Assert.Contains(Show.Change(summary.Netting), first, StringComparison.Ordinal);
        Assert.Contains(Show.Change(summary.Idle), first, StringComparison.Ordinal);
        Assert.DoesNotContain(Show.Change(summary.Realised + summary.Netting + summary.Idle), first, StringComparison.Ordinal);
        Assert.DoesNotContain(Show.Change(summary.Realised + summary.OpenMid), first, StringComparison.Ordinal);
        Assert.Contains("not counted in the profit above", first, StringComparison.Ordinal);
        Assert.Contains($"No.\u00a0{summary.Worst!.Package} ", first, StringComparison.Ordinal);
    }

    [Fact]
    public void Page_OfARunWithoutPackages_IsSensible()
    {
        var run = new SampleRun(packages: 0);
        string page = Page(run);
        Assert.Contains("0 opened", page, StringComparison.Ordinal);
        Assert.Contains("No package is final yet.", page, StringComparison.Ordinal);
        Assert.DoesNotContain("NaN", Scripts().Replace(page, ""), StringComparison.Ordinal);
        Assert.Contains("figure-equity", page, StringComparison.Ordinal);
    }

    [Fact]
    public void Page_OfALedgerWithoutAnyRow_IsMade()
    {
        var run = new SampleRun(packages: 0);
        var empty = new RunLedger([], [], [], [], [], []);
        RunSummary summary = RunSummary.Of(empty, run.Capital);
        Assert.Contains("<h2", ReportPage.Of(SampleRun.Facts(run), empty, summary, RunFigures.Of(empty, summary)), StringComparison.Ordinal);
    }

    [Fact]
    public void Page_MadeTwice_HasTheSameText() => Assert.Equal(Page(new SampleRun()), Page(new SampleRun()));

    [Fact]
    public void Page_OfThousandsOfPackages_StaysLight()
    {
        var run = new SampleRun(packages: 2400, days: 60);
        string page = Page(run);
        Assert.InRange(page.Length, 100_000, 3_000_000);
        Assert.Contains("these are the 500 that realised least", page, StringComparison.Ordinal);
        Assert.Equal(250, Ids().Matches(page).Count(m => m.Groups["id"].Value.StartsWith("package-", StringComparison.Ordinal)));
    }

    [Fact]
    public void Page_SaysTheCautionsInItsFoot()
    {
        string page = WebUtility.HtmlDecode(Page(new SampleRun()));
        string foot = page[page.IndexOf("<footer", StringComparison.Ordinal)..];
        Assert.All(Cautions.Sentences, sentence => Assert.Contains(sentence, foot, StringComparison.Ordinal));
    }

    [Fact]
    public void Page_NamesNoFolderOfTheMachine() => Assert.DoesNotContain("/somewhere", Page(new SampleRun()), StringComparison.Ordinal);

    private static string Page(SampleRun run, RunFacts? facts = null)
    {
        RunSummary summary = RunSummary.Of(run.Ledger, run.Capital);
        return ReportPage.Of(facts ?? SampleRun.Facts(run), run.Ledger, summary, RunFigures.Of(run.Ledger, summary));
    }

    private static string Hash(string text) => "sha256-" + Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(text)));

    [GeneratedRegex("<script>(?<text>.*?)</script>", RegexOptions.Singleline)]
    private static partial Regex Scripts();

    [GeneratedRegex("<style>(?<text>.*?)</style>", RegexOptions.Singleline)]
    private static partial Regex Styles();

    [GeneratedRegex("http-equiv=\"Content-Security-Policy\" content=\"(?<policy>[^\"]*)\"")]
    private static partial Regex Policy();

    [GeneratedRegex("<svg ")]
    private static partial Regex Drawings();

    [GeneratedRegex("url\\([^)]*")]
    private static partial Regex Urls();

    [GeneratedRegex("\\sid=\"(?<id>[^\"]*)\"")]
    private static partial Regex Ids();

    [GeneratedRegex("href=\"#(?<id>[^\"]*)\"")]
    private static partial Regex Links();
}

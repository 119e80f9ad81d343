using System.Text.RegularExpressions;
using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Pages;

/// <summary>What the trader reads first: what was earned, on what capital, against what, by how many packages, and the worst one.</summary>
internal static partial class FirstScreen
{
    public static Html Of(RunFacts facts, RunSummary s) => Html.Of(
        $"""
        <section id="earned" aria-labelledby="earned-h">
        <h2 id="earned-h">What was earned</h2>
        {Remarks(facts)}
        <div class="three">
        {Amount("Profit of packages", s.Realised, Html.Of($"realised by {Show.Plural(s.Closed, "final package", "final packages")}; expected {Show.Change(s.Expected)}"))}
        {Amount("Netting", s.Netting, Html.Of($"what the account's net balance earned or cost beyond the packages taken one by one"))}
        {Amount("Interest on idle capital", s.Idle, Html.Of($"earned by capital that no package used"))}
        </div>
        <p class="note">Three sources, kept apart on purpose: only the first comes from trading. Packages are charged for their own financing, so their profit stands above what funding cost.</p>
        <dl class="facts">
        {Lines(s)}
        </dl>
        </section>

        """);

    private static Html Amount(string what, Cash amount, Html note) =>
        Html.Of($"<div><h3>{what}</h3><p class=\"{(amount < Cash.Zero ? "big neg" : "big")}\">{Show.Change(amount)}</p><p class=\"note\">{note}</p></div>");

    private static IEnumerable<Html> Remarks(RunFacts facts)
    {
        Parity.Fills.ExecutionSettings execution = facts.RuleBook.Book.Execution;
        if (execution.Delay == 0)
        {
            yield return Html.Of($"<p class=\"remark\"><strong>Upper bound.</strong> Decisions are filled at the same quote that gave the signal (execution.delay = 0). Nobody trades that fast; the same rules one snapshot later earn less.</p>");
        }

        if (execution.HalfSpreadPaid < 1)
        {
            yield return Html.Of($"<p class=\"remark\"><strong>Better than the touch.</strong> Fills are taken inside the quoted spread (execution.half_spread_paid = {execution.HalfSpreadPaid:0.##}). Nothing in the history says that they could be had.</p>");
        }

        foreach (string hint in facts.ExitHints)
        {
            yield return Html.Of($"<p class=\"remark\"><strong>Look at this.</strong> {facts.Relative(hint)}</p>");
        }

        foreach (string warning in facts.DayWarnings)
        {
            yield return Html.Of($"<p class=\"remark\"><strong>The history.</strong> {facts.Relative(warning)}</p>");
        }
    }

    private static IEnumerable<Html> Lines(RunSummary s)
    {
        yield return Line("Packages", $"{Show.Count(s.Opened)} opened", $"{Show.Count(s.Closed)} final, {Show.Count(s.Open)} still open, out of {Show.Count(s.PairsSeen)} pairs of options seen");
        if (s.Closed > 0)
        {
            yield return Line("Lost", Show.PerCent((double)s.Lost / s.Closed, "0.0"), $"{Show.Count(s.Lost)} of {Show.Plural(s.Closed, "final package", "final packages")}, {Show.Change(s.LostTogether)} together");
        }

        if (s.Worst is { } worst)
        {
            yield return Worst(worst);
        }

        if (s.Open > 0)
        {
            yield return Line("Still open", Show.Plural(s.Open, "package", "packages"), $"not counted in the profit above; marked {Show.Change(s.OpenMid)} at mid, {Show.Change(s.OpenCarry)} at the present value of what is still due");
        }

        yield return Line("Capital", Show.Money(s.AverageTiedUp), $"cash tied up on average{(s.MostTiedUp.On is { } on ? $"; at most {Show.Money(s.MostTiedUp.Amount)} on {Show.Day(on)}" : "")}{(s.MostRequired.On is { } day ? $"; margin at most {Show.Money(s.MostRequired.Amount)} on {Show.Day(day)}" : "")}");
        if (!double.IsNaN(s.ReturnOnTiedUp))
        {
            yield return Line("Return on it", Show.PerCent(s.ReturnOnTiedUp), $"a year on the cash tied up, actual/360, above the cost of funding{(s.Open > 0 ? "; open packages at the carry mark" : "")}");
            yield return Line("Benchmark", Show.PerCent(s.BenchmarkRate), $"a year: the overnight rate would have paid {Show.Money(s.Benchmark)} on the same cash");
        }

        yield return s.Drawdown.Amount < Cash.Zero
            ? Line("Drawdown", Show.Change(s.Drawdown.Amount), $"the deepest fall of equity at mid, from {Show.Day(s.Drawdown.From)} to {Show.Day(s.Drawdown.To)}")
            : Line("Drawdown", "none", "equity at mid never fell below an earlier close");
        yield return Line("Costs", Show.Money(s.Fees + s.BorrowFees), $"fees {Show.Money(s.Fees)}, borrowed stock {Show.Money(s.BorrowFees)}; paid so far, and inside the results above");
        string endings = string.Join(", ", s.Endings.Where(e => e.Count > 0).Select(e => $"{e.Ending.Word()} {Show.Count(e.Count)}"));
        if (endings.Length > 0)
        {
            yield return Line("Endings", "", endings);
        }
    }

    private static Html Worst(PackageRow p)
    {
        Cash realised = p.RealisedProfit!.Value;
        AttributionLine? blame = AttributionLine.Worst(p.Attribution);
        string why = blame is null ? "it came as planned" : $"mostly {blame.Blame} ({Show.Change(blame.Of(p.Attribution))})";
        return Html.Of(
            $"<div><dt>Worst one</dt><dd class=\"{Show.Sign(realised)}\">{Show.Change(realised)}</dd><dd><a href=\"#package-{p.Package}\">{Show.Terms(p)}</a>, expected {Show.Change(p.ExpectedProfit)}: {why}</dd></div>");
    }

    private static Html Line(string what, string figure, string words) => Html.Of($"<div><dt>{what}</dt><dd class=\"n\">{figure}</dd><dd>{Days().Split(words).Select(part => Days().IsMatch(part) ? Html.Of($"<span class=\"day\">{part}</span>") : Html.Of($"{part}"))}</dd></div>");

    // A day is not broken between two lines.
    [GeneratedRegex(@"(\d{4}-\d{2}-\d{2})", RegexOptions.CultureInvariant)]
    private static partial Regex Days();
}

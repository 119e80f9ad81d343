using CarryTest.Carry.Rules;
using CarryTest.Market.Words;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Pages;

/// <summary>The rule book as read, the method, the cautions.</summary>
internal static class ClosingSections
{
    /// <summary>Every setting as it holds, marked where the rule book or an override wrote it, and the text itself.</summary>
    public static Html Rules(RunFacts facts)
    {
        Html settings = facts.RuleBook.Effective.Length == 0
            ? Html.None
            : TableHtml.Of(
                "Settings as they held",
                ["key", "value", "written"],
                facts.RuleBook.Effective.Select(e => Html.Of(
                    $"<tr{(e.Written ? Html.Raw(" class=\"written\"") : Html.None)}><td><code>{e.Key}</code></td><td><code>{facts.Relative(e.Value)}</code></td><td>{(e.Written ? "written" : "default")}</td></tr>")),
                sorts: true,
                tall: true);
        Html overrides = facts.RuleBook.Overrides.Length == 0
            ? Html.None
            : Html.Of($"<p>Overridden on the command line: {facts.RuleBook.Overrides.Select(o => Html.Of($"<code>{o}</code> "))}</p>");
        return Html.Of(
            $"""
            {overrides}
            {settings}
            <details class="text"><summary>The rule book's text</summary><pre>{facts.RuleBook.Text}</pre></details>
            """);
    }

    /// <summary>How the figures came about.</summary>
    public static Html Method(RunFacts facts)
    {
        BookRules book = facts.RuleBook.Book;
        string when = book.Execution.Delay switch
        {
            0 => "at the same snapshot",
            1 => "at the next snapshot of the session",
            int n => $"{Show.Count(n)} snapshots later in the session",
        };
        return Html.Of(
            $"""
            <ul class="method">
            <li>The recorded quotes of each day are walked through in order. A decision sees only what was known at its instant: quotes, declared dividends, rates, borrow fees.</li>
            <li>Every pair of a call and a put at one strike is tested in a fixed order; the first test that fails is its reason in the funnel. What is left is a candidate for a conversion, a reversal or, with a second strike, a box.</li>
            <li>The edge is a present value per share on the trade date: what the package pays at delivery, less its cost at the prices that would be traded, dividends, borrow and fees, discounted at the funding that was believed at entry, less what is set aside for early exercise of the short options.</li>
            <li>Orders are filled {when}, if the package still clears the rule there, paying {Show.PerCent(book.Execution.HalfSpreadPaid, "0")} of the half spread and taking at most {Show.PerCent(book.Execution.Participation, "0")} of the displayed size, which is then used up.</li>
            <li>From the fill to the last settlement each package is carried day by day: settlement cycles, interest for every night on its own balance, dividends at what was really declared, early assignment by the rule "{book.Assignment.Rule.Word()}", expiry with exercise by exception and pins. Every cent is posted twice in a journal whose transactions sum to nothing.</li>
            <li>Expected profit is the plan of the decision, run through the same nights and roundings as the books. Each line from there to the realised profit is one cause; together they add up to the cent.</li>
            <li>Packages pay for their own financing. Interest on capital that none of them uses is idle; what the account's net balance earns or costs beyond both is netting.</li>
            <li>Mid marks everything in the middle of the last quotes of the day, liquidation at the touch that closes it, carry at the present value of what is still contractually due. The book's own mark is {book.Mark.Word()}. Packages still open at the end are marked, never counted as realised.</li>
            <li>Returns divide by cash tied up: the larger of what the fill cost and the margin it needed.</li>
            </ul>
            """);
    }

    /// <summary>What every reader must know.</summary>
    public static Html Caution() => Html.Of($"{Cautions.Sentences.Select(s => Html.Of($"<p>{s}</p>\n"))}");
}

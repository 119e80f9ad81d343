namespace CarryTest.Reports.Pages;

/// <summary>Tables: each in a box of its own that scrolls where the page is too narrow.</summary>
internal static class TableHtml
{
    /// <summary>A table.</summary>
    /// <param name="caption">what it shows; read out to those who do not see it</param>
    /// <param name="heads">column heads; one that begins with # holds numbers</param>
    /// <param name="rows">complete rows</param>
    /// <param name="sorts">whether the script may sort and filter it</param>
    /// <param name="tall">whether it scrolls within its box where it is long</param>
    public static Html Of(string caption, IReadOnlyList<string> heads, IEnumerable<Html> rows, bool sorts = false, bool tall = false) => Html.Of(
        $"""
        <div class="box{(tall ? " tall" : "")}" tabindex="0" role="region" aria-label="{caption}"><table{(sorts ? Html.Raw(" class=\"sorts\"") : Html.None)}><caption>{caption}</caption>
        <thead><tr>{heads.Select(Head)}</tr></thead>
        <tbody>{rows}</tbody></table></div>

        """);

    private static Html Head(string head) => head.StartsWith('#') ? Html.Of($"<th scope=\"col\" class=\"n\">{head[1..]}</th>") : Html.Of($"<th scope=\"col\">{head}</th>");
}

using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>The one list of a rule book's keys: it is read by it, its documentation and its schema are made from it.</summary>
internal static class RuleBookKeys
{
    /// <summary>Tables that only studies read, with the command that reads them.</summary>
    public static readonly IReadOnlyList<(string Table, string Command)> OfStudies =
        [("sweep", "sweep"), ("variant", "sweep"), ("surprise", "stress"), ("funding_case", "funding")];

    public static readonly Shape Shape = new(
        [
            .. RunSection.Keys,
            .. HistorySection.Keys,
            .. CapitalSection.Keys,
            .. PackagesSection.Keys,
            .. EntrySection.Keys,
            .. ExecutionSection.Keys,
            .. CostsSection.Keys,
            .. FundingSection.Keys,
            .. DividendsSection.Keys,
            .. AssignmentSection.Keys,
            .. BorrowSection.Keys,
            .. SettlementSection.Keys,
            .. UnwindSection.Keys,
            .. MarksSection.Keys,
            .. SweepSection.Keys,
            .. SurpriseSection.Keys,
            .. FundingCaseSection.Keys,
        ],
        new Dictionary<string, string>
        {
            ["history"] = "Which history, and which part of it.",
            ["capital"] = "Capital and margin.",
            ["capital.house"] = "The parameters of margin `house`.",
            ["packages"] = "What may be opened, and how much of it.",
            ["entry"] = "The tests at entry; every threshold must be cleared.",
            ["execution"] = "How a decision becomes a fill.",
            ["costs"] = "Fees and slippage.",
            ["funding"] = "Financing.",
            ["funding.believed"] = "What the rule believes at entry.",
            ["funding.charged"] = "What the books are charged.",
            ["dividends"] = "Dividends as the rule sees them.",
            ["assignment"] = "Early assignment, own exercise, and closes near the strike.",
            ["borrow"] = "Borrowed stock.",
            ["settlement"] = "Settlement cycles that differ from the calendar's.",
            ["unwind"] = "Closing before expiry.",
            ["marks"] = "How the book is marked.",
            ["sweep"] = "Settings over a range, read by the command `sweep`.",
        },
        HistorySection.Check,
        FundingSection.Check,
        CheckNames);

    /// <summary>The settings of a book: all keys but those of studies and those of later versions.</summary>
    public static IEnumerable<Key> OfBook => Shape.Keys.Where(k => k is not RowsKey && k.Later is null);

    // Rows of one list are told apart by their names.
    private static void CheckNames(Values values, string prefix, Problems problems)
    {
        foreach (RowsKey rows in Shape.Keys.OfType<RowsKey>().Where(r => r.Row.Find("name") is not null))
        {
            var seen = new HashSet<string>(StringComparer.OrdinalIgnoreCase);
            foreach (TableNode row in values.NodeOf(rows) is { } node ? RowsKey.Of(node) : [])
            {
                if (row.Find("name") is { Value: TextNode name } && !seen.Add(name.Value))
                {
                    problems.Add(name.At, $"`{rows.Path}.name` {name.Shown} is given twice; each needs a name of its own");
                }
            }
        }
    }
}

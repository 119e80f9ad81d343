namespace CarryTest.Reports.Pages;

/// <summary>What every reader of results must know; the report and the program's help say it in the same words.</summary>
public static class Cautions
{
    /// <summary>A sentence each.</summary>
    public static IReadOnlyList<string> Sentences { get; } =
    [
        "These results are hypothetical. They were worked out with hindsight, no money was at risk, and what could have been traded is assumed from the sizes that were displayed; real results will differ.",
        "Nothing here is investment, legal, tax or accounting advice.",
        "The rules of margin, fees, exercise and settlement are simplified. Those of your own broker, clearing house, exchange and jurisdiction, and the judgement of licensed professionals, come first.",
        "Short American options can be assigned on any day, and a package that is called riskless on paper can lose more than the capital put up for it.",
    ];
}

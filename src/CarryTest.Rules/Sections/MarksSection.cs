using CarryTest.Carry.Rules;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[marks]`.</summary>
internal static class MarksSection
{
    private static readonly Key<EquityMark> Equity = new("marks.equity", Forms.Word<EquityMark>(), "Which of the three marks is the book's own.") { Default = new BookRules().Mark };

    public static readonly IReadOnlyList<Key> Keys = [Equity];

    public static EquityMark Bind(Values values) => values.Of(Equity);
}

using CarryTest.Carry.Borrow;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[borrow]`.</summary>
internal static class BorrowSection
{
    private const string NoRecalls = "recalls of borrowed stock come with a later version";

    private static readonly BorrowSettings Usual = new();

    private static readonly Key<double> Base = new("borrow.base", Forms.Number(0, 2), "The part of the marked value on which the fee is charged.") { Default = Usual.Base };

    private static readonly Key<OnRecall> OnRecall = new("borrow.on_recall", Forms.Word<OnRecall>(), "What a recall ends.") { Later = NoRecalls, Default = Usual.OnRecall };

    private static readonly Key<int> NoticeDays = new("borrow.notice_days", Forms.Whole(0, 100), "Trading days from a recall to the buy-in.") { Later = NoRecalls, Default = Usual.NoticeDays };

    public static readonly IReadOnlyList<Key> Keys = [Base, OnRecall, NoticeDays];

    public static BorrowSettings Bind(Values values) => new() { Base = values.Of(Base) };
}

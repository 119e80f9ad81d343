using CarryTest.Carry.Assignment;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[assignment]`.</summary>
internal static class AssignmentSection
{
    private static readonly AssignmentSettings Usual = new();

    private static readonly Key<AssignmentRule> Rule =
        new("assignment.rule", Forms.Word(AssignmentRule.Boundary, AssignmentRule.Every), "When holders of the book's short options exercise early.") { Default = Usual.Rule };

    private static readonly Key<AssignmentQuote> Quote = new("assignment.quote", Forms.Word<AssignmentQuote>(), "Which quote the test of early exercise reads.") { Default = Usual.Quote };

    private static readonly Key<double> Fraction = new("assignment.fraction", Forms.Number(0, 1), "Fraction of holders who act.") { Default = Usual.Fraction };

    private static readonly Key<AssignmentDraw> Draw = new("assignment.draw", Forms.Word(AssignmentDraw.Sampled), "How a fraction of contracts becomes whole contracts.") { Default = Usual.Draw };

    private static readonly Key<AfterAssignment> After = new("assignment.after", Forms.Word<AfterAssignment>(), "What is done with what an early assignment leaves.") { Default = Usual.After };

    private static readonly Key<double> ExerciseCostPerShare =
        new("assignment.exercise_cost_per_share", Forms.Number(0, 100), "What exercise costs the holder, currency per share.") { Default = Usual.ExerciseCostPerShare };

    private static readonly Key<OwnExercise> ExerciseLong = new("assignment.exercise_long", Forms.Word<OwnExercise>(), "When the book exercises its own long options early.") { Default = Usual.ExerciseLong };

    private static readonly Key<double> PinBand = new("assignment.pin_band", Forms.Number(0, 1000), "Distance from the strike within which expiry is uncertain, currency per share.") { Default = Usual.PinBand };

    private static readonly Key<double> PinFraction = new("assignment.pin_fraction", Forms.Number(0, 1), "Fraction assigned when the close is exactly the strike.") { Default = Usual.PinFraction };

    public static readonly IReadOnlyList<Key> Keys = [Rule, Quote, Fraction, Draw, After, ExerciseCostPerShare, ExerciseLong, PinBand, PinFraction];

    public static AssignmentSettings Bind(Values values) => new()
    {
        Rule = values.Of(Rule),
        Quote = values.Of(Quote),
        Fraction = values.Of(Fraction),
        Draw = values.Of(Draw),
        After = values.Of(After),
        ExerciseCostPerShare = values.Of(ExerciseCostPerShare),
        ExerciseLong = values.Of(ExerciseLong),
        PinBand = values.Of(PinBand),
        PinFraction = values.Of(PinFraction),
    };
}

using CarryTest.Market.Words;

namespace CarryTest.Carry.Assignment;

/// <summary>When holders of the book's short options exercise early.</summary>
public enum AssignmentRule
{
    /// <summary>When the chain itself says it pays.</summary>
    [Word("chain", "when the quotes of that close say that exercise pays")]
    Chain,

    /// <summary>Beyond the model's boundary.</summary>
    [Word("boundary", "beyond the boundary of the American price at the implied volatility")]
    Boundary,

    /// <summary>At every chance.</summary>
    [Word("every", "at every chance, whether it pays or not")]
    Every,

    /// <summary>Never.</summary>
    [Word("none", "never before expiry")]
    None,
}

/// <summary>Which quote the test of early exercise reads.</summary>
public enum AssignmentQuote
{
    /// <summary>The middle.</summary>
    [Word("mid", "the middle of bid and ask")]
    Mid,

    /// <summary>The bid: the cautious choice for what the book is short.</summary>
    [Word("bid", "the bid: the cautious choice for what the book is short")]
    Bid,
}

/// <summary>How a fraction of contracts becomes whole contracts.</summary>
public enum AssignmentDraw
{
    /// <summary>Rounded, the remainder carried forward.</summary>
    [Word("expected", "rounded, remainders carried forward")]
    Expected,

    /// <summary>Drawn.</summary>
    [Word("sampled", "drawn from a binomial distribution under the seed")]
    Sampled,
}

/// <summary>What is done with what an early assignment leaves.</summary>
public enum AfterAssignment
{
    /// <summary>The best of the three.</summary>
    [Word("best", "the best of keep, cover and close at the first snapshot after the notice")]
    Best,

    /// <summary>Keep the conversion or reversal, sell the free option.</summary>
    [Word("keep", "the conversion or reversal that is left is kept, the free option is sold at its bid")]
    Keep,

    /// <summary>Cover the stock by own exercise or in the market, close the rest.</summary>
    [Word("cover", "stock is covered by exercise of the own option or in the market, whichever is better, and the rest is closed at the touch")]
    Cover,

    /// <summary>Close everything at the touch.</summary>
    [Word("close", "everything is closed at the touch")]
    Close,
}

/// <summary>When the book exercises its own long options early.</summary>
public enum OwnExercise
{
    /// <summary>When the chain says it pays.</summary>
    [Word("chain", "when the quotes of the eve of an ex-date say that exercise pays")]
    Chain,

    /// <summary>Never.</summary>
    [Word("never", "never before expiry")]
    Never,
}

/// <summary>Early assignment, own exercise and pins (rule book `[assignment]`).</summary>
public sealed record AssignmentSettings
{
    /// <summary>When holders exercise early.</summary>
    public AssignmentRule Rule { get; init; } = AssignmentRule.Chain;

    /// <summary>Which quote the test reads.</summary>
    public AssignmentQuote Quote { get; init; } = AssignmentQuote.Mid;

    /// <summary>Fraction of holders who act.</summary>
    public double Fraction { get; init; } = 1.0;

    /// <summary>How a fraction becomes whole contracts.</summary>
    public AssignmentDraw Draw { get; init; } = AssignmentDraw.Expected;

    /// <summary>What is done afterwards.</summary>
    public AfterAssignment After { get; init; } = AfterAssignment.Best;

    /// <summary>What exercise costs the holder, currency per share.</summary>
    public double ExerciseCostPerShare { get; init; } = 0.01;

    /// <summary>When the book exercises its own options early.</summary>
    public OwnExercise ExerciseLong { get; init; } = OwnExercise.Chain;

    /// <summary>Distance from the strike within which expiry is uncertain, currency per share.</summary>
    public double PinBand { get; init; } = 0.05;

    /// <summary>Fraction assigned exactly at the strike.</summary>
    public double PinFraction { get; init; } = 0.5;
}

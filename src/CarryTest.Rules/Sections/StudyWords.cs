using CarryTest.Market.Words;

namespace CarryTest.Rules.Sections;

/// <summary>What a surprise does to dividends.</summary>
internal enum DividendChange
{
    [Word("scale", "the amount is multiplied by `factor`")]
    Scale,

    [Word("set", "the amount becomes `amount`")]
    Set,

    [Word("omit", "the dividend is not paid")]
    Omit,

    [Word("add", "a dividend of `amount` is added")]
    Add,

    [Word("move", "the dates move by `days`")]
    Move,
}

/// <summary>When the price of a surprise jumps.</summary>
internal enum GapWhen
{
    [Word("overnight", "between the close and the next session: only what is left after exercise meets it")]
    Overnight,

    [Word("after-close", "after the close, while holders still decide: they decide on the new price")]
    AfterClose,
}

namespace CarryTest.Pricing.Options;

/// <summary>What an option gives its holder.</summary>
public enum OptionRight
{
    /// <summary>To buy at the strike.</summary>
    Call,

    /// <summary>To sell at the strike.</summary>
    Put,
}

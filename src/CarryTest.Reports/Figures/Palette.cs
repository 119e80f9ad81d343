namespace CarryTest.Reports.Figures;

/// <summary>Colours of paper, lines and tones. Text on paper has a contrast of 4.5 or more in both.</summary>
/// <param name="Paper">behind everything</param>
/// <param name="Raised">behind tables' heads and panels</param>
/// <param name="Line">of grids and rules</param>
/// <param name="Ink">text</param>
/// <param name="Quiet">text that matters less</param>
/// <param name="First">first tone</param>
/// <param name="Second">second tone</param>
/// <param name="Third">third tone</param>
/// <param name="Gain">above plan</param>
/// <param name="Loss">below plan</param>
internal sealed record Palette(
    string Paper, string Raised, string Line, string Ink, string Quiet, string First, string Second, string Third, string Gain, string Loss)
{
    public static Palette Light { get; } = new(
        "#fcfbf8", "#f3f1ea", "#d8d5cb", "#1c2326", "#596369", "#0b5a6a", "#a85a0c", "#73407a", "#25683f", "#a2312a");

    public static Palette Dark { get; } = new(
        "#141819", "#1d2324", "#353d3f", "#e5e8e4", "#9ba7a8", "#6cbccb", "#e2a55e", "#cb9bd0", "#7dc597", "#f09488");

    /// <summary>The colour of a tone.</summary>
    public string Of(Tone tone) => tone switch
    {
        Tone.Quiet => Quiet,
        Tone.First => First,
        Tone.Second => Second,
        Tone.Third => Third,
        Tone.Gain => Gain,
        Tone.Loss => Loss,
        _ => Ink,
    };
}

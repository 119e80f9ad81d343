using System.Collections.Immutable;

namespace CarryTest.Reports.Figures;

/// <summary>What a colour stands for; palettes say which colour it is.</summary>
internal enum Tone
{
    Ink,
    Quiet,
    First,
    Second,
    Third,
    Gain,
    Loss,
}

/// <summary>How a line is drawn, so that lines differ without colour.</summary>
internal enum Stroke
{
    Solid,
    Dashed,
    Dotted,
}

/// <summary>The shape of a dot, so that dots differ without colour.</summary>
internal enum Shape
{
    Circle,
    Ring,
    Square,
    Diamond,
    TriangleUp,
    TriangleDown,
    Cross,
}

/// <summary>What an axis shows.</summary>
internal enum AxisKind
{
    /// <summary>Values are day numbers.</summary>
    Dates,

    /// <summary>Values are numbers.</summary>
    Numbers,

    /// <summary>Values are counts, drawn by their decimal logarithm.</summary>
    Logarithm,

    /// <summary>Values are places in a list of labels, the first on top.</summary>
    Labels,
}

/// <summary>An axis.</summary>
/// <param name="Kind">what it shows</param>
/// <param name="Title">with its unit</param>
/// <param name="Format">of numbers, as in .NET; ignored for the rest</param>
/// <param name="Labels">of <see cref="AxisKind.Labels"/></param>
/// <param name="Limits">fixed limits; null: what the marks need</param>
internal sealed record Axis(AxisKind Kind, string Title, string Format = "#,0", ImmutableArray<string> Labels = default, (double Low, double High)? Limits = null);

/// <summary>Something that is drawn.</summary>
/// <param name="Label">for the legend; empty: none</param>
internal abstract record Mark(string Label);

/// <summary>A line that keeps its value until the next point.</summary>
internal sealed record StepLine(string Label, Tone Tone, Stroke Stroke, ImmutableArray<double> X, ImmutableArray<double> Y) : Mark(Label);

/// <summary>The area between zero and a line that keeps its value until the next point.</summary>
internal sealed record Band(string Label, Tone Tone, ImmutableArray<double> X, ImmutableArray<double> Y) : Mark(Label);

/// <summary>One bar.</summary>
/// <param name="At">place on the axis of labels</param>
/// <param name="From">where it begins</param>
/// <param name="To">where it ends</param>
/// <param name="Tone">what its colour stands for</param>
/// <param name="Text">written at its end</param>
internal readonly record struct Bar(int At, double From, double To, Tone Tone, string Text);

/// <summary>Lying bars, one a label.</summary>
internal sealed record Bars(string Label, ImmutableArray<Bar> Items) : Mark(Label);

/// <summary>Dots of one shape.</summary>
internal sealed record Dots(string Label, Tone Tone, Shape Shape, ImmutableArray<double> X, ImmutableArray<double> Y) : Mark(Label);

/// <summary>A straight line to compare with.</summary>
internal sealed record Rule(string Label, double X1, double Y1, double X2, double Y2) : Mark(Label);

/// <summary>One pair of axes with what is drawn between them.</summary>
/// <param name="X">from left to right</param>
/// <param name="Y">from bottom to top; labels from top to bottom</param>
/// <param name="Marks">drawn in this order</param>
/// <param name="Height">of the space between the axes, in pixels of the page</param>
internal sealed record Panel(Axis X, Axis Y, ImmutableArray<Mark> Marks, double Height);

/// <summary>The one description of a figure; every drawer draws the same numbers from it.</summary>
/// <param name="Id">names the file and the place in the page</param>
/// <param name="Title">short</param>
/// <param name="Description">what can be seen in it, for those who do not see it</param>
/// <param name="Panels">below each other</param>
/// <param name="Full">whether it takes the page's whole width</param>
internal sealed record Figure(string Id, string Title, string Description, ImmutableArray<Panel> Panels, bool Full = false);

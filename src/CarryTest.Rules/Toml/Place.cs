using System.Globalization;

namespace CarryTest.Rules.Toml;

/// <summary>Where something is written: a file with line and column (both from 1), or an option of the command line (line 0).</summary>
internal readonly record struct Place(string Source, int Line, int Column)
{
    /// <summary>A place that is a whole file or option.</summary>
    public static Place Of(string source) => new(source, 0, 0);

    /// <summary>`file:line:column`, as editors and compilers write it.</summary>
    public override string ToString() =>
        Line == 0 ? Source : string.Create(CultureInfo.InvariantCulture, $"{Source}:{Line}:{Column}");
}

using CarryTest.Parity.Costs;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Sections;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Reading;

/// <summary>Reads a fee schedule: TOML, one `[[fee]]` a row.</summary>
internal static class FeeScheduleReader
{
    /// <summary>The schedule of a file.</summary>
    /// <param name="files">where files are</param>
    /// <param name="named">the file as the rule book names it</param>
    /// <param name="askedFor">where the rule book names it</param>
    /// <exception cref="Market.Faults.InputException">the file cannot be read or something in it is wrong</exception>
    public static FeeSchedule Read(SideFiles files, string named, Place askedFor)
    {
        string text = files.Read(named, "the fee schedule", askedFor);
        var problems = new Problems();
        TableNode document = TomlText.Read(text, files.PathOf(named), problems);
        problems.ThrowIfAny();
        FeeKeys.Shape.Check(document, "", problems);
        problems.ThrowIfAny();
        return new FeeSchedule([.. RowsKey.Of(new Values(document).NodeOf(FeeKeys.Rows)!).Select(row => FeeKeys.Bind(new Values(row)))]);
    }
}

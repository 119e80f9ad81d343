using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Reading;

/// <summary>The files that a rule book names, relative to its own folder.</summary>
/// <param name="home">the folder of the rule book as the user named it: messages name files the same way</param>
internal sealed class SideFiles(string home)
{
    /// <summary>The path of a file that the rule book names, as messages show it.</summary>
    public string PathOf(string named) => Path.Combine(home, named);

    /// <summary>The text of such a file.</summary>
    /// <param name="named">as the rule book names it</param>
    /// <param name="what">what it is, for messages</param>
    /// <param name="askedFor">where it is named</param>
    public string Read(string named, string what, Place askedFor) => TextFile.Read(PathOf(named), what, askedFor);
}

namespace CarryTest.Market.Words;

/// <summary>The word by which an enum value is known outside the program (rule books, ledgers, reports) and the sentence that explains it.</summary>
/// <param name="word">lower case, words joined by hyphens: what is written to and read from files</param>
/// <param name="sentence">one plain sentence; help, documentation and report legends show it</param>
[AttributeUsage(AttributeTargets.Field)]
public sealed class WordAttribute(string word, string sentence) : Attribute
{
    /// <summary>What is written to and read from files.</summary>
    public string Word { get; } = word;

    /// <summary>One plain sentence of explanation.</summary>
    public string Sentence { get; } = sentence;
}

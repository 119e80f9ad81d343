using System.Reflection;

namespace CarryTest.Market.Words;

/// <summary>The words of one enum, in the order of its values. Every value must carry a <see cref="WordAttribute"/>.</summary>
public static class Vocabulary<T>
    where T : struct, Enum
{
    private static readonly (T Value, string Word, string Sentence)[] Entries =
    [
        .. Enum.GetValues<T>().Select(value =>
        {
            WordAttribute word = typeof(T).GetField(value.ToString())!.GetCustomAttribute<WordAttribute>()
                ?? throw new InvalidOperationException($"{typeof(T).Name}.{value} has no word");
            return (value, word.Word, word.Sentence);
        }),
    ];

    private static readonly Dictionary<T, int> Places = Entries.Select((entry, i) => (entry.Value, i)).ToDictionary(e => e.Value, e => e.i);

    /// <summary>All values with word and sentence, in the order of the enum.</summary>
    public static IReadOnlyList<(T Value, string Word, string Sentence)> All => Entries;

    /// <summary>The word of a value.</summary>
    public static string Word(T value) => Entries[Places[value]].Word;

    /// <summary>The sentence of a value.</summary>
    public static string Sentence(T value) => Entries[Places[value]].Sentence;

    /// <summary>Finds the value of a word; false where no value has it.</summary>
    public static bool TryRead(string word, out T value)
    {
        foreach ((T candidate, string known, _) in Entries)
        {
            if (known == word)
            {
                value = candidate;
                return true;
            }
        }

        value = default;
        return false;
    }
}

/// <summary>Short forms of <see cref="Vocabulary{T}"/>.</summary>
public static class Vocabulary
{
    /// <summary>The word of a value.</summary>
    public static string Word<T>(this T value)
        where T : struct, Enum => Vocabulary<T>.Word(value);

    /// <summary>The sentence of a value.</summary>
    public static string Sentence<T>(this T value)
        where T : struct, Enum => Vocabulary<T>.Sentence(value);
}

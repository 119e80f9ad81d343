using System.Reflection;
using System.Text.RegularExpressions;
using CarryTest.Market.Contracts;
using CarryTest.Market.Words;

namespace CarryTest.Market.Tests.Words;

public sealed partial class VocabularyTests
{
    public static TheoryData<Type> Enums => [.. typeof(Vocabulary).Assembly.GetExportedTypes().Where(t => t.IsEnum)];

    [Theory]
    [MemberData(nameof(Enums))]
    public void Words_OfAnEnum_AreThereUniqueAndLowerCase(Type type)
    {
        WordAttribute[] words =
        [
            .. type.GetFields(BindingFlags.Public | BindingFlags.Static)
                .Select(f => f.GetCustomAttribute<WordAttribute>() ?? throw new InvalidOperationException($"{type.Name}.{f.Name} has no word")),
        ];

        Assert.NotEmpty(words);
        Assert.Equal(words.Length, words.Select(w => w.Word).Distinct(StringComparer.Ordinal).Count());
        Assert.All(words, w => Assert.Matches(LowerCaseWord(), w.Word));
        Assert.All(words, w => Assert.False(string.IsNullOrWhiteSpace(w.Sentence)));
    }

    [Fact]
    public void TryRead_EveryWord_GivesItsValue()
    {
        foreach ((SettlementStyle value, string word, string sentence) in Vocabulary<SettlementStyle>.All)
        {
            Assert.True(Vocabulary<SettlementStyle>.TryRead(word, out SettlementStyle read));
            Assert.Equal(value, read);
            Assert.Equal(word, value.Word());
            Assert.Equal(sentence, value.Sentence());
        }
    }

    [Theory]
    [InlineData("Shares")]
    [InlineData(" shares")]
    [InlineData("")]
    [InlineData("cash")]
    public void TryRead_AnotherWord_FindsNothing(string word) => Assert.False(Vocabulary<SettlementStyle>.TryRead(word, out _));

    [Fact]
    public void Word_ValueOutsideTheEnum_IsRefused() => Assert.Throws<KeyNotFoundException>(() => ((Right)99).Word());

    [GeneratedRegex("^[a-z0-9]+(-[a-z0-9]+)*$")]
    private static partial Regex LowerCaseWord();
}

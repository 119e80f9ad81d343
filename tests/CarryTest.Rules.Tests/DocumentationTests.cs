using System.Text.Json.Nodes;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Schema;
using CarryTest.Rules.Sections;

namespace CarryTest.Rules.Tests;

public sealed class DocumentationTests
{
    [Fact]
    public void Page_AsCommitted_IsWhatTheListOfKeysMakes() => Compare("docs/rule-book.md", RuleBookPage.Text());

    [Fact]
    public void Schema_AsCommitted_IsWhatTheListOfKeysMakes() => Compare("docs/rule-book.schema.json", RuleBookSchema.Text());

    [Fact]
    public void Schema_ForEveryKeyThatMayBeWritten_HasAPropertyWithASentence()
    {
        JsonNode schema = JsonNode.Parse(RuleBookSchema.Text())!;
        foreach (Key key in RuleBookKeys.Shape.Keys)
        {
            JsonNode? place = schema;
            foreach (string name in key.Path.Split('.'))
            {
                place = place?["properties"]?[name];
            }

            if (key.Later is not null)
            {
                Assert.True(place is null, key.Path);
                continue;
            }

            Assert.Equal(key.Sentence, (string?)place?["description"]);
        }
    }

    private static void Compare(string file, string made)
    {
        string path = Path.Combine(Repository.Root, file);
        if (Environment.GetEnvironmentVariable("CARRYTEST_WRITE_DOCS") == "1")
        {
            Directory.CreateDirectory(Path.GetDirectoryName(path)!);
            File.WriteAllText(path, made);
        }

        Assert.Equal(made, File.ReadAllText(path));
    }
}

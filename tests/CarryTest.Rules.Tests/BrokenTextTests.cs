using CarryTest.Market.Faults;
using CarryTest.Rules.Reading;
using CsCheck;

namespace CarryTest.Rules.Tests;

public sealed class BrokenTextTests : IDisposable
{
    private static readonly string[] Put = ["", "[", "]", "{", "}", "=", "\"", "\n", ".", ",", "1", "#", "inf", "2025-01-01", "\u00e4", "[["];

    // Headers, rows, inline tables and lists in one text.
    private static readonly string Sample = Config("dividend-surprise") + From("\n[funding.believed]", Config("financing-assumptions")) + From("\n[sweep]", Config("edge-threshold"));

    private readonly RuleBookFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void RuleBook_SpoiltAnywhere_IsReadOrRefusedAndNeverFallsOver()
    {
        // Letters taken out, put in and exchanged in a text that uses every kind of table; CsCheck prints the seed of a failure.
        RuleBookReader.Read(_folder.Write("rules.toml", Sample), ["costs.schedule=none"]);
        Gen<(int, int, string)> spoil = Gen.Select(Gen.Int[0, Sample.Length - 1], Gen.Int[0, 6], Gen.Int[0, Put.Length - 1].Select(i => Put[i]));
        spoil.Array[1, 4].Sample(
            spoils =>
            {
                string text = Sample;
                foreach ((int at, int taken, string put) in spoils)
                {
                    int start = Math.Min(at, text.Length);
                    text = text.Remove(start, Math.Min(taken, text.Length - start)).Insert(start, put);
                }

                string file = _folder.Write("rules.toml", text);
                try
                {
                    RuleBookReader.Read(file, ["costs.schedule=none"]);
                }
                catch (InputException refused)
                {
                    Assert.All(refused.Message.Split('\n'), line => Assert.Matches(@"^(.*rules\.toml:\d+:\d+|--set costs\.schedule=none): ", line));
                }
            },
            iter: 600,
            threads: 1);
    }

    private static string Config(string name) => File.ReadAllText(Path.Combine(Repository.Root, "configs", name + ".toml"));

    private static string From(string header, string text) => text[text.IndexOf(header, StringComparison.Ordinal)..];
}

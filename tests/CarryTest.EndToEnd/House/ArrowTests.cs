using System.Xml.Linq;

namespace CarryTest.EndToEnd.House;

/// <summary>The arrows between projects and the outside libraries that each may use: the statement that the contributor's guide makes, held against the project files.</summary>
public sealed class ArrowTests
{
    private static readonly Dictionary<string, (string[] Projects, string[] Libraries)> Allowed = new()
    {
        ["Market"] = ([], []),
        ["Pricing"] = ([], []),
        ["History"] = (["Market"], ["Parquet.Net", "CsvHelper"]),
        ["Parity"] = (["Market", "Pricing"], []),
        ["Carry"] = (["Parity"], []),
        ["Studies"] = (["Carry"], ["MathNet.Numerics"]),
        ["Rules"] = (["Studies"], ["Tomlyn"]),
        ["Reports"] = (["Studies"], ["Parquet.Net", "Microsoft.Data.Analysis", "ScottPlot"]),
        ["Invention"] = (["History", "Pricing"], []),
        ["Cli"] = (["Rules", "Reports", "Invention", "History"], ["System.CommandLine"]),
    };

    public static TheoryData<string> Projects => [.. Allowed.Keys];

    [Theory]
    [MemberData(nameof(Projects))]
    public void Project_References_AreThoseOfTheGuide(string name)
    {
        XDocument project = XDocument.Load(Checkout.At("src", "CarryTest." + name, $"CarryTest.{name}.csproj"));
        string[] projects = [.. project.Descendants("ProjectReference").Select(r => Path.GetFileNameWithoutExtension(r.Attribute("Include")!.Value)["CarryTest.".Length..])];
        string[] libraries = [.. project.Descendants("PackageReference").Select(r => r.Attribute("Include")!.Value)];
        Assert.Equal(Allowed[name].Projects.Order(), projects.Order());
        Assert.Empty(libraries.Except(Allowed[name].Libraries));
        Assert.All(project.Descendants("PackageReference"), r => Assert.Equal("compile", r.Attribute("PrivateAssets")?.Value));
    }

    [Fact]
    public void Source_HasNoOtherProject()
    {
        string[] found = [.. Directory.GetDirectories(Checkout.At("src")).Select(d => Path.GetFileName(d)["CarryTest.".Length..])];
        Assert.Equal(Allowed.Keys.Order(), found.Order());
    }
}

namespace CarryTest.Reports.Tests.Samples;

/// <summary>A folder that is gone after the test.</summary>
internal sealed class TemporaryFolder : IDisposable
{
    public string Path { get; } = Directory.CreateTempSubdirectory("carrytest").FullName;

    public string Below(params string[] names) => System.IO.Path.Combine([Path, .. names]);

    public void Dispose() => Directory.Delete(Path, recursive: true);
}

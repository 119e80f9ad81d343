namespace CarryTest.Testing.Files;

/// <summary>A folder of one test, removed with it.</summary>
public sealed class TemporaryFolder : IDisposable
{
    /// <summary>Its path; it exists.</summary>
    public string Path { get; } = Directory.CreateTempSubdirectory("carrytest-").FullName;

    /// <summary>A path below it.</summary>
    public string At(params string[] parts) => System.IO.Path.Combine([Path, .. parts]);

    /// <inheritdoc/>
    public void Dispose() => Directory.Delete(Path, recursive: true);
}

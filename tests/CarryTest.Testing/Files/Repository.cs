namespace CarryTest.Testing.Files;

/// <summary>Where the repository stands, seen from a test program below it.</summary>
public static class Repository
{
    /// <summary>The folder that holds CarryTest.sln.</summary>
    public static string Root { get; } = Find();

    /// <summary>A path below it.</summary>
    public static string At(params string[] parts) => Path.Combine([Root, .. parts]);

    private static string Find()
    {
        DirectoryInfo? folder = new(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "CarryTest.sln")))
        {
            folder = folder.Parent;
        }

        return folder?.FullName ?? throw new InvalidOperationException("the tests run outside the repository");
    }
}

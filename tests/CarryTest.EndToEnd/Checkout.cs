namespace CarryTest.EndToEnd;

/// <summary>Where the repository stands, seen from a test program below it.</summary>
internal static class Checkout
{
    public static string Root { get; } = Find();

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

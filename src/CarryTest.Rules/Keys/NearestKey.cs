namespace CarryTest.Rules.Keys;

/// <summary>Finds the known key that an unknown one was most likely meant to be.</summary>
internal static class NearestKey
{
    /// <summary>The nearest by letters inserted, left out, exchanged or swapped; a key of the same name in another table costs one letter. Ties go to the first.</summary>
    public static string Of(string unknown, IReadOnlyList<string> known)
    {
        (string home, string name) = Split(unknown);
        return known.MinBy(candidate =>
        {
            (string otherHome, string otherName) = Split(candidate);
            int moved = Distance(name, otherName) + (home == otherHome ? 0 : 1);
            return Math.Min(moved, Distance(unknown, candidate));
        })!;
    }

    private static (string Home, string Name) Split(string path)
    {
        int dot = path.LastIndexOf('.');
        return dot < 0 ? ("", path) : (path[..dot], path[(dot + 1)..]);
    }

    /// <summary>Optimal string alignment distance.</summary>
    private static int Distance(string a, string b)
    {
        int[,] cost = new int[a.Length + 1, b.Length + 1];
        for (int i = 0; i <= a.Length; i++)
        {
            cost[i, 0] = i;
        }

        for (int j = 0; j <= b.Length; j++)
        {
            cost[0, j] = j;
        }

        for (int i = 1; i <= a.Length; i++)
        {
            for (int j = 1; j <= b.Length; j++)
            {
                int exchanged = cost[i - 1, j - 1] + (a[i - 1] == b[j - 1] ? 0 : 1);
                cost[i, j] = Math.Min(exchanged, Math.Min(cost[i - 1, j], cost[i, j - 1]) + 1);
                if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
                {
                    cost[i, j] = Math.Min(cost[i, j], cost[i - 2, j - 2] + 1);
                }
            }
        }

        return cost[a.Length, b.Length];
    }
}

namespace CarryTest.History.Reading;

/// <summary>Strike rows as plain numbers in the units of the layout: a row group, or what several of them hold of one day.</summary>
internal sealed class RawRows
{
    public required int Count { get; init; }

    /// <summary>Microseconds since 1970, UTC.</summary>
    public required long[] QuotedAt { get; init; }

    /// <summary>Days since 1970.</summary>
    public required int[] Expiry { get; init; }

    /// <summary>Thousandths per share.</summary>
    public required int[] Strike { get; init; }

    /// <summary>In the order of the layout; per share, 0 = none.</summary>
    public required double[][] Prices { get; init; }

    /// <summary>In the order of the layout; null where the file has no such column, -1 where a row has none.</summary>
    public required int[]?[] Sizes { get; init; }

    /// <summary>Where a row stands: file, row group, row, both counted from 0.</summary>
    public required Func<int, string> PlaceOf { get; init; }

    /// <summary>Orders two rows by quoted_at, expiry, strike.</summary>
    public int Compare(int a, int b)
    {
        int byInstant = QuotedAt[a].CompareTo(QuotedAt[b]);
        if (byInstant != 0)
        {
            return byInstant;
        }

        int byExpiry = Expiry[a].CompareTo(Expiry[b]);
        return byExpiry != 0 ? byExpiry : Strike[a].CompareTo(Strike[b]);
    }

    /// <summary>Joins parts of a day into one, in the order of their keys; rows with one key stay in the order of the parts.</summary>
    public static RawRows Join(IReadOnlyList<RawPart> parts)
    {
        int count = parts.Sum(p => p.Count);
        int[] partOf = new int[count];
        int[] rowOf = new int[count];
        int next = 0;
        for (int p = 0; p < parts.Count; p++)
        {
            for (int row = parts[p].From; row < parts[p].To; row++)
            {
                (partOf[next], rowOf[next]) = (p, row);
                next++;
            }
        }

        RawRows joined = Gathered(parts, partOf, rowOf);
        int[] order = [.. Enumerable.Range(0, count)];
        Array.Sort(order, (a, b) => joined.Compare(a, b) is var byKey and not 0 ? byKey : a.CompareTo(b));
        return Gathered(parts, [.. order.Select(i => partOf[i])], [.. order.Select(i => rowOf[i])]);
    }

    private static RawRows Gathered(IReadOnlyList<RawPart> parts, int[] partOf, int[] rowOf)
    {
        T[] Take<T>(Func<RawRows, T[]?> column, T missing)
        {
            T[] values = new T[rowOf.Length];
            for (int i = 0; i < values.Length; i++)
            {
                values[i] = column(parts[partOf[i]].Rows) is { } part ? part[rowOf[i]] : missing;
            }

            return values;
        }

        return new RawRows
        {
            Count = rowOf.Length,
            QuotedAt = Take(r => r.QuotedAt, 0L),
            Expiry = Take(r => r.Expiry, 0),
            Strike = Take(r => r.Strike, 0),
            Prices = [.. Enumerable.Range(0, ChainLayout.Prices.Length).Select(i => Take(r => r.Prices[i], 0.0))],
            Sizes = [.. Enumerable.Range(0, ChainLayout.Sizes.Length).Select(i => parts.Any(p => p.Rows.Sizes[i] is not null) ? Take(r => r.Sizes[i], -1) : null)],
            PlaceOf = i => parts[partOf[i]].Rows.PlaceOf(rowOf[i]),
        };
    }
}

/// <summary>Rows from <paramref name="From"/> up to, without, <paramref name="To"/>.</summary>
internal readonly record struct RawPart(RawRows Rows, int From, int To)
{
    public int Count => To - From;
}

using System.Collections.Immutable;
using System.Globalization;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Quotes;

namespace CarryTest.History.Reading;

/// <summary>Makes the chains of one root and trading day from the rows of a row group, leaving out rows with errors and counting them.</summary>
internal sealed class DayBuilder(OptionRoot root, Underlying underlying, TradingCalendar calendar, FindingList findings, bool stopOnError)
{
    private static readonly TimeSpan AfterTheClose = TimeSpan.FromMinutes(15);

    /// <summary>The chains of a day, by instant.</summary>
    /// <param name="part">the rows of the day, sorted</param>
    /// <param name="date">the day</param>
    public List<(DateTime At, Chain Chain)> Build(RawPart part, DateOnly date)
    {
        RawRows raw = part.Rows;
        int[] kept = new int[part.Count];
        int count = 0;
        int today = ChainLayout.Days(date);
        (long first, long last) = Session(date);
        for (int i = part.From; i < part.To; i++)
        {
            bool inSession = raw.QuotedAt[i] >= first && raw.QuotedAt[i] <= last;
            int before = count > 0 ? kept[count - 1] : -1;
            if (Fault(raw, i, i > part.From, before, today, inSession) is { } fault)
            {
                Report(fault, raw, i);
                continue;
            }

            if (Crossed(raw, i))
            {
                Count(FindingKind.Crossed, raw, i);
            }

            kept[count++] = i;
        }

        return Chains(raw, kept.AsSpan(0, count));
    }

    private (long First, long Last) Session(DateOnly date)
    {
        if (!calendar.IsTradingDay(date))
        {
            return (long.MaxValue, long.MinValue);
        }

        (DateTime open, DateTime close) = calendar.RegularSession(date);
        return (ChainLayout.Micros(open), ChainLayout.Micros(close + AfterTheClose));
    }

    /// <param name="raw">all rows</param>
    /// <param name="i">the row looked at</param>
    /// <param name="hasPrevious">whether the row before it belongs to the day</param>
    /// <param name="kept">the last row without a fault, -1 where there is none</param>
    /// <param name="today">days since 1970</param>
    /// <param name="inSession">whether the instant lies in the day's session</param>
    private static FindingKind? Fault(RawRows raw, int i, bool hasPrevious, int kept, int today, bool inSession)
    {
        if (!inSession)
        {
            return FindingKind.OutsideSession;
        }

        if (raw.Strike[i] <= 0)
        {
            return FindingKind.Strike;
        }

        double[][] prices = raw.Prices;
        if (prices[0][i] < 0 || prices[1][i] < 0 || prices[2][i] < 0 || prices[3][i] < 0 || prices[4][i] < 0 || prices[5][i] < 0)
        {
            return FindingKind.NegativePrice;
        }

        if (raw.Expiry[i] < today)
        {
            return FindingKind.Expired;
        }

        if (hasPrevious && raw.Compare(i, i - 1) == 0)
        {
            return FindingKind.DuplicateKey;
        }

        // Quotes are compared as they were recorded, not as results of a computation.
        bool differs = kept >= 0 && raw.QuotedAt[kept] == raw.QuotedAt[i] && (raw.Prices[4][kept] != raw.Prices[4][i] || raw.Prices[5][kept] != raw.Prices[5][i]);
        return differs ? FindingKind.UnderlyingDiffers : null;
    }

    private static bool Crossed(RawRows raw, int i) =>
        (raw.Prices[0][i] > raw.Prices[1][i] && raw.Prices[1][i] > 0)
        || (raw.Prices[2][i] > raw.Prices[3][i] && raw.Prices[3][i] > 0)
        || (raw.Prices[4][i] > raw.Prices[5][i] && raw.Prices[5][i] > 0);

    private void Report(FindingKind fault, RawRows raw, int row)
    {
        Count(fault, raw, row);
        if (stopOnError)
        {
            throw new InputException($"{Place(raw, row)}: {Market.Words.Vocabulary.Sentence(fault)}. Mend the row, or write history.on_error = \"quarantine\" to leave such rows out.");
        }
    }

    private void Count(FindingKind kind, RawRows raw, int row) => findings.Add(kind, () => Place(raw, row));

    private string Place(RawRows raw, int row) => string.Create(
        CultureInfo.InvariantCulture,
        $"{raw.PlaceOf(row)}, {root.Root} {ChainLayout.Date(raw.Expiry[row]):yyyy-MM-dd} {raw.Strike[row] / 1000m:0.###} at {ChainLayout.Instant(raw.QuotedAt[row]):yyyy-MM-ddTHH:mm:ssZ}");

    private List<(DateTime At, Chain Chain)> Chains(RawRows raw, ReadOnlySpan<int> kept)
    {
        var columns = new StrikeColumns
        {
            Count = kept.Length,
            Strike = Taken(raw.Strike, kept)!,
            CallBid = Quoted(raw.Prices[0], kept),
            CallAsk = Quoted(raw.Prices[1], kept),
            PutBid = Quoted(raw.Prices[2], kept),
            PutAsk = Quoted(raw.Prices[3], kept),
            CallBidSize = Taken(raw.Sizes[0], kept),
            CallAskSize = Taken(raw.Sizes[1], kept),
            PutBidSize = Taken(raw.Sizes[2], kept),
            PutAskSize = Taken(raw.Sizes[3], kept),
        };
        var chains = new List<(DateTime At, Chain Chain)>();
        int start = 0;
        while (start < kept.Length)
        {
            int end = start;
            var slices = ImmutableArray.CreateBuilder<ExpirySlice>();
            while (end < kept.Length && raw.QuotedAt[kept[end]] == raw.QuotedAt[kept[start]])
            {
                int first = end;
                while (end < kept.Length && raw.QuotedAt[kept[end]] == raw.QuotedAt[kept[start]] && raw.Expiry[kept[end]] == raw.Expiry[kept[first]])
                {
                    end++;
                }

                slices.Add(new ExpirySlice(ChainLayout.Date(raw.Expiry[kept[first]]), first, end - first));
            }

            int row = kept[start];
            chains.Add((ChainLayout.Instant(raw.QuotedAt[row]), new Chain
            {
                Root = root,
                Underlying = underlying,
                UnderlyingBid = Quote(raw.Prices[4][row]),
                UnderlyingAsk = Quote(raw.Prices[5][row]),
                UnderlyingBidSize = raw.Sizes[4]?[row] ?? -1,
                UnderlyingAskSize = raw.Sizes[5]?[row] ?? -1,
                Expiries = slices.ToImmutable(),
                Columns = columns,
            }));
            start = end;
        }

        return chains;
    }

    private static double Quote(double price) => price == 0 ? double.NaN : price;

    private static double[] Quoted(double[] column, ReadOnlySpan<int> kept)
    {
        double[] values = new double[kept.Length];
        if (WithoutGaps(kept))
        {
            ReadOnlySpan<double> source = column.AsSpan(kept[0], kept.Length);
            for (int i = 0; i < values.Length; i++)
            {
                values[i] = Quote(source[i]);
            }

            return values;
        }

        for (int i = 0; i < values.Length; i++)
        {
            values[i] = Quote(column[kept[i]]);
        }

        return values;
    }

    private static bool WithoutGaps(ReadOnlySpan<int> kept) => kept.Length > 0 && kept[^1] - kept[0] == kept.Length - 1;

    private static int[]? Taken(int[]? column, ReadOnlySpan<int> kept)
    {
        if (column is null)
        {
            return null;
        }

        int[] values = new int[kept.Length];
        if (WithoutGaps(kept))
        {
            column.AsSpan(kept[0], kept.Length).CopyTo(values);
            return values;
        }

        for (int i = 0; i < values.Length; i++)
        {
            values[i] = column[kept[i]];
        }

        return values;
    }
}

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
    /// <param name="file">for messages</param>
    /// <param name="group">index of the row group</param>
    /// <param name="raw">its rows</param>
    /// <param name="from">first row of the day</param>
    /// <param name="to">the row after its last</param>
    /// <param name="date">the day</param>
    public List<(DateTime At, Chain Chain)> Build(string file, int group, RawGroup raw, int from, int to, DateOnly date)
    {
        var kept = new List<int>(to - from);
        int today = ChainLayout.Days(date);
        bool trades = calendar.IsTradingDay(date);
        (DateTime open, DateTime close) = trades ? calendar.RegularSession(date) : default;
        long first = trades ? ChainLayout.Micros(open) : 0;
        long last = trades ? ChainLayout.Micros(close + AfterTheClose) : 0;
        for (int i = from; i < to; i++)
        {
            if (Fault(raw, i, from, kept, today, trades && raw.QuotedAt[i] >= first && raw.QuotedAt[i] <= last) is { } fault)
            {
                Report(fault, file, group, i, raw);
                continue;
            }

            if (Crossed(raw, i))
            {
                findings.Add(FindingKind.Crossed, () => Place(file, group, i, raw));
            }

            kept.Add(i);
        }

        return Chains(raw, kept);
    }

    private static FindingKind? Fault(RawGroup raw, int i, int from, List<int> kept, int today, bool inSession)
    {
        if (!inSession)
        {
            return FindingKind.OutsideSession;
        }

        if (raw.Strike[i] <= 0)
        {
            return FindingKind.Strike;
        }

        foreach (double[] column in raw.Prices)
        {
            if (column[i] < 0)
            {
                return FindingKind.NegativePrice;
            }
        }

        if (raw.Expiry[i] < today)
        {
            return FindingKind.Expired;
        }

        if (i > from && raw.QuotedAt[i] == raw.QuotedAt[i - 1] && raw.Expiry[i] == raw.Expiry[i - 1] && raw.Strike[i] == raw.Strike[i - 1])
        {
            return FindingKind.DuplicateKey;
        }

        if (kept.Count > 0 && raw.QuotedAt[kept[^1]] == raw.QuotedAt[i] && (raw.Prices[4][kept[^1]] != raw.Prices[4][i] || raw.Prices[5][kept[^1]] != raw.Prices[5][i]))
        {
            return FindingKind.UnderlyingDiffers;
        }

        return null;
    }

    private static bool Crossed(RawGroup raw, int i) =>
        (raw.Prices[0][i] > raw.Prices[1][i] && raw.Prices[1][i] > 0) || (raw.Prices[2][i] > raw.Prices[3][i] && raw.Prices[3][i] > 0);

    private void Report(FindingKind fault, string file, int group, int row, RawGroup raw)
    {
        findings.Add(fault, () => Place(file, group, row, raw));
        if (stopOnError)
        {
            throw new InputException($"{Place(file, group, row, raw)}: {Market.Words.Vocabulary.Sentence(fault)}. Mend the row, or write history.on_error = \"quarantine\" to leave such rows out.");
        }
    }

    private static string Place(string file, int group, int row, RawGroup raw) => string.Create(
        CultureInfo.InvariantCulture,
        $"{file}, row group {group}, row {row}, {ChainLayout.Instant(raw.QuotedAt[row]):yyyy-MM-ddTHH:mm:ssZ} {ChainLayout.Date(raw.Expiry[row]):yyyy-MM-dd} {raw.Strike[row] / 1000m:0.###}");

    private List<(DateTime At, Chain Chain)> Chains(RawGroup raw, List<int> kept)
    {
        var columns = new StrikeColumns
        {
            Count = kept.Count,
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
        while (start < kept.Count)
        {
            int end = start;
            var slices = ImmutableArray.CreateBuilder<ExpirySlice>();
            while (end < kept.Count && raw.QuotedAt[kept[end]] == raw.QuotedAt[kept[start]])
            {
                int first = end;
                while (end < kept.Count && raw.QuotedAt[kept[end]] == raw.QuotedAt[kept[start]] && raw.Expiry[kept[end]] == raw.Expiry[kept[first]])
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

    private static double[] Quoted(double[] column, List<int> kept)
    {
        var values = new double[kept.Count];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = Quote(column[kept[i]]);
        }

        return values;
    }

    private static int[]? Taken(int[]? column, List<int> kept)
    {
        if (column is null)
        {
            return null;
        }

        var values = new int[kept.Count];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = column[kept[i]];
        }

        return values;
    }
}

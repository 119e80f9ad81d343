using CarryTest.Pricing.Discounting;

namespace CarryTest.OutsideChecks.Pricing;

/// <summary>Day counts, compounded overnight rates and conversions of rates.</summary>
public sealed class InterestValues
{
    /// <summary>
    /// Act/act: examples of the ISDA memorandum on the EMU and market conventions, as tested in an open library of finance; the fifth
    /// differs from one old memorandum. Act/360: 181 days, computed.
    /// </summary>
    [Theory]
    [InlineData(DayCount.ActActIsda, "2003-11-01", "2004-05-01", 0.497724380567)]
    [InlineData(DayCount.ActActIsda, "1999-02-01", "1999-07-01", 0.410958904110)]
    [InlineData(DayCount.ActActIsda, "1999-07-01", "2000-07-01", 1.001377348600)]
    [InlineData(DayCount.ActActIsda, "2002-08-15", "2003-07-15", 0.915068493151)]
    [InlineData(DayCount.ActActIsda, "2003-07-15", "2004-01-15", 0.504004790778)]
    [InlineData(DayCount.ActActIsda, "2000-01-30", "2000-06-30", 0.415300546448)]
    [InlineData(DayCount.Act360, "2007-01-15", "2007-07-15", 0.502777777778)]
    public void Years_PublishedDates_IsThePublishedFraction(DayCount dayCount, string start, string end, double expected)
        => Assert.Equal(expected, DayCounts.Years(dayCount, Date(start), Date(end)), 5e-12);

    /// <summary>ISDA sheet of 30/360 examples, 22 December 2008, as tested in an open library of finance.</summary>
    [Theory]
    [InlineData(DayCount.Thirty360Bond, "2006-08-31", "2007-02-28", 178)]
    [InlineData(DayCount.Thirty360Bond, "2007-02-28", "2007-08-31", 183)]
    [InlineData(DayCount.Thirty360Bond, "2008-02-29", "2008-08-31", 182)]
    [InlineData(DayCount.Thirty360Bond, "2006-09-30", "2006-10-31", 30)]
    [InlineData(DayCount.Thirty360Bond, "2008-02-28", "2008-03-31", 33)]
    [InlineData(DayCount.Thirty360Bond, "2006-02-28", "2006-03-03", 5)]
    [InlineData(DayCount.ThirtyE360, "2007-02-28", "2007-08-31", 182)]
    [InlineData(DayCount.ThirtyE360, "2008-02-28", "2008-03-31", 32)]
    [InlineData(DayCount.ThirtyE360Isda, "2007-02-28", "2007-08-31", 180)]
    [InlineData(DayCount.ThirtyE360Isda, "2006-02-28", "2006-03-03", 3)]
    public void Days_PublishedDates_IsThePublishedCount(DayCount dayCount, string start, string end, int expected)
        => Assert.Equal(expected, DayCounts.Days(dayCount, Date(start), Date(end)));

    /// <summary>6 % on a million for 180 days: computed.</summary>
    [Fact]
    public void Years_InterestOnAMillion_IsTheComputedAmount()
    {
        DateOnly start = new(2025, 1, 1);
        Assert.Equal(30_000.00, 60_000 * DayCounts.Years(DayCount.Act360, start, start.AddDays(180)), 0.005);
        Assert.Equal(29_589.04, 60_000 * DayCounts.Years(DayCount.Act365Fixed, start, start.AddDays(180)), 0.005);
    }

    /// <summary>
    /// SOFR of October and November 2021 compounded over 31 days: fixings and result as tested in an open library of finance. No
    /// fixing on 11 November (holiday).
    /// </summary>
    [Fact]
    public void OvernightRate_AutumnOf2021_IsThePublishedRate()
    {
        double[] percent =
        [
            .08, .09, .08, .10, .12, .11, .13, .12, .12, .08, .09, .10, .11, .14, .13, .11, .09, .08, .07, .08, .08, .07,
        ];
        int[] days = [1, 1, 1, 1, 3, 1, 1, 1, 1, 3, 1, 1, 1, 1, 3, 1, 1, 2, 3, 1, 1, 1];
        Assert.Equal(31, days.Sum());
        Assert.Equal(0.000987136104, Compounding.OvernightRate(Fractions(percent), days, 360), 1e-12);
    }

    /// <summary>
    /// SOFR of summer 2019 with a lookback of five days: workbook of other lookback options, Alternative Reference Rates Committee,
    /// Federal Reserve Bank of New York. Lookback: each day's rate is the fixing of five business days before, for that day's own
    /// count of days; observation shift: for the count of the day of the fixing; lockout: the last three days repeat the fixing
    /// before them.
    /// </summary>
    [Theory]
    [InlineData("2019-07-15", false, 0, 0.024781644454)]
    [InlineData("2019-07-31", true, 0, 0.024603611707)]
    [InlineData("2019-07-31", true, 3, 0.024693783702)]
    public void OvernightRate_SummerOf2019_IsThePublishedRate(string end, bool shift, int lockout, double expected)
    {
        (double[] rates, int[] days) = Lookback(new DateOnly(2019, 7, 1), Date(end), shift, lockout);
        Assert.Equal(expected, Compounding.OvernightRate(rates, days, 360), 1e-12);
    }

    /// <summary>Hull, chapter on interest rates: 10 % twice a year is 9.758 % continuous; 8 % continuous is 8.08 % quarterly. From memory, recomputed; the others computed.</summary>
    [Fact]
    public void Conversions_TextbookRates_AreThePrintedOnes()
    {
        Assert.Equal(0.0975803, Compounding.ContinuousFromPeriodic(0.10, 2), 5e-8);
        Assert.Equal(0.080805, Compounding.PeriodicFromContinuous(0.08, 4), 5e-7);
        double quarter = Compounding.SimpleGrowth(0.05, 90 / 360.0);
        Assert.Equal(1.0125, quarter, 1e-12);
        Assert.Equal(0.05038022, Compounding.ContinuousFromGrowth(quarter, 90 / 365.0), 5e-9);
        Assert.Equal(0.05253503, Compounding.ContinuousFromGrowth(Compounding.SimpleGrowth(0.0525, 182 / 360.0), 182 / 365.0), 5e-9);
    }

    private static readonly (string Date, double Percent)[] Summer2019 =
    [
        ("2019-06-21", 2.37), ("2019-06-24", 2.39), ("2019-06-25", 2.41), ("2019-06-26", 2.43), ("2019-06-27", 2.42), ("2019-06-28", 2.50),
        ("2019-07-01", 2.42), ("2019-07-02", 2.51), ("2019-07-03", 2.56), ("2019-07-05", 2.59), ("2019-07-08", 2.48), ("2019-07-09", 2.45),
        ("2019-07-10", 2.46), ("2019-07-11", 2.41), ("2019-07-12", 2.36), ("2019-07-15", 2.46), ("2019-07-16", 2.47), ("2019-07-17", 2.47),
        ("2019-07-18", 2.46), ("2019-07-19", 2.41), ("2019-07-22", 2.40), ("2019-07-23", 2.40), ("2019-07-24", 2.41),
    ];

    private static (double[] Rates, int[] Days) Lookback(DateOnly start, DateOnly end, bool shift, int lockout)
    {
        const int Back = 5;
        List<DateOnly> businessDays = [];
        for (DateOnly date = new(2019, 6, 3); date <= end; date = date.AddDays(1))
        {
            if (date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday) && date != new DateOnly(2019, 7, 4))
            {
                businessDays.Add(date);
            }
        }

        Dictionary<DateOnly, double> fixings = Summer2019.ToDictionary(f => Date(f.Date), f => f.Percent / 100);
        int first = businessDays.IndexOf(start);
        int count = businessDays.IndexOf(end) - first;
        int lastFree = count - 1 - lockout;
        double[] rates = new double[count];
        int[] days = new int[count];
        for (int i = 0; i < count; i++)
        {
            int observed = first - Back + Math.Min(i, lastFree);
            rates[i] = fixings[businessDays[observed]];
            int counted = shift ? first - Back + i : first + i;
            days[i] = businessDays[counted + 1].DayNumber - businessDays[counted].DayNumber;
        }

        return (rates, days);
    }

    private static double[] Fractions(double[] percent) => [.. percent.Select(p => p / 100)];

    private static DateOnly Date(string text)
        => DateOnly.ParseExact(text, "yyyy-MM-dd", System.Globalization.CultureInfo.InvariantCulture);
}

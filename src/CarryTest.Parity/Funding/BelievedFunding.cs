using CarryTest.Market.Calendars;
using CarryTest.Market.Faults;
using CarryTest.Market.Reference;

namespace CarryTest.Parity.Funding;

/// <summary>
/// What one financing assumption believes on one day about the nights to come. `flat`: one rate. `overnight`: the rate known today, every night.
/// `curve`: the forwards of log-linear discount factors through the pillars Z(n) = 1 / (1 + R n/360), the last forward beyond the last pillar.
/// Grows as it is asked: not safe for several threads beyond the day up to which it was formed.
/// </summary>
public sealed class BelievedFunding : IFunding
{
    private readonly TradingCalendar _calendar;
    private readonly DateOnly _today;
    private readonly FundingKind _kind;
    private readonly double _rate;
    private readonly double _debitSpread;
    private readonly double _creditSpread;
    private readonly double[] _pillarDays;
    private readonly double[] _pillarLogZ;
    private readonly List<DateOnly> _nights = [];
    private readonly List<double> _rates = [];
    private readonly List<double> _debit = [];
    private readonly List<double> _credit = [];
    private int[] _indexByDay = [];

    /// <summary>Forms the belief from what is known.</summary>
    /// <param name="assumption">where rates come from, and the spreads</param>
    /// <param name="known">all tables as of the day</param>
    /// <exception cref="InputException">the assumption needs the table `rates` and nothing in it is known yet</exception>
    public BelievedFunding(FundingAssumption assumption, Knowledge known)
    {
        _calendar = known.Calendar;
        _today = known.Date;
        _kind = assumption.Kind;
        _debitSpread = assumption.DebitSpreadBps / 10_000;
        _creditSpread = assumption.CreditSpreadBps / 10_000;
        DaysOfYear = assumption.DayCount == DayCount.Act360 ? 360 : 365;
        _pillarDays = [];
        _pillarLogZ = [];
        switch (_kind)
        {
            case FundingKind.Flat:
                _rate = assumption.Rate;
                break;
            case FundingKind.Overnight:
                _rate = known.OvernightRate ?? throw NoRates(known.Date, "an overnight rate (days = 1)");
                break;
            case FundingKind.Curve:
                (int Days, double Rate)[] pillars = [.. known.Curve];
                if (pillars.Length == 0)
                {
                    throw NoRates(known.Date, "a rate of any term");
                }

                _pillarDays = [0, .. pillars.Select(p => (double)p.Days)];
                _pillarLogZ = [0, .. pillars.Select(p => -Math.Log(1 + (p.Rate * p.Days / 360)))];
                break;
            default:
                throw new ArgumentOutOfRangeException(nameof(assumption), _kind, "not a source of nightly rates");
        }

        _nights.Add(_calendar.TradingDayOnOrAfter(_today));
        _debit.Add(1);
        _credit.Add(1);
        _indexByDay = [0];
    }

    /// <summary>The benchmark as known on a day: the curve, without spreads.</summary>
    /// <exception cref="InputException">no rate is known</exception>
    public static BelievedFunding Benchmark(Knowledge known) => known.Curve.IsEmpty
        ? throw new InputException(
            $"reference table `rates`: on {known.Date:yyyy-MM-dd} no rate is known, and without a benchmark early exercise cannot be valued, whatever the rule book believes about funding. Add rows dated before that day.")
        : new BelievedFunding(new FundingAssumption { Kind = FundingKind.Curve, DebitSpreadBps = 0, CreditSpreadBps = 0 }, known);

    /// <inheritdoc/>
    public int DaysOfYear { get; }

    /// <summary>Forms the belief up to a day at once; up to there it may be read by several threads.</summary>
    public BelievedFunding Until(DateOnly day)
    {
        _ = Index(day);
        Extend(_nights.Count);
        return this;
    }

    /// <inheritdoc/>
    public double Discount(DateOnly from, DateOnly to, Side side)
    {
        List<double> factors = side == Side.Debit ? _debit : _credit;
        int end = Index(to);
        return from <= _nights[0] ? factors[end] : factors[end] / factors[Index(from)];
    }

    /// <inheritdoc/>
    public double NightRate(DateOnly night, Side side)
    {
        int i = Index(night);
        if (i >= _rates.Count)
        {
            Extend(i + 1);
        }

        return _rates[i] + (side == Side.Debit ? _debitSpread : -_creditSpread);
    }

    private static InputException NoRates(DateOnly day, string what) => new(
        $"reference table `rates`: on {day:yyyy-MM-dd} {what} is needed and none is known. Add rows dated before that day, or write `kind = \"flat\"` with a rate in the rule book.");

    // Dates are trading days; a date between two of them stands for the next one.
    private int Index(DateOnly date)
    {
        int offset = date.DayNumber - _nights[0].DayNumber;
        if (offset <= 0)
        {
            return 0;
        }

        while (offset >= _indexByDay.Length)
        {
            Extend(_nights.Count);
        }

        return _indexByDay[offset];
    }

    private void Extend(int nights)
    {
        while (_nights.Count <= nights)
        {
            DateOnly night = _nights[^1];
            DateOnly next = _calendar.NextTradingDay(night);
            int days = next.DayNumber - night.DayNumber;
            double rate = BaseRate(night, next, days);
            _rates.Add(rate);
            _nights.Add(next);
            _debit.Add(_debit[^1] / (1 + ((rate + _debitSpread) * days / DaysOfYear)));
            _credit.Add(_credit[^1] / (1 + ((rate - _creditSpread) * days / DaysOfYear)));
            int last = next.DayNumber - _nights[0].DayNumber;
            int filled = _indexByDay.Length;
            Array.Resize(ref _indexByDay, last + 1);
            Array.Fill(_indexByDay, _nights.Count - 1, filled, last + 1 - filled);
        }
    }

    private double BaseRate(DateOnly night, DateOnly next, int days)
    {
        if (_kind != FundingKind.Curve)
        {
            return _rate;
        }

        double growth = LogZ(night.DayNumber - _today.DayNumber) - LogZ(next.DayNumber - _today.DayNumber);
        return (Math.Exp(growth) - 1) * DaysOfYear / days;
    }

    private double LogZ(int days)
    {
        int i = 1;
        while (i < _pillarDays.Length - 1 && days > _pillarDays[i])
        {
            i++;
        }

        double slope = (_pillarLogZ[i] - _pillarLogZ[i - 1]) / (_pillarDays[i] - _pillarDays[i - 1]);
        return _pillarLogZ[i - 1] + (slope * (days - _pillarDays[i - 1]));
    }
}

namespace CarryTest.Pricing.Options;

/// <summary>Where the rows of a grid lie: over all prices at which the option is not a straight line, with a row on its kink.</summary>
internal sealed class GridLayout
{
    /// <summary>Of the part that bends, to each side of its centre, in standard deviations.</summary>
    public const double HalfWidth = 5.5;

    private const double EdgeWidth = 2;
    private const int WidestGrid = 8;

    private OptionTerms _terms;
    private int _rows;
    private bool _exercised;
    private double _lowest;
    private double _paid;
    private double _paidAt;

    /// <summary>Begins at expiry.</summary>
    /// <param name="terms">the contract</param>
    /// <param name="spaceSteps">rows over the part that bends</param>
    /// <param name="exercised">whether exercise between ex-dates is looked for</param>
    /// <param name="lowest">lowest exp(x) that will be asked for</param>
    public void Reset(OptionTerms terms, int spaceSteps, bool exercised, double lowest)
    {
        _terms = terms;
        _exercised = exercised;
        _lowest = lowest;
        _paid = 0;
        _paidAt = 0;

        // Without exercise the curve of a put is smooth, and half the rows are more than enough.
        _rows = exercised || terms.Right == OptionRight.Call ? spaceSteps : spaceSteps / 2;
    }

    /// <summary>Takes note of a dividend.</summary>
    public void Pay(double left, double amount)
    {
        _paid = (_paid * Math.Exp(-(_terms.Rate - _terms.Yield) * (left - _paidAt))) + amount;
        _paidAt = left;
    }

    /// <summary>x, some years before expiry, of the price that grows to the strike, less the dividends on the way.</summary>
    public double Centre(double left)
    {
        double carry = _terms.Rate - _terms.Yield;
        double price = (_terms.Strike * Math.Exp(-carry * left)) + (_paid * Math.Exp(-carry * (left - _paidAt)));
        return Math.Log(price) + (_terms.Drift * left);
    }

    /// <summary>Lays the rows for a stretch of years left; row 0 on the side on which exercise pays.</summary>
    public void Lay(HeatGrid grid, double start, double end)
    {
        (double low, double high) = Span(start, end);
        double step = 2 * HalfWidth * _terms.Volatility * Math.Sqrt(end) / _rows;
        int count = (int)Math.Min(Math.Ceiling((high - low) / step), (double)WidestGrid * _rows);
        step = (high - low) / count;
        double centre = Centre(start);
        int below = (int)Math.Round((centre - low) / step);
        if (_terms.Right == OptionRight.Put)
        {
            grid.Lay(centre - (below * step), step, count + 1);
        }
        else
        {
            grid.Lay(centre + ((count - below) * step), -step, count + 1);
        }
    }

    private (double Low, double High) Span(double start, double end)
    {
        double deviation = _terms.Volatility * Math.Sqrt(end);
        double low = Math.Min(Centre(start), Centre(end)) - (HalfWidth * deviation);
        double high = Math.Max(Centre(start), Centre(end)) + (HalfWidth * deviation);
        if (_exercised)
        {
            // The exercise price stays within sight of the strike, while the centre moves with the forward.
            double strike = Math.Log(_terms.Strike) + (_terms.Drift * end);
            low = Math.Min(low, strike - (EdgeWidth * deviation));
            high = Math.Max(high, strike + (EdgeWidth * deviation));
        }

        double floor = Math.Log(_paid) + (_terms.Drift * start);
        if (_paid > 0 && Math.Log(_lowest) < floor + (HalfWidth * deviation))
        {
            // Spots are asked for at which a dividend may take the whole price.
            low = Math.Min(low, floor - (HalfWidth * deviation));
        }

        return (low, high);
    }
}

using CarryTest.Carry.Day;
using CarryTest.Carry.Positions;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Assignment;

/// <summary>What one step of a plan for a leftover does.</summary>
internal enum LeftoverStepKind
{
    /// <summary>Own contracts are exercised; quantity positive.</summary>
    Exercise,

    /// <summary>Contracts are traded; quantity signed.</summary>
    Option,

    /// <summary>Shares are traded; quantity signed.</summary>
    Stock,
}

/// <summary>One step.</summary>
/// <param name="What">what is done</param>
/// <param name="Leg">leg of the kind; -1 for stock</param>
/// <param name="Quantity">contracts or shares</param>
/// <param name="Price">currency per share, slippage included; 0 for exercises</param>
internal readonly record struct LeftoverStep(LeftoverStepKind What, int Leg, long Quantity, double Price);

/// <summary>What could be done with a leftover.</summary>
/// <param name="Rule">keep, cover or close</param>
/// <param name="Steps">what is done now</param>
/// <param name="KeptSlot">strike slot of the conversion or reversal that is kept; -1: none</param>
/// <param name="KeptContracts">how many of it are kept</param>
/// <param name="Complete">false where a quote that is needed is missing</param>
internal sealed record LeftoverPlan(AfterAssignment Rule, List<LeftoverStep> Steps, int KeptSlot, long KeptContracts, bool Complete);

/// <summary>The three ways to handle what an event left in a part, at the touch of one snapshot.</summary>
internal sealed class LeftoverOptions(BookState book, Package package, Part part, Chain chain)
{
    private readonly PackageTerms _terms = package.Terms;

    /// <summary>Everything is traded at the touch.</summary>
    public LeftoverPlan Close() => CloseAll(AfterAssignment.Close, [], part.Stock, (long[])part.Contracts.Clone());

    /// <summary>Stock is covered by exercise of the own option or in the market, whichever is better; the rest is closed at the touch.</summary>
    public LeftoverPlan Cover()
    {
        var steps = new List<LeftoverStep>();
        long stock = part.Stock;
        long[] contracts = (long[])part.Contracts.Clone();
        LegOf covering = stock < 0 ? LegOf.Call : LegOf.Put;
        int lot = _terms.Root.DeliverableShares;
        for (int leg = 0; leg < contracts.Length && stock != 0; leg++)
        {
            if (_terms.Kind.Legs[leg].Of != covering || contracts[leg] <= 0 || !ExerciseBeatsMarket(leg))
            {
                continue;
            }

            long n = Math.Min(contracts[leg], Math.Abs(stock) / lot);
            if (n > 0)
            {
                steps.Add(new LeftoverStep(LeftoverStepKind.Exercise, leg, n, 0));
                contracts[leg] -= n;
                stock -= Math.Sign(stock) * n * lot;
            }
        }

        return CloseAll(AfterAssignment.Cover, steps, stock, contracts);
    }

    /// <summary>The conversion or reversal that is left is kept; what is free of it is sold at its bid (kept where there is none), what is naked is closed.</summary>
    public LeftoverPlan Keep()
    {
        (int slot, long n) = Kept();
        long[] free = (long[])part.Contracts.Clone();
        long stock = part.Stock;
        if (n > 0)
        {
            stock -= Math.Sign(stock) * n * _terms.Root.DeliverableShares;
            for (int leg = 0; leg < free.Length; leg++)
            {
                if (_terms.Kind.Legs[leg].Of != LegOf.Stock && _terms.Kind.Legs[leg].StrikeSlot == slot)
                {
                    free[leg] -= Math.Sign(free[leg]) * n;
                }
            }
        }

        LeftoverPlan rest = CloseAll(AfterAssignment.Keep, [], stock, free);
        return rest with { KeptSlot = slot, KeptContracts = n };
    }

    // Short stock with a long call and a short put of one strike is a reversal, long stock with the opposite a conversion.
    private (int Slot, long Contracts) Kept()
    {
        (int Slot, long Contracts) best = (-1, 0);
        for (int slot = 0; slot < _terms.Kind.Strikes; slot++)
        {
            long call = 0;
            long put = 0;
            for (int leg = 0; leg < part.Contracts.Length; leg++)
            {
                Leg definition = _terms.Kind.Legs[leg];
                call += definition.Of == LegOf.Call && definition.StrikeSlot == slot ? part.Contracts[leg] : 0;
                put += definition.Of == LegOf.Put && definition.StrikeSlot == slot ? part.Contracts[leg] : 0;
            }

            bool hedges = part.Stock < 0 ? call > 0 && put < 0 : part.Stock > 0 && call < 0 && put > 0;
            long n = hedges ? Math.Min(Math.Abs(part.Stock) / _terms.Root.DeliverableShares, Math.Min(Math.Abs(call), Math.Abs(put))) : 0;
            best = n > best.Contracts ? (slot, n) : best;
        }

        return best;
    }

    private bool ExerciseBeatsMarket(int leg)
    {
        Leg definition = _terms.Kind.Legs[leg];
        double strike = _terms.StrikeOf(definition).PerShare;
        double bid = TouchOf(leg).Bid;
        double gain = definition.Of == LegOf.Call ? chain.UnderlyingAsk - strike : strike - chain.UnderlyingBid;
        return gain >= (double.IsNaN(bid) ? 0 : bid);
    }

    private LeftoverPlan CloseAll(AfterAssignment rule, List<LeftoverStep> steps, long stock, long[] contracts)
    {
        bool complete = true;
        if (stock != 0)
        {
            double price = Worsened(stock > 0 ? chain.UnderlyingBid : chain.UnderlyingAsk, buys: stock < 0);
            complete &= Add(steps, new LeftoverStep(LeftoverStepKind.Stock, -1, -stock, price));
        }

        for (int leg = 0; leg < contracts.Length; leg++)
        {
            Touch touch = contracts[leg] == 0 ? default : TouchOf(leg);
            if (contracts[leg] < 0)
            {
                complete &= Add(steps, new LeftoverStep(LeftoverStepKind.Option, leg, -contracts[leg], Worsened(touch.Ask, buys: true)));
            }
            else if (contracts[leg] > 0)
            {
                // Without a bid a long option is worth nothing to anybody now: it is kept.
                Add(steps, new LeftoverStep(LeftoverStepKind.Option, leg, -contracts[leg], Worsened(touch.Bid, buys: false)));
            }
        }

        return new LeftoverPlan(rule, steps, -1, 0, complete);
    }

    private static bool Add(List<LeftoverStep> steps, LeftoverStep step)
    {
        if (double.IsNaN(step.Price))
        {
            return false;
        }

        steps.Add(step);
        return true;
    }

    private Touch TouchOf(int leg)
    {
        Leg definition = _terms.Kind.Legs[leg];
        int row = chain.Row(_terms.Expiry, _terms.StrikeOf(definition));
        return row < 0 ? new Touch(double.NaN, double.NaN) : chain.Option(row, definition.Of == LegOf.Call ? Right.Call : Right.Put);
    }

    private double Worsened(double price, bool buys)
    {
        double slippage = book.Rules.Costs.SlippagePerShare + (book.Rules.Costs.SlippageFraction * price);
        return buys ? price + slippage : Math.Max(0, price - slippage);
    }
}

using CarryTest.Market.Money;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Carry.Day;

/// <summary>A decision that waits for its fill.</summary>
/// <param name="Decided">the candidate as it was decided on</param>
/// <param name="Plan">its plan at the size decided</param>
/// <param name="RequirementPerUnit">requirement of one unit at entry</param>
/// <param name="At">instant of the decision, UTC</param>
internal sealed record Order(Candidate Decided, PackagePlan Plan, Cash RequirementPerUnit, DateTime At)
{
    /// <summary>What it is.</summary>
    public PackageTerms Terms => Decided.Terms;

    /// <summary>Requirement of the whole size.</summary>
    public Cash Requirement => new(RequirementPerUnit.Cents * Plan.Units);

    /// <summary>The larger of net debit and requirement.</summary>
    public Cash CashTiedUp => Plan.NetDebit > Requirement ? Plan.NetDebit : Requirement;
}

namespace CarryTest.Pricing.Discounting;

/// <summary>How the days between two dates become a fraction of a year (ISDA 2006 Definitions, section 4.16).</summary>
public enum DayCount
{
    /// <summary>Calendar days over 360.</summary>
    Act360,

    /// <summary>Calendar days over 365, leap year or not.</summary>
    Act365Fixed,

    /// <summary>30/360, bond basis: the 31st counts as the 30th; at the end only if the start does too.</summary>
    Thirty360Bond,

    /// <summary>30E/360: the 31st counts as the 30th at both ends.</summary>
    ThirtyE360,

    /// <summary>30E/360 (ISDA): the 31st and the last of February count as the 30th, but not a last of February on which all ends.</summary>
    ThirtyE360Isda,

    /// <summary>Calendar days in leap years over 366 and in others over 365.</summary>
    ActActIsda,
}

namespace CarryTest.Pricing.Normal;

/// <summary>
/// The error function by the rational approximations of W. J. Cody, Rational Chebyshev approximations for the error function,
/// Mathematics of Computation 23, 1969; relative error below 1e-15.
/// </summary>
internal static class ErrorFunction
{
    private const double InverseRootPi = 0.56418958354775628695;
    private const double Near = 0.46875;
    private const double Far = 4;

    /// <summary>exp(x²) erfc(x) for x of 0 or more; near 1/(x √π) for large x, so that it never vanishes.</summary>
    public static double ScaledComplement(double x)
    {
        if (x < Near)
        {
            return Math.Exp(x * x) * (1 - (x * NearRatio(x * x)));
        }

        return x < Far ? MiddleRatio(x) : (InverseRootPi - FarRatio(1 / (x * x))) / x;
    }

    /// <summary>erf(x)/x of x².</summary>
    private static double NearRatio(double z)
    {
        double top = (1.85777706184603153e-1 * z) + 3.16112374387056560;
        top = (top * z) + 1.13864154151050156e2;
        top = (top * z) + 3.77485237685302021e2;
        top = (top * z) + 3.20937758913846947e3;
        double bottom = z + 2.36012909523441209e1;
        bottom = (bottom * z) + 2.44024637934444173e2;
        bottom = (bottom * z) + 1.28261652607737228e3;
        bottom = (bottom * z) + 2.84423683343917062e3;
        return top / bottom;
    }

    private static double MiddleRatio(double x)
    {
        double top = (2.15311535474403846e-8 * x) + 5.64188496988670089e-1;
        top = (top * x) + 8.88314979438837594;
        top = (top * x) + 6.61191906371416295e1;
        top = (top * x) + 2.98635138197400131e2;
        top = (top * x) + 8.81952221241769090e2;
        top = (top * x) + 1.71204761263407058e3;
        top = (top * x) + 2.05107837782607147e3;
        top = (top * x) + 1.23033935479799725e3;
        double bottom = x + 1.57449261107098347e1;
        bottom = (bottom * x) + 1.17693950891312499e2;
        bottom = (bottom * x) + 5.37181101862009858e2;
        bottom = (bottom * x) + 1.62138957456669019e3;
        bottom = (bottom * x) + 3.29079923573345963e3;
        bottom = (bottom * x) + 4.36261909014324716e3;
        bottom = (bottom * x) + 3.43936767414372164e3;
        bottom = (bottom * x) + 1.23033935480374942e3;
        return top / bottom;
    }

    private static double FarRatio(double z)
    {
        double top = (1.63153871373020978e-2 * z) + 3.05326634961232344e-1;
        top = (top * z) + 3.60344899949804439e-1;
        top = (top * z) + 1.25781726111229246e-1;
        top = (top * z) + 1.60837851487422766e-2;
        top = (top * z) + 6.58749161529837803e-4;
        double bottom = z + 2.56852019228982242;
        bottom = (bottom * z) + 1.87295284992346725;
        bottom = (bottom * z) + 5.27905102951428412e-1;
        bottom = (bottom * z) + 6.05183413124413191e-2;
        bottom = (bottom * z) + 2.33520497626869185e-3;
        return z * top / bottom;
    }
}

namespace PermitScreen.Service.Mapping;

/// <summary>Checks and words for <see cref="Allowed"/>.</summary>
internal static class AllowedNumbers
{
    /// <summary>Bounds of every number but 0, in any unit of the contract: far beyond what is met, and such that no sum or quotient of them overflows.</summary>
    private const double Smallest = 1e-12;
    private const double Largest = 1e12;

    public static bool Holds(this Allowed allowed, double value) => InBounds(value) && allowed switch
    {
        Allowed.Positive => value > 0,
        Allowed.NotNegative => value >= 0,
        Allowed.Fraction => value is > 0 and <= 1,
        Allowed.BelowOne => value is >= 0 and < 1,
        Allowed.OneOrMore => value >= 1,
        _ => true,
    };

    public static string Words(this Allowed allowed, double found) => allowed switch
    {
        _ when double.IsFinite(found) && !InBounds(found) => "0 or a number of an amount from 1E-12 to 1E+12",
        Allowed.Positive => "a number greater than 0",
        Allowed.NotNegative => "a number of 0 or more",
        Allowed.Fraction => "a number greater than 0 and at most 1",
        Allowed.BelowOne => "a number of at least 0 and less than 1",
        Allowed.OneOrMore => "a number of 1 or more",
        _ => "any finite number",
    };

    private static bool InBounds(double value) => value == 0 || Math.Abs(value) is >= Smallest and <= Largest;
}

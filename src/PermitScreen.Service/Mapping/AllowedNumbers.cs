namespace PermitScreen.Service.Mapping;

/// <summary>Checks and words for <see cref="Allowed"/>.</summary>
internal static class AllowedNumbers
{
    public static bool Holds(this Allowed allowed, double value) => double.IsFinite(value) && allowed switch
    {
        Allowed.Positive => value > 0,
        Allowed.NotNegative => value >= 0,
        Allowed.Fraction => value is > 0 and <= 1,
        Allowed.BelowOne => value is >= 0 and < 1,
        Allowed.OneOrMore => value >= 1,
        _ => true,
    };

    public static string Words(this Allowed allowed) => allowed switch
    {
        Allowed.Positive => "a number greater than 0",
        Allowed.NotNegative => "a number of 0 or more",
        Allowed.Fraction => "a number greater than 0 and at most 1",
        Allowed.BelowOne => "a number of at least 0 and less than 1",
        Allowed.OneOrMore => "a number of 1 or more",
        _ => "any finite number",
    };
}

namespace PermitScreen.Rating.Policies;

/// <summary>Dynamic load allowance (rule B4): one number, or falling with the length of the adverse part of the line.</summary>
public sealed record Allowance
{
    private readonly double _constant;
    private readonly double _intercept;
    private readonly double _slopePerM;
    private readonly bool _byLength;

    private Allowance(double constant, double intercept, double slopePerM, bool byLength) =>
        (_constant, _intercept, _slopePerM, _byLength) = (constant, intercept, slopePerM, byLength);

    /// <summary>One number for all effects.</summary>
    /// <param name="value">Allowance IM, dimensionless; 0.33 means a third more.</param>
    public static Allowance Constant(double value) => new(value, 0, 0, byLength: false);

    /// <summary>1 + IM = intercept − slope · length, not below 1.</summary>
    /// <param name="intercept">Value of 1 + IM at length 0.</param>
    /// <param name="slopePerM">Fall per metre.</param>
    public static Allowance ByLength(double intercept, double slopePerM) => new(0, intercept, slopePerM, byLength: true);

    /// <summary>The allowance IM for an effect.</summary>
    /// <param name="adverseLengthM">Length over which the line has the sign of the sense, m.</param>
    public double For(double adverseLengthM) =>
        _byLength ? Math.Max(1.0, _intercept - _slopePerM * adverseLengthM) - 1.0 : _constant;
}

using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Tests.Support;

namespace PermitScreen.Rating.Tests.Lateral;

/// <summary>Shares of two planes against tests/reference/loads_and_rating.md, "Two trusses (or two girders) at distance B" (marked from memory and recomputed).</summary>
public sealed class SharesTests
{
    private const double Foot = 0.3048;

    [Fact]
    public void The_check_of_the_reference_comes_out()
    {
        // B = 24 ft, roadway 20 ft, 2 ft from kerb to wheel, 6 ft gauge: e = 5 ft, shares 0.70833 and 0.29167.
        var unit = Build.Unit(-12 * Foot, 12 * Foot);
        var roadway = new Roadway(-10 * Foot, 10 * Foot, 2, null);
        var policy = Build.Policy(lateral: new LateralRules(2 * Foot, 1.2));
        var arrangements = Arrangements.Of(roadway, 6 * Foot, Build.Alone, policy, out var blocked);
        Assert.Null(blocked);
        Assert.Equal([-5 * Foot, 5 * Foot], arrangements.Select(a => Math.Round(a.PermitCentreM, 12)));
        Assert.Equal(0.70833, arrangements.Max(a => Shares.Of(unit, "left", a.PermitCentreM)), 5);
        Assert.Equal(0.29167, arrangements.Min(a => Shares.Of(unit, "left", a.PermitCentreM)), 5);
        Assert.Equal(0.70833, arrangements.Max(a => Shares.Of(unit, "right", a.PermitCentreM)), 5);
        Assert.Equal(0.29167, arrangements.Min(a => Shares.Of(unit, "right", a.PermitCentreM)), 5);
    }

    [Theory]
    [InlineData(-4.5, 1, 0)]
    [InlineData(0.5, 0.5, 0.5)]
    [InlineData(5.5, 0, 1)]
    [InlineData(6.5, -0.1, 1.1)]
    [InlineData(-5.5, 1.1, -0.1)]
    public void Shares_are_the_lever_rules_and_sum_to_1(double lateralM, double left, double right)
    {
        var unit = Build.Unit(-4.5, 5.5);
        Assert.Equal(left, Shares.Of(unit, "left", lateralM), 12);
        Assert.Equal(right, Shares.Of(unit, "right", lateralM), 12);
        Assert.Equal(Shares.Of(unit, "left", lateralM) + 0.3 * Shares.SlopePerM(unit, "left"), Shares.Of(unit, "left", lateralM + 0.3), 12);
        Assert.Equal(Shares.Of(unit, "right", lateralM) + 0.3 * Shares.SlopePerM(unit, "right"), Shares.Of(unit, "right", lateralM + 0.3), 12);
    }
}

using PermitScreen.Rating.Policies;

namespace PermitScreen.Rating.Tests.Policies;

/// <summary>Dynamic load allowance against engineering rule B4: 0.33 in general; φ = 1.40 − L/500, not below 1 (EN form).</summary>
public sealed class AllowanceTests
{
    [Theory]
    [InlineData(0, 0.40)]
    [InlineData(50, 0.30)]
    [InlineData(125, 0.15)]
    [InlineData(199.9, 0.0002)]
    [InlineData(200, 0)]
    [InlineData(900, 0)]
    public void By_length_it_falls_and_never_below_nothing(double lengthM, double allowance) =>
        Assert.Equal(allowance, Allowance.ByLength(1.40, 1.0 / 500).For(lengthM), 12);

    [Theory]
    [InlineData(0)]
    [InlineData(300)]
    public void One_number_holds_at_any_length(double lengthM) => Assert.Equal(0.33, Allowance.Constant(0.33).For(lengthM));
}

using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Rating.Tests.Policies;

/// <summary>
/// A row of live-load factors against engineering rule B2. The numbers are those of the routine row, 2013 interim, in tests/reference/mbe_permit_load_factors.csv
/// (from memory, not recomputed); the values between are worked by hand.
/// </summary>
public sealed class LiveLoadRowTests
{
    private const double Limit2 = 29.2;
    private const double Limit3 = 43.8;

    private static readonly LiveLoadRow Routine = new(
        "routine",
        PermitKind.Routine,
        [100, 1000, 5000],
        [
            new LiveLoadClass(Limit2, [1.30, 1.35, 1.40]),
            new LiveLoadClass(Limit3, [1.20, 1.25, 1.35]),
            new LiveLoadClass(double.PositiveInfinity, [1.15, 1.20, 1.30]),
        ]);

    [Theory]
    [InlineData(0, 0.0, 1.30)]
    [InlineData(0, 100.0, 1.30)]
    [InlineData(0, 550.0, 1.325)]
    [InlineData(0, 1000.0, 1.35)]
    [InlineData(0, 3000.0, 1.375)]
    [InlineData(0, 5000.0, 1.40)]
    [InlineData(0, 50_000.0, 1.40)]
    [InlineData(1, 3000.0, 1.30)]
    [InlineData(1, 2000.0, 1.275)]
    [InlineData(2, 1800.0, 1.22)]
    [InlineData(0, null, 1.40)]
    [InlineData(1, null, 1.35)]
    [InlineData(2, null, 1.30)]
    public void Linear_between_truck_counts_constant_outside_and_the_largest_where_unknown(int classIndex, double? adtt, double factor) =>
        Assert.Equal(factor, Routine.FactorOf(classIndex, adtt), 12);

    [Theory]
    [InlineData(1.0, 0)]
    [InlineData(29.19999999, 0)]
    [InlineData(29.2, 0)]
    [InlineData(29.20000001, 1)]
    [InlineData(43.8, 1)]
    [InlineData(43.80000001, 2)]
    [InlineData(1000.0, 2)]
    public void A_boundary_belongs_to_the_larger_factor(double knPerM, int classIndex) =>
        Assert.Equal(classIndex, Routine.ClassOf(knPerM));

    [Theory]
    [InlineData(null)]
    [InlineData(0.0)]
    [InlineData(9999.0)]
    public void One_factor_holds_at_any_truck_count(double? adtt)
    {
        var any = new LiveLoadRow("any", PermitKind.SpecialSingleTrip, [], [new LiveLoadClass(double.PositiveInfinity, [1.1])]);
        var one = any with { AdttOneDirection = [1000] };
        Assert.Equal(1.1, any.FactorOf(0, adtt));
        Assert.Equal(1.1, one.FactorOf(0, adtt));
    }
}

using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Ladder;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Tests.Support;

namespace PermitScreen.Rating.Tests.Ladder;

/// <summary>
/// C = φ·R·max(φc·φs, 0.85) against tests/reference/loads_and_rating.md, LRFR, and the factors of tests/reference/rating_factors.csv
/// (from memory, not recomputed); products worked by hand on R = 1000 kN, φ = 0.95.
/// </summary>
public sealed class CapacitiesTests
{
    [Theory]
    [InlineData(7, SystemKind.OtherGirderOrSlab, 950.0)]
    [InlineData(7, SystemKind.RivetedTwoPlane, 855.0)]
    [InlineData(5, SystemKind.RivetedTwoPlane, 812.25)]
    [InlineData(5, SystemKind.WeldedTwoPlane, 807.5)]
    [InlineData(4, SystemKind.OtherGirderOrSlab, 807.5)]
    [InlineData(4, SystemKind.WeldedTwoPlane, 807.5)]
    [InlineData(0, SystemKind.RivetedTwoPlane, 807.5)]
    [InlineData(9, SystemKind.WeldedTwoPlane, 807.5)]
    public void Product_of_factors_with_its_floor(int condition, SystemKind system, double capacityKn)
    {
        var effect = Build.Effect().With(new Stated<int>(null, condition), new Stated<SystemKind>(null, system), Build.Resistance());
        Assert.Equal(capacityKn, Capacity(effect, Build.Policy()).CapacityKn, 9);
    }

    [Fact]
    public void The_floor_holds_at_strength_only()
    {
        var effect = Build.Effect().With(new Stated<int>(null, 4), new Stated<SystemKind>(null, SystemKind.WeldedTwoPlane), Build.Resistance());
        Assert.Equal(950 * 0.85 * 0.85, Capacity(effect, Build.Policy() with { LimitState = LimitState.Service }).CapacityKn, 9);
    }

    [Theory]
    [InlineData(true, false, 0.90)]
    [InlineData(false, true, 0.95)]
    [InlineData(true, true, 1.0)]
    [InlineData(false, false, 0.855)]
    public void What_a_resistance_already_holds_is_not_applied_again(bool condition, bool system, double product)
    {
        var resistance = Build.Resistance() with { IncludesConditionFactor = condition, IncludesSystemFactor = system };
        var effect = Build.Effect().With(new Stated<int>(null, 5), new Stated<SystemKind>(null, SystemKind.RivetedTwoPlane), resistance);
        Assert.Equal(950 * product, Capacity(effect, Build.Policy()).CapacityKn, 9);
    }

    [Theory]
    [InlineData(false, 950.0)]
    [InlineData(true, 807.5)]
    public void Condition_is_not_counted_twice_on_measured_loss_unless_the_policy_says_so(bool onMeasuredLoss, double capacityKn)
    {
        var effect = Build.Effect().With(new Stated<int>(4, 7), null, Build.Resistance() with { IncludesMeasuredLoss = true });
        Assert.Equal(capacityKn, Capacity(effect, Build.Policy(capacity: Build.Capacity(onMeasuredLoss: onMeasuredLoss))).CapacityKn, 9);
    }

    [Fact]
    public void A_factored_resistance_takes_no_resistance_factor()
    {
        var effect = Build.Effect().With(null, null, Build.Resistance() with { Nominal = false, ResistanceFactor = null });
        Assert.Equal(1000, Capacity(effect, Build.Policy()).CapacityKn, 9);
    }

    public static TheoryData<string> Gaps() => ["resistance_factor", "includes_condition_factor", "includes_system_factor", "includes_measured_loss"];

    [Theory]
    [MemberData(nameof(Gaps))]
    public void What_is_not_said_is_named_and_nothing_is_assumed(string field)
    {
        var resistance = field switch
        {
            "resistance_factor" => Build.Resistance() with { ResistanceFactor = null },
            "includes_condition_factor" => Build.Resistance() with { IncludesConditionFactor = null },
            "includes_system_factor" => Build.Resistance() with { IncludesSystemFactor = null },
            _ => Build.Resistance() with { IncludesMeasuredLoss = null },
        };
        Assert.Contains(Reasons(Build.Effect().With(null, null, resistance)), r => r.Field == "resistances[0]." + field && r.Code == ReasonCode.DataMissing);
    }

    [Fact]
    public void Without_condition_or_kind_of_member_nothing_is_assessed()
    {
        Assert.NotEmpty(Reasons(Build.Effect().With(new Stated<int>(null, null), null, Build.Resistance())));
        Assert.NotEmpty(Reasons(Build.Effect().With(null, new Stated<SystemKind>(null, null), Build.Resistance())));
        Assert.NotEmpty(Reasons(Build.Effect().With(null, new Stated<SystemKind>(null, SystemKind.MultipleEyebars), Build.Resistance())));
    }

    [Fact]
    public void An_own_statement_worse_than_that_of_the_whole_is_not_assessed()
    {
        // If it got lost, the better one of the whole would stand in its place.
        Assert.NotEmpty(Reasons(Build.Effect().With(new Stated<int>(4, 7), null, Build.Resistance())));
        Assert.NotEmpty(Reasons(Build.Effect().With(null, new Stated<SystemKind>(SystemKind.WeldedTwoPlane, SystemKind.OtherGirderOrSlab), Build.Resistance())));
        Assert.Empty(Reasons(Build.Effect().With(new Stated<int>(7, 5), null, Build.Resistance())));
        Assert.NotEmpty(Reasons(Build.Effect().With(new Stated<int>(null, 7), null, Build.Resistance() with { IncludesMeasuredLoss = true })));
    }

    [Theory]
    [InlineData(RatingMethod.Lrfr, LimitState.Strength, true)]
    [InlineData(RatingMethod.Lfr, LimitState.Strength, false)]
    [InlineData(RatingMethod.Lrfr, LimitState.Service, false)]
    public void A_policy_uses_resistances_of_its_own_method_and_limit_state(RatingMethod method, LimitState state, bool fits) =>
        Assert.Equal(fits, Capacities.Fits(Build.Resistance() with { Method = method, LimitState = state }, Build.Policy()));

    [Theory]
    [InlineData(RatingLevel.Operating, true)]
    [InlineData(RatingLevel.Inventory, false)]
    [InlineData(RatingLevel.None, false)]
    public void A_method_with_levels_uses_resistances_of_its_own_level(RatingLevel level, bool fits) =>
        Assert.Equal(fits, Capacities.Fits(
            Build.Resistance() with { Method = RatingMethod.Lfr, Level = level },
            Build.Policy() with { Method = RatingMethod.Lfr, Level = RatingLevel.Operating }));

    [Fact]
    public void A_bearing_without_hold_down_carries_no_uplift() => Assert.Equal(0, Capacities.NoHoldDown.CapacityKn);

    private static CapacityArithmetic Capacity(RatedEffect effect, Policy policy)
    {
        var reasons = new List<Reason>();
        var capacity = Capacities.Of(effect, effect.Resistances[0], policy, reasons);
        Assert.Empty(reasons);
        return capacity!;
    }

    private static List<Reason> Reasons(RatedEffect effect)
    {
        var reasons = new List<Reason>();
        var capacity = Capacities.Of(effect, effect.Resistances[0], Build.Policy(), reasons);
        Assert.Equal(reasons.Count > 0, capacity is null);
        return reasons;
    }
}

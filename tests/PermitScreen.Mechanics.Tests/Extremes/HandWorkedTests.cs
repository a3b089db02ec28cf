using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Extremes;

/// <summary>Small cases worked by hand; each line of reasoning stands beside its test.</summary>
public class HandWorkedTests
{
    /// <summary>End reaction of a 10 m span: 1 at the start, 0 at the end, 0 outside.</summary>
    private static readonly InfluenceLine EndReaction = InfluenceLine.FromPoints([0, 10], [1, 0]);

    /// <summary>+1 at 5 m, −1 at 15 m, zero at 0, 10 and 20 m.</summary>
    private static readonly InfluenceLine TwoLobes = InfluenceLine.FromPoints([0, 5, 15, 20], [0, 1, -1, 0]);

    private static Extreme Fast(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule)
    {
        var fast = SweepExtremes.Of(line, train, sense, directions, rule);
        Assert.Equal(PlainExtremes.Of(line, train, sense, directions, rule), fast);
        return fast;
    }

    /// <summary>Two axles of 100 kN, 4 m apart: the first just on at 0 m would leave the other off the span, so Forward the rear axle stands just on: 100·1 + 100·0.6.</summary>
    [Fact]
    public void At_a_jump_the_extreme_is_a_one_sided_limit_and_the_side_is_told()
    {
        var extreme = Fast(EndReaction, Vehicles.Of([100, 100], [4]), Sense.Max, TravelDirections.Forward, WeighingRule.None);
        Assert.Equal(160, extreme.Value, 1e-9);
        Assert.Equal(new TrainPosition(4, TravelDirection.Forward, Side.After), extreme.Position);
    }

    /// <summary>Driving down, the lead axle reaches the start first: it stands just on at 0 m with the other at 4 m.</summary>
    [Fact]
    public void In_reverse_the_lead_axle_stands_at_the_jump()
    {
        var extreme = Fast(EndReaction, Vehicles.Of([100, 100], [4]), Sense.Max, TravelDirections.Reverse, WeighingRule.None);
        Assert.Equal(160, extreme.Value, 1e-9);
        Assert.Equal(new TrainPosition(0, TravelDirection.Reverse, Side.After), extreme.Position);
    }

    /// <summary>100 kN ahead of 40 kN by 4 m on the end reaction. Forward: rear (40) just on, lead at 4: 40 + 60 = 100, or the lead alone just on: 100; reverse: lead just on, rear at 4: 100 + 24.</summary>
    [Fact]
    public void Direction_matters()
    {
        var train = Vehicles.Of([100, 40], [4]);
        Assert.Equal(100, Fast(EndReaction, train, Sense.Max, TravelDirections.Forward, WeighingRule.None).Value, 1e-9);
        Assert.Equal(124, Fast(EndReaction, train, Sense.Max, TravelDirections.Reverse, WeighingRule.None).Value, 1e-9);
        Assert.Equal(TravelDirection.Reverse, Fast(EndReaction, train, Sense.Max, TravelDirections.Both, WeighingRule.None).Position!.Value.Direction);
    }

    /// <summary>The two positions of the case above that give 100 in Forward are a tie: the smaller lead chainage, 0 just on, is reported.</summary>
    [Fact]
    public void Ties_go_to_the_smaller_lead_chainage()
    {
        var extreme = Fast(EndReaction, Vehicles.Of([100, 40], [4]), Sense.Max, TravelDirections.Forward, WeighingRule.None);
        Assert.Equal(new TrainPosition(0, TravelDirection.Forward, Side.After), extreme.Position);
    }

    /// <summary>A symmetric line and one axle: both directions give 50 kN at 5 m; forward is reported, and the side below.</summary>
    [Fact]
    public void Ties_go_to_forward_and_to_the_side_below()
    {
        var extreme = Fast(InfluenceLine.FromPoints([0, 5, 10], [0, 0.5, 0]), Vehicles.Of([100], []), Sense.Max, TravelDirections.Both, WeighingRule.None);
        Assert.Equal(new Extreme(50, new TrainPosition(5, TravelDirection.Forward, Side.Before)), extreme);
    }

    /// <summary>t = 0.1. Axles 4 m apart, lead at 5 m and rear at 1 m, both adverse: 1.1·(100 + 20). Axles 10 m apart, the heavy one on the peak at 5 m and the light lead axle
    /// on the trough at 15 m, where it relieves: 1.1·300 − 0.9·100.</summary>
    [Fact]
    public void Tolerance_takes_each_axle_at_its_worse_weight()
    {
        var train = Vehicles.Of([100, 100], [4]);
        Assert.Equal(132, Fast(TwoLobes, train, Sense.Max, TravelDirections.Forward, new WeighingRule(0.1, true)).Value, 1e-9);
        var lead = Fast(TwoLobes, Vehicles.Of([100, 300], [10]), Sense.Max, TravelDirections.Forward, new WeighingRule(0.1, true));
        Assert.Equal((300 * 1.1) - (100 * 0.9), lead.Value, 1e-9);
        Assert.Equal(15, lead.Position!.Value.LeadM);
    }

    /// <summary>The same vehicle where relieving axles count as absent: 300 at the peak, and the 100 at 15 m is left out.</summary>
    [Fact]
    public void Relieving_axles_can_be_left_out()
    {
        var extreme = Fast(TwoLobes, Vehicles.Of([100, 300], [10]), Sense.Max, TravelDirections.Forward, new WeighingRule(0, false));
        Assert.Equal(300, extreme.Value, 1e-9);

        var min = Fast(TwoLobes, Vehicles.Of([100, 300], [10]), Sense.Min, TravelDirections.Forward, new WeighingRule(0, false));
        Assert.Equal(-300, min.Value, 1e-9);
    }

    /// <summary>Under a tolerance the response kinks where an axle passes a zero of the line. Axles 100 and 100 kN, 5 m apart, t = 0.5, on a line 0, 1, −3, 0 at 0, 5, 9, 20 m:
    /// its zero is at 6 m. Lead at 6 m and rear at 1 m give 0 + 150·0.2 = 30; lead at 5 m, rear at 0: 150. That is the maximum; the minimum has the lead at 9 m and the rear at 4 m:
    /// −450 + 50·0.8 = −410, or in reverse the lead at 9 m and the rear at 14 m: −450 − 150·18/11.</summary>
    [Fact]
    public void Zero_crossings_are_breakpoints()
    {
        var line = InfluenceLine.FromPoints([0, 5, 9, 20], [0, 1, -3, 0]);
        Assert.Equal(5, line.Count);
        Assert.Equal(6, line.XM[2], 1e-12);
        var train = Vehicles.Of([100, 100], [5]);
        var rule = new WeighingRule(0.5, true);
        Assert.Equal(150, Fast(line, train, Sense.Max, TravelDirections.Both, rule).Value, 1e-9);
        Assert.Equal(-450 - (150 * 18.0 / 11), Fast(line, train, Sense.Min, TravelDirections.Both, rule).Value, 1e-9);
    }

    /// <summary>A line of one sign has no extreme on the other side: the empty structure governs.</summary>
    [Fact]
    public void The_empty_structure_counts()
    {
        Assert.Equal(new Extreme(0, null), Fast(EndReaction, Vehicles.Of([100, 100], [4]), Sense.Min, TravelDirections.Both, WeighingRule.None));
        Assert.Equal(new Extreme(0, null), Fast(EndReaction, Vehicles.Of([100], []), Sense.Max, TravelDirections.None, WeighingRule.None));
    }

    /// <summary>Shear at midspan of 10 m: 0 to −½, then +½ to 0. One 100 kN axle: +50 just beyond the section, −50 just before it. With a second 100 kN axle
    /// 2 m behind (forward, both beyond or before): max 50 + 100·0.3 with the rear axle just beyond; min the mirror image.</summary>
    [Fact]
    public void Shear_takes_the_limit_on_the_right_side_of_its_section()
    {
        var shear = InfluenceLine.FromPoints([0, 5, 10], [0, -0.5, 0], [0, 0.5, 0]);
        var max = Fast(shear, Vehicles.Of([100, 100], [2]), Sense.Max, TravelDirections.Forward, WeighingRule.None);
        Assert.Equal(80, max.Value, 1e-9);
        Assert.Equal(new TrainPosition(7, TravelDirection.Forward, Side.After), max.Position);
        var min = Fast(shear, Vehicles.Of([100, 100], [2]), Sense.Min, TravelDirections.Forward, WeighingRule.None);
        Assert.Equal(-80, min.Value, 1e-9);
        Assert.Equal(new TrainPosition(5, TravelDirection.Forward, Side.Before), min.Position);
    }

    /// <summary>A plateau: two axles 3 m apart on a line that is 1 from 2 to 12 m. Both stand on it from lead 5 m on; the smallest such lead is reported.</summary>
    [Fact]
    public void On_a_plateau_the_first_position_is_reported()
    {
        var plateau = InfluenceLine.FromPoints([0, 2, 4, 6, 8, 12, 14], [0, 1, 1, 1, 1, 1, 0]);
        var extreme = Fast(plateau, Vehicles.Of([100, 100], [3]), Sense.Max, TravelDirections.Both, WeighingRule.None);
        Assert.Equal(new Extreme(200, new TrainPosition(5, TravelDirection.Forward, Side.Before)), extreme);
    }

    /// <summary>Axles exactly as far apart as two jumps pass both at once: never is one "after" while the other is "before". Jumps of +1 at 0 m and −1 at 6 m, axles 6 m apart
    /// (100 kN each): together they give at most 100 at any moment, not 200.</summary>
    [Fact]
    public void Jumps_passed_at_once_are_passed_together()
    {
        var box = InfluenceLine.FromPoints([0, 6], [1, 1]);
        var extreme = Fast(box, Vehicles.Of([100, 100], [6]), Sense.Max, TravelDirections.Both, WeighingRule.None);
        Assert.Equal(100, extreme.Value, 1e-9);

        // 1.2 + 4.8 is 6 only after rounding: the same must hold.
        Assert.Equal(100, Fast(box.ShiftedBy(0.1), Vehicles.Of([100, 1e-3, 100], [1.2, 4.8]), Sense.Max, TravelDirections.Both, WeighingRule.None).Value, 0.0011);
    }

    [Fact]
    public void Axles_on_the_deck_are_counted_from_one_and_by_the_side_at_its_ends()
    {
        var train = Vehicles.Of([100, 100, 100], [4, 6]);
        Assert.Equal([1, 2], AxlesOnDeck.Of(train, new TrainPosition(8, TravelDirection.Forward, Side.Before), 0, 20).ToArray());
        Assert.Equal([1, 2, 3], AxlesOnDeck.Of(train, new TrainPosition(10, TravelDirection.Forward, Side.After), 0, 20).ToArray());
        Assert.Equal([1, 2], AxlesOnDeck.Of(train, new TrainPosition(10, TravelDirection.Forward, Side.Before), 0, 20).ToArray());
        Assert.Equal([1, 2, 3], AxlesOnDeck.Of(train, new TrainPosition(20, TravelDirection.Forward, Side.Before), 0, 20).ToArray());
        Assert.Equal([2, 3], AxlesOnDeck.Of(train, new TrainPosition(20, TravelDirection.Forward, Side.After), 0, 20).ToArray());
        Assert.Equal([1, 2], AxlesOnDeck.Of(train, new TrainPosition(12, TravelDirection.Reverse, Side.Before), 0, 20).ToArray());
    }
}

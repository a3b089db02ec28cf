using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Tests.Lines;

public class InfluenceLineTests
{
    /// <summary>Shear at 4 m of a 10 m span: −0.4 just left of the section, 0.6 just right of it (statics).</summary>
    private static readonly InfluenceLine Shear = InfluenceLine.FromPoints([0, 4, 10], [0, -0.4, 0], [0, 0.6, 0]);

    [Theory]
    [InlineData(-1, Side.After, 0)]
    [InlineData(0, Side.After, 0)]
    [InlineData(2, Side.Before, -0.2)]
    [InlineData(4, Side.Before, -0.4)]
    [InlineData(4, Side.After, 0.6)]
    [InlineData(4 + 0.9e-9, Side.Before, -0.4)]
    [InlineData(4 - 0.9e-9, Side.After, 0.6)]
    [InlineData(7, Side.Before, 0.3)]
    [InlineData(10, Side.After, 0)]
    [InlineData(11, Side.Before, 0)]
    public void Ordinates_are_straight_between_points_and_one_sided_at_jumps(double xM, Side side, double expected) =>
        Assert.Equal(expected, Shear.At(xM, side), 1e-15);

    /// <summary>Triangles by hand: −0.4·4/2 and 0.6·6/2.</summary>
    [Fact]
    public void Areas_are_kept_by_sign()
    {
        Assert.Equal(1.8, Shear.PositiveArea, 1e-15);
        Assert.Equal(-0.8, Shear.NegativeArea, 1e-15);
        Assert.True(Shear.HasPositive && Shear.HasNegative);
        Assert.Equal(0.6, Shear.MaxAbs);
        Assert.Equal(0.1, Shear.MaxAbsSlope, 1e-15);
    }

    [Fact]
    public void A_line_that_is_not_zero_at_its_ends_jumps_there()
    {
        var line = InfluenceLine.FromPoints([1, 3], [1, 0.5]);
        Assert.Equal(0, line.At(1, Side.Before));
        Assert.Equal(1, line.At(1, Side.After));
        Assert.Equal(1, line.At(1 - 0.5e-9, Side.After));
        Assert.Equal(0.5, line.At(3 + 0.5e-9, Side.Before));
        Assert.Equal(0, line.At(3, Side.After));
    }

    [Fact]
    public void Zero_crossings_become_breakpoints()
    {
        var line = InfluenceLine.FromPoints([0, 2, 6, 8], [0, 1, -3, 0]);
        Assert.Equal([0, 2, 3, 6, 8], line.XM.ToArray());
        Assert.Equal([0, 1, 0, -3, 0], line.RightOrdinates.ToArray());
    }

    /// <summary>Moment at 4 m of a 10 m span from the reaction: R·4 left of the section, less (4 − x) from the load itself.</summary>
    [Fact]
    public void A_combination_has_the_points_and_jumps_of_all_its_lines()
    {
        var reaction = InfluenceLine.FromPoints([0, 10], [1, 0]);
        var load = InfluenceLine.FromPoints([0, 4], [4, 0]);
        var moment = InfluenceLine.Combine([4, -1], [reaction, load]);
        Assert.Equal([0, 4, 10], moment.XM.ToArray());
        Assert.Equal(2.4, moment.At(4, Side.Before), 1e-15);
        Assert.Equal(1.2, moment.At(2, Side.Before), 1e-15);
        Assert.Equal(0, moment.At(0, Side.After), 1e-15);
    }

    [Fact]
    public void Shifting_and_negating_keep_the_shape()
    {
        var moved = Shear.ShiftedBy(2.5);
        Assert.Equal(0.6, moved.At(6.5, Side.After));
        Assert.Equal(-0.6, Shear.Negated().At(4, Side.After));
        Assert.Equal(Shear.PositiveArea, -Shear.Negated().NegativeArea);
    }

    [Fact]
    public void Wrong_points_are_refused()
    {
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([0], [1]));
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([0, 1], [1]));
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([], []));
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([0, 0], [1, 1]));
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([0, double.NaN], [1, 1]));
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([0, 1], [1, double.PositiveInfinity]));
        Assert.Throws<ArgumentException>(() => InfluenceLine.FromPoints([0, 1], [0.5, 0], [1, 0]));
        Assert.Throws<ArgumentException>(() => InfluenceLine.Combine([], []));
        Assert.Throws<ArgumentException>(() => InfluenceLine.Combine([double.NaN], [Shear]));
        Assert.Throws<ArgumentException>(() => Shear.ShiftedBy(double.PositiveInfinity));
    }
}

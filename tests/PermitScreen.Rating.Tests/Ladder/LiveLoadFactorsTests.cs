using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Ladder;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Tests.Support;

namespace PermitScreen.Rating.Tests.Ladder;

/// <summary>The factor by weight over length against every group of axles, one by one (engineering rule B2).</summary>
public sealed class LiveLoadFactorsTests
{
    private static readonly LiveLoadRow Row = Build.Row((29, 1.40), (44, 1.35), (double.PositiveInfinity, 1.30));

    [Fact]
    public void The_group_with_the_least_weight_over_length_governs_where_it_fits_on_the_structure()
    {
        // Axles 1 to 2: 160 kN on 8 m, 20 kN/m; every other group is heavier for its length, and none of the others reaches down to 44 kN/m on 5 m.
        var train = Build.Train([60, 100, 100, 300], [0, 8, 9.2, 10.4]);
        Assert.Equal((1.40, "axles 1 to 2, 20.00 kN/m"), new LiveLoadFactors(Row, null, train, 100).At(1));
        Assert.Equal(1.30, new LiveLoadFactors(Row, null, train, 5).At(1).Factor);
    }

    [Fact]
    public void The_whole_vehicle_counts_though_it_is_longer_than_the_structure()
    {
        var train = Build.Train([100, 100], [0, 10]);
        Assert.Equal((1.40, "whole vehicle, 20.00 kN/m"), new LiveLoadFactors(Row, null, train, 5).At(1));
    }

    [Fact]
    public void Axles_without_a_length_take_the_largest_factor()
    {
        Assert.Equal(1.40, new LiveLoadFactors(Row, null, Build.Train([500], [0]), 100).At(1).Factor);
        Assert.Equal(1.40, new LiveLoadFactors(Row, null, Build.Train([500, 500], [0, 0]), 100).At(3).Factor);
    }

    [Theory]
    [InlineData(41)]
    [InlineData(42)]
    public void The_factor_is_the_largest_of_all_groups(int seed)
    {
        var random = new Random(seed);
        for (var i = 0; i < 2_000; i++)
        {
            var train = Build.RandomTrain(random);
            var lengthM = 60 * random.NextDouble();
            var k = 0.2 + 3 * random.NextDouble();
            Assert.Equal(Largest(train, lengthM, k), new LiveLoadFactors(Row, null, train, lengthM).At(k).Factor);
        }
    }

    [Theory]
    [InlineData(43)]
    public void The_factor_changes_at_the_boundaries_told_and_nowhere_else(int seed)
    {
        var random = new Random(seed);
        for (var i = 0; i < 300; i++)
        {
            var train = Build.RandomTrain(random);
            var factors = new LiveLoadFactors(Row, null, train, 60);
            double[] ends = [0, .. factors.ClassBoundaries(), 50];
            Assert.Equal(ends.Order(), ends);
            foreach (var (low, high) in ends.Zip(ends.Skip(1)))
            {
                var inside = Enumerable.Range(1, 9).Select(n => factors.At(low + (high - low) * n / 10).Factor);
                Assert.Single(inside.Append(factors.At(high * (1 - 1e-12)).Factor).Distinct());
            }
        }
    }

    private static double Largest(AxleTrain train, double lengthM, double k)
    {
        var all = new List<double>();
        for (var first = 0; first < train.Count; first++)
        {
            for (var last = first + 1; last < train.Count; last++)
            {
                var length = train.OffsetsM[last] - train.OffsetsM[first];
                if (length > 0 && (length <= lengthM || (first == 0 && last == train.Count - 1)))
                {
                    var weight = 0.0;
                    for (var axle = first; axle <= last; axle++)
                    {
                        weight += train.LoadsKn[axle];
                    }

                    all.Add(Row.FactorOf(Row.ClassOf(k * (weight / length)), null));
                }
            }
        }

        return all.Count == 0 ? 1.40 : all.Max();
    }
}

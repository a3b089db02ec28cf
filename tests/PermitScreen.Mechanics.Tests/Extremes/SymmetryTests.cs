using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Extremes;

/// <summary>What must hold for any truss and any vehicle, on seeded random pairs.</summary>
public class SymmetryTests
{
    private const int Samples = 60;

    public static TheoryData<int> Seeds => [.. Enumerable.Range(0, Samples)];

    [Theory]
    [MemberData(nameof(Seeds))]
    public void A_mirrored_line_has_the_same_extremes_with_the_directions_swapped(int seed)
    {
        var (train, effects) = Pairs.Of(seed);
        foreach (var line in effects)
        {
            var x = line.XM.ToArray().Select(xM => -xM).Reverse().ToArray();
            var mirrored = InfluenceLine.FromPoints(x, [.. line.RightOrdinates.ToArray().Reverse()], [.. line.LeftOrdinates.ToArray().Reverse()]);
            Assert.Equal(Max(line, train, TravelDirections.Forward), Max(mirrored, train, TravelDirections.Reverse), Near(line, train));
            Assert.Equal(Max(line, train, TravelDirections.Reverse), Max(mirrored, train, TravelDirections.Forward), Near(line, train));
            Assert.Equal(line.PositiveArea, mirrored.PositiveArea, 1e-12 * (1 + line.PositiveArea));
        }
    }

    [Theory]
    [MemberData(nameof(Seeds))]
    public void A_negated_line_swaps_maximum_and_minimum(int seed)
    {
        var (train, effects) = Pairs.Of(seed);
        foreach (var line in effects)
        {
            var min = SweepExtremes.Of(line, train, Sense.Min, TravelDirections.Both, WeighingRule.None);
            var max = SweepExtremes.Of(line.Negated(), train, Sense.Max, TravelDirections.Both, WeighingRule.None);
            Assert.Equal(-min.Value, max.Value);
            Assert.Equal(min.Position, max.Position);
        }
    }

    [Theory]
    [MemberData(nameof(Seeds))]
    public void A_shifted_line_has_the_same_extremes_at_the_shifted_position(int seed)
    {
        var (train, effects) = Pairs.Of(seed);
        foreach (var line in effects)
        {
            var moved = SweepExtremes.Of(line.ShiftedBy(137.25), train, Sense.Max, TravelDirections.Both, WeighingRule.None);
            Assert.Equal(Max(line, train, TravelDirections.Both), moved.Value, 1e-10 * (1e-300 + (train.GrossKn * line.MaxAbs)));
        }
    }

    [Theory]
    [MemberData(nameof(Seeds))]
    public void Heavier_axles_by_a_factor_give_a_larger_extreme_by_that_factor(int seed)
    {
        var (train, effects) = Pairs.Of(seed);
        foreach (var line in effects)
        {
            Assert.Equal(1.7 * Max(line, train, TravelDirections.Both), Max(line, train.ScaledBy(1.7), TravelDirections.Both), 2 * Near(line, train));
        }
    }

    [Theory]
    [MemberData(nameof(Seeds))]
    public void Responses_of_two_groups_of_axles_add_up_to_that_of_all(int seed)
    {
        var (train, effects) = Pairs.Of(seed);
        var random = new Random(seed);
        var loadsKn = train.LoadsKn.ToArray();
        var first = loadsKn.Select(load => random.Next(2) == 0 ? load : 0.25 * load).ToArray();
        var second = loadsKn.Zip(first, (all, part) => all - part).ToArray();
        foreach (var line in effects)
        {
            var position = new TrainPosition(line.StartM + (random.NextDouble() * (line.EndM - line.StartM + train.LengthM)), TravelDirection.Forward, Side.Before);
            var sum = At(train.WithLoads(first)) + At(train.WithLoads(second));
            Assert.Equal(At(train), sum, Near(line, train));

            double At(AxleTrain part) => Response.At(line, part, position, Sense.Max, WeighingRule.None);
        }
    }

    [Theory]
    [MemberData(nameof(Seeds))]
    public void A_combination_of_lines_responds_with_the_combination_of_responses(int seed)
    {
        var (train, effects) = Pairs.Of(seed);
        var random = new Random(seed);
        double[] factors = [.. effects.Select(_ => (2 * random.NextDouble()) - 1)];
        var combined = InfluenceLine.Combine(factors, effects);
        foreach (var side in (Side[])[Side.Before, Side.After])
        {
            foreach (var xM in effects.SelectMany(line => line.XM.ToArray()).Append(random.NextDouble() * 30))
            {
                var expected = effects.Select((line, i) => factors[i] * line.At(xM, side)).Sum();
                Assert.Equal(expected, combined.At(xM, side), 1e-9 * effects.Max(line => line.MaxAbs));
            }
        }

        Assert.True(Max(combined, train, TravelDirections.Both) >= 0);
    }

    /// <summary>Balance of the whole truss: vertical reactions add up to the load on the deck, horizontal ones to nothing, and their moment is the load's.</summary>
    [Theory]
    [MemberData(nameof(Seeds))]
    public void Reactions_balance_the_unit_load(int seed)
    {
        var (model, lines) = RandomTruss.Solved(new Random(seed));
        var joints = model.Nodes.ToDictionary(node => node.Name, StringComparer.Ordinal);
        foreach (var xM in model.DeckPanelPoints.Select(name => joints[name].XM))
        {
            double up = 0, across = 0, moment = 0, largest = 1;
            for (var s = 0; s < model.Supports.Length; s++)
            {
                var joint = joints[model.Supports[s].Node];
                var (x, y) = (On(lines.ReactionX(s), xM), On(lines.ReactionY(s), xM));
                (up, across, moment) = (up + y, across + x, moment + (y * joint.XM) - (x * joint.YM));
                largest = Math.Max(largest, Math.Abs(y));
            }

            Assert.Equal(1, up, 1e-9);
            Assert.Equal(0, across, 1e-9);
            Assert.Equal(xM, moment, 1e-9 * largest * (model.DeckEndM - model.DeckStartM));
        }

        static double On(InfluenceLine? line, double xM) => line?.At(xM, xM <= line.StartM ? Side.After : Side.Before) ?? 0;
    }

    private static double Max(InfluenceLine line, AxleTrain train, TravelDirections directions) =>
        SweepExtremes.Of(line, train, Sense.Max, directions, WeighingRule.None).Value;

    private static double Near(InfluenceLine line, AxleTrain train) => 1e-300 + (4e-12 * train.GrossKn * line.MaxAbs);
}

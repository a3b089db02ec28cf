using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Ladder;
using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Tests.Support;

namespace PermitScreen.Rating.Tests.Ladder;

/// <summary>The largest axle factor k against a scan over k with the pass rule alone: m(γ(k)(k·permit + lane) + others) ≤ N in every arrangement (engineering rule B6).</summary>
public sealed class LargestAxleFactorTests
{
    private const double Rounding = 1e-9;
    private const int Scanned = 400;

    [Theory]
    [InlineData(51)]
    [InlineData(52)]
    [InlineData(53)]
    public void K_is_what_a_scan_finds(int seed)
    {
        var random = new Random(seed);
        var (up, down, none) = (0, 0, 0);
        for (var i = 0; i < 400; i++)
        {
            var (loads, factors) = Random(random);
            var one = loads.Max(l => l.FactoredKn(factors.At(1).Factor, 1));
            var numerator = one * (0.3 + 1.7 * random.NextDouble());
            var passes = Pass(loads, factors, numerator, 1);
            var k = LargestAxleFactor.Of(loads, factors, numerator, passes);
            Assert.NotNull(k);
            if (k == 0)
            {
                none++;
                Assert.False(passes);
                Assert.DoesNotContain(Between(0, 1), x => Pass(loads, factors, numerator, x));
            }
            else if (passes)
            {
                up++;
                Assert.True(k >= 1);
                Assert.All(Between(1, k.Value), x => Assert.True(Pass(loads, factors, numerator, x)));
                Assert.False(Pass(loads, factors, numerator, k.Value * (1 + Rounding)));
            }
            else
            {
                down++;
                Assert.InRange(k.Value, 0, 1);
                Assert.True(Pass(loads, factors, numerator, k.Value * (1 - Rounding)));
                Assert.DoesNotContain(Between(k.Value * (1 + Rounding), 1), x => Pass(loads, factors, numerator, x));
            }
        }

        Assert.True(up > 50 && down > 50, $"{up} upwards, {down} downwards, {none} without any k");
    }

    [Fact]
    public void Dead_load_beyond_capacity_leaves_no_k()
    {
        var (loads, factors) = Random(new Random(54));
        Assert.Equal(0, LargestAxleFactor.Of(loads, factors, -1, passes: false));
    }

    private static bool Pass(IReadOnlyList<ArrangedLoad> loads, LiveLoadFactors factors, double numerator, double k) =>
        loads.All(l => l.FactoredKn(factors.At(k).Factor, k) <= numerator);

    private static IEnumerable<double> Between(double low, double high) =>
        Enumerable.Range(1, Scanned - 1).Select(n => low + (high - low) * n / Scanned);

    /// <summary>A random vehicle on a random roadway, other lanes and the uniform load with it, on one member.</summary>
    private static (List<ArrangedLoad> Loads, LiveLoadFactors Factors) Random(Random random)
    {
        var effect = Build.Effect();
        var unit = Build.Unit(-5, 5, effect);
        var row = Build.Row((10 + 20 * random.NextDouble(), 1.6), (30 + 30 * random.NextDouble(), 1.35), (double.PositiveInfinity, 1.1));
        var policy = Build.Policy(row);
        var vehicle = Build.Vehicle(Build.RandomTrain(random), 2.5 + random.NextDouble());
        var roadway = new Roadway(-4 - random.NextDouble(), 4 + random.NextDouble(), random.Next(2, 4), null);
        var arrangements = Arrangements.Of(roadway, vehicle.WidthOverTyresM, Build.Mixed, policy, out _);
        if (arrangements.IsEmpty)
        {
            arrangements = Arrangements.Of(roadway, vehicle.WidthOverTyresM, Build.Alone, policy, out _);
        }

        var factors = new LiveLoadFactors(row, null, vehicle.Train, 20);
        var load = new RungLoad(policy, Build.Mixed, unit, "loaded", vehicle, TravelDirections.Both, arrangements, factors);
        var extremes = new LineExtremes();
        return ([.. arrangements.Select(a => new ArrangedLoad(load, effect, EffectSense.Tension, a, extremes))], factors);
    }
}

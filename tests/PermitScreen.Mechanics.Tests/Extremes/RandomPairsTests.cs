using System.Collections.Concurrent;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Extremes;

/// <summary>Random trusses and vehicles (seeded by the number of the pair; PERMITSCREEN_PAIRS of them, eight effects each, both senses).</summary>
public class RandomPairsTests
{
    /// <summary>
    /// exact − scan lies in [−1e-9·s, ½ mm·ΣP·max|slope| + 1e-9·s] with s = ΣP·max|η|, the largest response there could be: no position of the scan may exceed the exact
    /// value, and the nearest scanned position is at most ½ mm away.
    /// </summary>
    [Fact]
    public void Exact_extremes_bound_a_millimetre_scan_and_no_more_than_half_a_step_of_it()
    {
        var scans = new ThreadLocal<MillimetreScan>(() => new MillimetreScan());
        var below = new ConcurrentBag<double>();
        var above = new ConcurrentBag<double>();
        ForEachEffect((pair, line, train) =>
        {
            var forward = scans.Value!.Over(line, train, TravelDirection.Forward);
            var reverse = scans.Value.Over(line, train, TravelDirection.Reverse);
            var scale = train.GrossKn * line.MaxAbs;
            var step = 0.5 * MillimetreScan.StepM * train.GrossKn * line.MaxAbsSlope;
            Check(Sense.Max, Math.Max(forward.Max, reverse.Max));
            Check(Sense.Min, Math.Min(forward.Min, reverse.Min));

            void Check(Sense sense, double scanned)
            {
                var exact = SweepExtremes.Of(line, train, sense, TravelDirections.Both, WeighingRule.None).Value;
                var gap = sense == Sense.Max ? exact - scanned : scanned - exact;
                Assert.True(
                    gap >= -1e-9 * scale && gap <= step + (1e-9 * scale),
                    $"pair {pair}, {sense}: exact {exact:R}, scan {scanned:R}, half a step {step:R}");
                if (scale > 0)
                {
                    below.Add(Math.Max(-gap / scale, 0));
                    above.Add(gap / (step + (1e-9 * scale)));
                }
            }
        });

        Figures.Note("mechanics.pairs.count", Pairs.Count);
        Figures.Note("mechanics.pairs.extremes", below.Count);
        Figures.Note("mechanics.pairs.scan_above_exact.worst_relative", below.Max());
        Figures.Note("mechanics.pairs.exact_above_scan.worst_share_of_half_step", above.Max());
    }

    [Fact]
    public void Position_direction_and_side_reproduce_the_value()
    {
        var worst = new ConcurrentBag<double>();
        ForEachEffect((pair, line, train) =>
        {
            foreach (var sense in (Sense[])[Sense.Max, Sense.Min])
            {
                var extreme = SweepExtremes.Of(line, train, sense, TravelDirections.Both, WeighingRule.None);
                Assert.True(sense == Sense.Max ? extreme.Value >= 0 : extreme.Value <= 0, $"pair {pair}: {sense} {extreme.Value:R}");
                if (extreme.Position is not { } position)
                {
                    Assert.Equal(0, extreme.Value);
                    continue;
                }

                var off = Math.Abs(Naive.Response(line, train, position) - extreme.Value) / (train.GrossKn * line.MaxAbs);
                Assert.True(off <= 1e-12, $"pair {pair}, {sense}: the position gives a value off by {off:E1}");
                worst.Add(off);
            }
        });

        Figures.Note("mechanics.pairs.position_reproduces.worst_relative", worst.Max());
    }

    [Fact]
    public void Fast_path_and_plain_path_agree_to_the_bit()
    {
        var compared = 0;
        ForEachEffect((pair, line, train) =>
        {
            var random = new Random(pair);
            WeighingRule[] rules = [WeighingRule.None, new(0.1 * random.NextDouble(), true), new(0.05, false), new(0, false)];
            var mixed = RandomTrain.WithMixedSigns(random, train);
            foreach (var sense in (Sense[])[Sense.Max, Sense.Min])
            {
                var directions = (TravelDirections)random.Next(1, 4);
                Same(train, sense, TravelDirections.Both, WeighingRule.None);
                Same(train, sense, directions, rules[random.Next(rules.Length)]);
                Same(mixed, sense, directions, rules[random.Next(rules.Length)]);
            }

            foreach (var axles in (AxleTrain[])[train, mixed])
            {
                var rule = rules[random.Next(2)];
                var (max, min) = SweepExtremes.Both(line, axles, TravelDirections.Both, rule);
                Assert.Equal(SweepExtremes.Of(line, axles, Sense.Max, TravelDirections.Both, rule), max);
                Assert.Equal(SweepExtremes.Of(line, axles, Sense.Min, TravelDirections.Both, rule), min);
            }

            void Same(AxleTrain axles, Sense sense, TravelDirections directions, WeighingRule rule)
            {
                var plain = PlainExtremes.Of(line, axles, sense, directions, rule);
                var fast = SweepExtremes.Of(line, axles, sense, directions, rule);
                Assert.True(
                    BitConverter.DoubleToInt64Bits(plain.Value) == BitConverter.DoubleToInt64Bits(fast.Value) && plain.Position == fast.Position,
                    $"pair {pair}, {sense}, {directions}, {rule}: plain {plain}, fast {fast}");
                Interlocked.Increment(ref compared);
            }
        });

        Figures.Note("mechanics.pairs.fast_equals_plain.compared", compared);
    }

    private static void ForEachEffect(Action<int, InfluenceLine, AxleTrain> check) =>
        Parallel.For(0, Pairs.Count, new ParallelOptions { MaxDegreeOfParallelism = Environment.ProcessorCount }, pair =>
        {
            var (train, effects) = Pairs.Of(pair);
            foreach (var line in effects)
            {
                check(pair, line, train);
            }
        });
}

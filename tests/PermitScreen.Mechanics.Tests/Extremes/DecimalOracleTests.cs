using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Extremes;

/// <summary>A second oracle in decimal arithmetic (28 digits): all events, one-sided limits, nothing shared with the product but the definition.</summary>
public class DecimalOracleTests
{
    private const int PairsCompared = 200;

    private const decimal SnapM = 1e-9m;

    [Fact]
    public void Extremes_agree_with_exact_arithmetic()
    {
        var worst = 0.0;
        var gate = new Lock();
        Parallel.For(0, PairsCompared, new ParallelOptions { MaxDegreeOfParallelism = Environment.ProcessorCount }, pair =>
        {
            var (train, effects) = Pairs.Of(pair);
            foreach (var line in effects.Where((_, i) => i % 4 == pair % 4))
            {
                var (max, min) = Exact(line, train);
                var scale = (train.GrossKn * line.MaxAbs) + double.Epsilon;
                var off = Math.Max(
                    Math.Abs(max - SweepExtremes.Of(line, train, Sense.Max, TravelDirections.Both, WeighingRule.None).Value),
                    Math.Abs(min - SweepExtremes.Of(line, train, Sense.Min, TravelDirections.Both, WeighingRule.None).Value)) / scale;
                Assert.True(off <= 2e-12, $"pair {pair}: off by {off:E2} of ΣP·max|η|");
                lock (gate)
                {
                    worst = Math.Max(worst, off);
                }
            }
        });

        Figures.Note("mechanics.decimal_oracle.pairs", PairsCompared);
        Figures.Note("mechanics.decimal_oracle.worst_relative", worst);
    }

    private static (double Max, double Min) Exact(InfluenceLine line, AxleTrain train)
    {
        var x = Exactly(line.XM);
        var (left, right) = (Exactly(line.LeftOrdinates), Exactly(line.RightOrdinates));
        var (loads, offsets) = (Exactly(train.LoadsKn), Exactly(train.OffsetsM));
        decimal max = 0, min = 0;
        foreach (var sign in (ReadOnlySpan<decimal>)[-1, 1])
        {
            foreach (var lead in offsets.SelectMany(d => x.Select(at => at - (sign * d))).Distinct())
            {
                foreach (var before in (ReadOnlySpan<bool>)[true, false])
                {
                    var sum = 0m;
                    for (var i = 0; i < loads.Length; i++)
                    {
                        sum += loads[i] * Ordinate(x, left, right, lead + (sign * offsets[i]), before);
                    }

                    (max, min) = (Math.Max(max, sum), Math.Min(min, sum));
                }
            }
        }

        return ((double)max, (double)min);
    }

    private static decimal Ordinate(decimal[] x, decimal[] left, decimal[] right, decimal at, bool before)
    {
        // Jumps within a nanometre count as at the axle: the product's definition of a position.
        for (var k = 0; k < x.Length; k++)
        {
            if (at == x[k] || (left[k] != right[k] && Math.Abs(at - x[k]) <= SnapM))
            {
                return before ? left[k] : right[k];
            }
        }

        for (var k = 0; k + 1 < x.Length; k++)
        {
            if (x[k] < at && at < x[k + 1])
            {
                return right[k] + ((left[k + 1] - right[k]) * (at - x[k]) / (x[k + 1] - x[k]));
            }
        }

        return 0;
    }

    /// <summary>Every binary digit of a double has a decimal one; 25 of them behind the point are kept.</summary>
    private static decimal[] Exactly(ReadOnlySpan<double> values)
    {
        var exact = new decimal[values.Length];
        for (var i = 0; i < values.Length; i++)
        {
            var text = values[i].ToString("F25", System.Globalization.CultureInfo.InvariantCulture);
            exact[i] = decimal.Parse(text, System.Globalization.CultureInfo.InvariantCulture);
        }

        return exact;
    }
}

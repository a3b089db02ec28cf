using System.Collections.Immutable;

namespace PermitScreen.Rating.Ladder;

/// <summary>The largest factor k on the permit's axle loads alone that passes (rule B6).</summary>
/// <remarks>
/// The live-load factor is a step function of k, so a heavier vehicle may meet a smaller factor. Where the vehicle passes as it
/// is, k is reached from 1 upwards while everything between passes; where it fails, k is the largest passing one below 1.
/// </remarks>
public static class LargestAxleFactor
{
    /// <summary>Finds k; null where no axle of the permit acts.</summary>
    /// <param name="loads">Live load of every arrangement.</param>
    /// <param name="factors">Live-load factors of the permit.</param>
    /// <param name="numeratorKn">Capacity less factored dead load, kN.</param>
    /// <param name="passes">Whether k = 1 passes.</param>
    public static double? Of(IReadOnlyList<ArrangedLoad> loads, LiveLoadFactors factors, double numeratorKn, bool passes)
    {
        if (loads.All(l => l.PermitKn <= 0))
        {
            return null;
        }

        if (numeratorKn < 0)
        {
            return 0;
        }

        var boundaries = factors.ClassBoundaries();
        return passes ? Upwards(loads, factors, numeratorKn, boundaries) : Downwards(loads, factors, numeratorKn, boundaries);
    }

    private static double? Upwards(IReadOnlyList<ArrangedLoad> loads, LiveLoadFactors factors, double numeratorKn, ImmutableArray<double> boundaries)
    {
        var low = 1.0;
        foreach (var high in boundaries.Where(b => b >= 1).Append(double.PositiveInfinity))
        {
            var largest = Largest(loads, factors.At(Inside(low, high)).Factor, numeratorKn);
            if (largest < high)
            {
                return Math.Max(largest, low);
            }

            low = high;
        }

        return null;
    }

    private static double Downwards(IReadOnlyList<ArrangedLoad> loads, LiveLoadFactors factors, double numeratorKn, ImmutableArray<double> boundaries)
    {
        var high = 1.0;
        foreach (var low in boundaries.Where(b => b < 1).OrderDescending().Append(0.0))
        {
            var largest = Largest(loads, factors.At(Inside(low, high)).Factor, numeratorKn);
            if (largest > low)
            {
                return Math.Min(largest, high);
            }

            high = low;
        }

        return 0;
    }

    /// <summary>A k on (low, high]: the upper end belongs to the class below it.</summary>
    private static double Inside(double low, double high) => double.IsPositiveInfinity(high) ? 2 * low : low + (high - low) / 2;

    private static double Largest(IReadOnlyList<ArrangedLoad> loads, double factor, double numeratorKn) =>
        loads.Min(l => l.LargestK(factor, numeratorKn));
}

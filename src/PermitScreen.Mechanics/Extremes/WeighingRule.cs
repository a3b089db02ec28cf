namespace PermitScreen.Mechanics.Extremes;

/// <summary>How the weight of each axle may differ from the declared one, and whether axles that relieve count.</summary>
/// <param name="Tolerance">Relative tolerance t of each axle's weight, 0 ≤ t &lt; 1: for a maximum each axle counts with the worse of w(1 − t) and w(1 + t).</param>
/// <param name="RelievingAxlesCount">Whether an axle whose contribution is of the other sign counts; if not, it counts as absent.</param>
public readonly record struct WeighingRule(double Tolerance, bool RelievingAxlesCount)
{
    /// <summary>Declared weights, every axle counts. The value <c>default</c> differs: its relieving axles do not count.</summary>
    public static WeighingRule None => new(0, true);
}

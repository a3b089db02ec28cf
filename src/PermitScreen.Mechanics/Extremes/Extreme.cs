using System.Runtime.InteropServices;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>The supremum or infimum of an effect over all positions of a vehicle, the empty structure included.</summary>
/// <param name="Value">kN or kN·m; ≥ 0 for a maximum, ≤ 0 for a minimum.</param>
/// <param name="Position">A position whose one-sided limit is the value; <see langword="null"/> where the empty structure governs (value 0).</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct Extreme(double Value, TrainPosition? Position);

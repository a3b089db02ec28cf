using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;

namespace PermitScreen.Rating.Vehicles;

/// <summary>A vehicle as far as rating needs it: axles, how wide it stands on the road, axles off its centreline.</summary>
/// <param name="Train">Axle loads, kN, and offsets behind the lead axle, m.</param>
/// <param name="WidthOverTyresM">Width over the tyres, m, &gt; 0; limits how far it can stand aside (rule A2).</param>
/// <param name="LateralOffsetsM">Centre of each axle to the right of the vehicle's centreline, m; default where all axles stand on it.</param>
public sealed record PermitVehicle(AxleTrain Train, double WidthOverTyresM, ImmutableArray<double> LateralOffsetsM)
{
    /// <summary>Whether any axle stands off the vehicle's centreline.</summary>
    public bool HasLateralOffsets => !LateralOffsetsM.IsDefaultOrEmpty && LateralOffsetsM.Any(o => o != 0);
}

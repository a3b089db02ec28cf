using System.Runtime.InteropServices;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Where a vehicle stands.</summary>
/// <param name="LeadM">Chainage of the lead axle, m.</param>
/// <param name="Direction">Forward: axle i at lead − d_i; reverse: axle i at lead + d_i.</param>
/// <param name="Side">The limit meant: the whole vehicle an infinitesimal distance below or above this chainage.</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct TrainPosition(double LeadM, TravelDirection Direction, Side Side);

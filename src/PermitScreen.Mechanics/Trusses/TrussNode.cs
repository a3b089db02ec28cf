using System.Runtime.InteropServices;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>A joint of a truss.</summary>
/// <param name="Name">Name, unique within the truss.</param>
/// <param name="XM">Chainage, m.</param>
/// <param name="YM">Height, m, upwards.</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct TrussNode(string Name, double XM, double YM);

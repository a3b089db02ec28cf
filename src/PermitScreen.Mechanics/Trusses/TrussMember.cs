using System.Runtime.InteropServices;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>A straight bar between two joints, free to turn at both.</summary>
/// <param name="Name">Name, unique within the truss.</param>
/// <param name="StartNode">Name of the joint at one end.</param>
/// <param name="EndNode">Name of the joint at the other end.</param>
/// <param name="AxialStiffnessKn">E·A, kN, &gt; 0.</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct TrussMember(string Name, string StartNode, string EndNode, double AxialStiffnessKn);

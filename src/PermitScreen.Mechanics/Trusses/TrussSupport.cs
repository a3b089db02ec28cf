using System.Runtime.InteropServices;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>An unyielding support of one joint.</summary>
/// <param name="Name">Name, unique among the supports.</param>
/// <param name="Node">Name of the joint that it holds.</param>
/// <param name="HoldsX">Whether it holds the joint horizontally.</param>
/// <param name="HoldsY">Whether it holds the joint vertically, against settlement and uplift alike.</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct TrussSupport(string Name, string Node, bool HoldsX, bool HoldsY);

using System.Runtime.InteropServices;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>One end of a deck.</summary>
/// <param name="Kind">How it ends.</param>
/// <param name="TipM">Chainage of the seat on the abutment or of the tip of the overhang, m; ignored for an end floor beam.</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct DeckEnd(DeckEndKind Kind, double TipM);

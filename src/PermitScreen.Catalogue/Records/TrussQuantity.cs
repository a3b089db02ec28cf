using PermitScreen.Rating.Structures;

namespace PermitScreen.Catalogue.Records;

/// <summary>Names what an effect is in a truss.</summary>
/// <param name="Kind">Kind of effect.</param>
/// <param name="Index">Index of the member or of the support.</param>
public readonly record struct TrussQuantity(EffectKind Kind, int Index);

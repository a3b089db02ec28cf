using System.Collections.Immutable;

namespace PermitScreen.Rating.Policies;

/// <summary>Live-load factors of one weight-over-length class.</summary>
/// <param name="UpToKnPerM">Upper limit of the class, kN/m, inclusive: a boundary value belongs to the class below it, whose factor is the larger one; +∞ for the last class.</param>
/// <param name="Factors">Factor per truck count of the row, in its order.</param>
public sealed record LiveLoadClass(double UpToKnPerM, ImmutableArray<double> Factors);

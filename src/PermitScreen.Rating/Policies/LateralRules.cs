namespace PermitScreen.Rating.Policies;

/// <summary>Where vehicles may stand across the roadway.</summary>
/// <param name="KerbDistanceM">Least distance from the kerb to the outside of the tyres, m.</param>
/// <param name="TyreGapM">Least clear distance between the tyres of two vehicles, m.</param>
public sealed record LateralRules(double KerbDistanceM, double TyreGapM);

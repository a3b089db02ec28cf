namespace PermitScreen.Rating.Checks;

/// <summary>Capacity, step by step.</summary>
/// <param name="GivenKn">Resistance as the catalogue states it, kN.</param>
/// <param name="ResistanceFactor">φ applied; 1 on a factored amount.</param>
/// <param name="ConditionFactor">φc before the floor; 1 where not applied.</param>
/// <param name="SystemFactor">φs before the floor; 1 where not applied.</param>
/// <param name="ConditionTimesSystem">Product of both after the floor.</param>
/// <param name="CapacityKn">Capacity C, kN.</param>
/// <param name="Note">What was applied and what was already included.</param>
public sealed record CapacityArithmetic(
    double GivenKn, double ResistanceFactor, double ConditionFactor, double SystemFactor, double ConditionTimesSystem, double CapacityKn, string Note);

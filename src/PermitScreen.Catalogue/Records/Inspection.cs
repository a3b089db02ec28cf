namespace PermitScreen.Catalogue.Records;

/// <summary>What the last inspection found.</summary>
/// <param name="InspectedOn">Day of the last inspection; null where not said.</param>
/// <param name="IntervalMonths">Longest time until the next one, months; null where not said.</param>
/// <param name="SuperstructureCondition">Condition 0 to 9; null where not said.</param>
public sealed record Inspection(DateOnly? InspectedOn, int? IntervalMonths, int? SuperstructureCondition);

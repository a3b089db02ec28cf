namespace PermitScreen.Rating.Structures;

/// <summary>Dead load of one component in one effect.</summary>
/// <param name="Component">Which component.</param>
/// <param name="AmountKn">Amount with the effect's sign, kN; 0 where the catalogue states that there is none.</param>
public readonly record struct DeadLoad(DeadLoadComponent Component, double AmountKn);

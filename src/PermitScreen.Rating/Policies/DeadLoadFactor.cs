using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Policies;

/// <summary>Load factors of one dead-load component (rule B5).</summary>
/// <param name="Component">Which component.</param>
/// <param name="Adverse">Factor where it loads the sense.</param>
/// <param name="Relieving">Factor where it relieves the sense.</param>
/// <param name="Required">Whether every rated effect must state this component.</param>
public sealed record DeadLoadFactor(DeadLoadComponent Component, double Adverse, double Relieving, bool Required);

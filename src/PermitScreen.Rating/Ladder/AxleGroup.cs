namespace PermitScreen.Rating.Ladder;

/// <summary>A run of axles that can be on the deck together, by weight over length.</summary>
/// <param name="FirstAxle">First axle, counted from 1 at the lead axle.</param>
/// <param name="LastAxle">Last axle.</param>
/// <param name="KnPerM">Weight over the distance between its outer axles, kN/m.</param>
public readonly record struct AxleGroup(int FirstAxle, int LastAxle, double KnPerM);

namespace PermitScreen.Rating.Structures;

/// <summary>A plane that carries load: a truss seen from the front.</summary>
/// <param name="PlaneId">Id within the unit.</param>
/// <param name="LateralM">Lateral position, m, positive to the right looking forward.</param>
public sealed record Plane(string PlaneId, double LateralM);

using PermitScreen.Mechanics.Extremes;

namespace PermitScreen.Screening.Applications;

/// <summary>One structure of a route.</summary>
/// <param name="Structure">Resource name, structures/{structure}.</param>
/// <param name="Relation">Over or beneath.</param>
/// <param name="Directions">Directions of travel to screen.</param>
/// <param name="LegId">Leg; empty on a route of one leg.</param>
public sealed record Crossing(string Structure, CrossingRelation Relation, TravelDirections Directions, string LegId);

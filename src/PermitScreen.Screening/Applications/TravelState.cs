using System.Collections.Immutable;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Screening.Applications;

/// <summary>One state in which the load travels, with what fit needs.</summary>
/// <param name="Title">What people call it.</param>
/// <param name="Rating">Axles and lateral places.</param>
/// <param name="OverallWidthM">Overall width, m; null where not said.</param>
/// <param name="OverallHeightM">Overall height, m; null where not said.</param>
/// <param name="LegIds">Legs on which it travels; empty means all.</param>
public sealed record TravelState(string Title, PermitConfiguration Rating, double? OverallWidthM, double? OverallHeightM, ImmutableArray<string> LegIds)
{
    /// <summary>Whether it travels on a leg.</summary>
    /// <param name="legId">Leg.</param>
    public bool TravelsOn(string legId) => LegIds.IsEmpty || LegIds.Contains(legId);
}

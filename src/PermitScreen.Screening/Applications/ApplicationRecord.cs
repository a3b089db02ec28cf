using System.Collections.Immutable;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Screening.Applications;

/// <summary>A request for permission to move one load, checked.</summary>
/// <param name="Reference">The applicant's or desk's reference.</param>
/// <param name="PermitKind">Kind of permit.</param>
/// <param name="TravelFrom">First day of travel.</param>
/// <param name="TravelTo">Last day of travel.</param>
/// <param name="States">States in which the load travels; at least one.</param>
/// <param name="Crossings">Structures in travel order; at least one.</param>
public sealed record ApplicationRecord(
    string Reference,
    PermitKind PermitKind,
    DateOnly TravelFrom,
    DateOnly TravelTo,
    ImmutableArray<TravelState> States,
    ImmutableArray<Crossing> Crossings);

using System.Collections.Immutable;

namespace PermitScreen.Rating.Vehicles;

/// <summary>One state in which a permit's load travels.</summary>
/// <param name="ConfigurationId">Id within the application.</param>
/// <param name="Vehicle">The vehicle; null where it cannot be rated, for the reasons given.</param>
/// <param name="Gaps">What keeps it from being assessed.</param>
public sealed record PermitConfiguration(string ConfigurationId, PermitVehicle? Vehicle, ImmutableArray<Checks.Reason> Gaps);

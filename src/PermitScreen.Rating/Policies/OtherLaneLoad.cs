namespace PermitScreen.Rating.Policies;

/// <summary>The vehicle that stands in each other lane (rule A4).</summary>
/// <param name="Vehicle">The vehicle.</param>
/// <param name="LiveLoadFactor">Its live-load factor.</param>
/// <param name="Allowance">Its dynamic load allowance.</param>
public sealed record OtherLaneLoad(Vehicles.PermitVehicle Vehicle, double LiveLoadFactor, Allowance Allowance);

namespace PermitScreen.Rating.Vehicles;

/// <summary>The kind of permit asked for; it selects the live-load factor row.</summary>
public enum PermitKind
{
    /// <summary>Routine or annual: unlimited crossings, mixed with traffic.</summary>
    Routine = 1,

    /// <summary>Special, a single trip.</summary>
    SpecialSingleTrip,

    /// <summary>Special, several trips, fewer than 100.</summary>
    SpecialMultipleTrips,
}

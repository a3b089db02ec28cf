namespace PermitScreen.Catalogue.Storage;

/// <summary>Who did something, why and when.</summary>
/// <param name="Actor">Who.</param>
/// <param name="Reason">Why.</param>
/// <param name="Instant">When, UTC, to the millisecond.</param>
public sealed record Provenance(string Actor, string Reason, DateTimeOffset Instant);

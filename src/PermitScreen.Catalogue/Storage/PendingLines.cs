namespace PermitScreen.Catalogue.Storage;

/// <summary>Lines of one truss that are still to be computed and kept.</summary>
/// <param name="Key">Address of the lines.</param>
/// <param name="Structure">A structure that needs them.</param>
/// <param name="Content">Address of a revision's content that needs them.</param>
/// <param name="Since">When they were asked for.</param>
/// <param name="Failure">Why they cannot be computed; null where it was not tried, or not in vain.</param>
public sealed record PendingLines(Digest Key, string Structure, Digest Content, DateTimeOffset Since, string? Failure);

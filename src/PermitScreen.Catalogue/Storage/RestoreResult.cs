namespace PermitScreen.Catalogue.Storage;

/// <summary>What a restore did.</summary>
/// <param name="Restored">Version that the backup held.</param>
/// <param name="Replaced">Version that was replaced.</param>
/// <param name="Now">The newest version now.</param>
public sealed record RestoreResult(long Restored, long Replaced, VersionStamp Now);

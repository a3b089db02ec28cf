namespace PermitScreen.Catalogue.Storage;

/// <summary>The newest catalogue version as the database has it.</summary>
/// <param name="Timeline">Identity of the records; another one after a restore.</param>
/// <param name="Version">Newest catalogue version; 0 where nothing was ever published.</param>
/// <param name="State">Sum over all revisions that hold at the version; tells whether a copy is true.</param>
public sealed record VersionStamp(Guid Timeline, long Version, StateSum State);

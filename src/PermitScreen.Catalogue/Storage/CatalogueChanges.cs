using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Storage;

/// <summary>What changed between two versions.</summary>
/// <param name="Stamp">The newer version.</param>
/// <param name="Began">Revisions that hold at the newer version and did not at the older one, with their content.</param>
/// <param name="Gone">Resources that the older version has and the newer one has not.</param>
public sealed record CatalogueChanges(VersionStamp Stamp, ImmutableArray<StoredRevision> Began, ImmutableArray<(ResourceKind Kind, string Name)> Gone);

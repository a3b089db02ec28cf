using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>What a segment file holds; whole, as its checksums and the sum over its revisions prove. Whether the records know it is for the caller to ask.</summary>
/// <param name="Stamp">Version that it is a copy of.</param>
/// <param name="Revisions">Structures, then policies, each in order of name.</param>
public sealed record SegmentContent(VersionStamp Stamp, ImmutableArray<StoredRevision> Revisions);

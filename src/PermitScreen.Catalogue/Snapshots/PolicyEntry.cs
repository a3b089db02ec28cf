using PermitScreen.Catalogue.Storage;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>One revision of a policy document in memory.</summary>
/// <param name="Revision">Revision.</param>
/// <param name="Document">The checked document; null where this version cannot read it.</param>
public sealed record PolicyEntry(StoredRevision Revision, PolicyDocument? Document);

using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>What a change set does to one resource.</summary>
/// <param name="Kind">Kind of resource.</param>
/// <param name="Name">Resource name.</param>
/// <param name="Known">What was known of it; null where there never was one.</param>
/// <param name="Ended">Revision that ends; null where none holds.</param>
/// <param name="Content">Address of the content that begins; null where it is taken out.</param>
internal sealed record ResourceChange(ResourceKind Kind, string Name, ResourceRow? Known, RevisionHead? Ended, Digest? Content);

using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>The whole catalogue at one version; immutable, shared by all calls that use it.</summary>
/// <param name="Version">Catalogue version.</param>
/// <param name="Structures">Structures by resource name, in order of name.</param>
public sealed record CatalogueSnapshot(long Version, ImmutableSortedDictionary<string, PreparedStructure> Structures)
{
    /// <summary>The structure of a resource name, or null.</summary>
    /// <param name="name">Resource name, structures/{structure}.</param>
    public PreparedStructure? Find(string name) => Structures.GetValueOrDefault(name);
}

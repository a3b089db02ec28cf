using System.Collections.Immutable;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service;

/// <summary>The structures as they were read, for those who ask for them. Filled once, before the catalogue is published.</summary>
public sealed class StructureShelf
{
    private ImmutableSortedDictionary<string, Structure> _structures = ImmutableSortedDictionary.Create<string, Structure>(StringComparer.Ordinal);

    /// <summary>All structures in order of name.</summary>
    public IReadOnlyList<Structure> All => [.. _structures.Values];

    /// <summary>The structure of a resource name, or null.</summary>
    /// <param name="name">Resource name.</param>
    public Structure? Find(string name) => _structures.GetValueOrDefault(name);

    /// <summary>Replaces all structures.</summary>
    /// <param name="structures">Structures of different names.</param>
    public void Fill(IEnumerable<Structure> structures) =>
        _structures = structures.ToImmutableSortedDictionary(s => s.Name, s => s, StringComparer.Ordinal);
}

using System.Collections.Immutable;
using PermitScreen.Catalogue.Records;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Lines;

/// <summary>Addresses of all lines that a structure needs.</summary>
public static class TrussKeys
{
    /// <summary>The addresses in order of the units, each once.</summary>
    /// <param name="record">Structure.</param>
    public static ImmutableArray<Digest> Of(StructureRecord record) =>
        [.. record.Units.Select(u => u.Truss).OfType<Mechanics.Trusses.TrussModel>().Select(TrussKey.Of).Distinct()];
}

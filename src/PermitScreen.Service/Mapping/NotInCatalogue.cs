using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Service.Mapping;

/// <summary>Words for a structure that is not there.</summary>
internal static class NotInCatalogue
{
    /// <summary>Comparing a name with more names than these would hold up the call.</summary>
    private const int MostCompared = 20_000;

    public static string Words(string name, CatalogueSnapshot catalogue) =>
        catalogue.Count <= MostCompared && Spelling.Nearest(catalogue.StructuresAfter().Select(e => e.Name), name) is { } near
            ? $"{name} is not in the catalogue; did you mean {near}?"
            : FormattableString.Invariant($"{name} is not in the catalogue of {catalogue.Count} structures.");
}

using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Service.Mapping;

/// <summary>Words for a structure that is not there.</summary>
internal static class NotInCatalogue
{
    public static string Words(string name, CatalogueSnapshot catalogue) =>
        Spelling.Nearest(catalogue.Structures.Keys, name) is { } near
            ? $"{name} is not in the catalogue; did you mean {near}?"
            : FormattableString.Invariant($"{name} is not in the catalogue of {catalogue.Structures.Count} structures.");
}

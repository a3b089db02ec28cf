using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Service.Errors;

namespace PermitScreen.Service.Endpoints;

/// <summary>The snapshot that a call asks for.</summary>
internal static class Snapshots
{
    /// <summary>The current snapshot, or that of the version asked for.</summary>
    /// <param name="catalogue">Catalogue.</param>
    /// <param name="asOf">Version asked for; null for a current answer.</param>
    /// <param name="structures">Names of the structures wanted; null for all.</param>
    /// <param name="cancellation">Ends the wait.</param>
    public static async Task<CatalogueSnapshot> ReadAsync(ICatalogue catalogue, long? asOf, IReadOnlyCollection<string>? structures, CancellationToken cancellation)
    {
        var current = await catalogue.CurrentAsync(null, cancellation);
        return asOf is not { } version || version == current.Version
            ? current
            : await catalogue.AsOfAsync(version, structures, cancellation) ?? throw BadRequests.NoVersion("as_of_version", version, current.Version);
    }
}

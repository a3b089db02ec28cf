namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Gives the catalogue to those who screen.</summary>
public interface ICatalogue
{
    /// <summary>
    /// A current snapshot: of a version not older than the newest one committed before the call, proved by reading the version from the records
    /// after the call was made.
    /// </summary>
    /// <param name="leastVersion">A version that the snapshot must have reached; null where none is asked for. Waits for it.</param>
    /// <param name="cancellation">Ends the wait.</param>
    /// <exception cref="CatalogueUnavailableException">The version could not be confirmed.</exception>
    Task<CatalogueSnapshot> CurrentAsync(long? leastVersion, CancellationToken cancellation);

    /// <summary>A snapshot of an earlier version; null where there is no such version.</summary>
    /// <param name="version">Catalogue version.</param>
    /// <param name="structures">Names of the structures wanted; null for all. With names the snapshot has no others.</param>
    /// <param name="cancellation">Ends the reading.</param>
    /// <exception cref="CatalogueUnavailableException">The records could not be read.</exception>
    Task<CatalogueSnapshot?> AsOfAsync(long version, IReadOnlyCollection<string>? structures, CancellationToken cancellation);
}

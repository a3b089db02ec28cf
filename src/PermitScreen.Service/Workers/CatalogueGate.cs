using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Service.Workers;

/// <summary>Stands before the catalogue while it is loaded: calls that come early wait within their deadline, and are told where it cannot be loaded. Thread-safe.</summary>
/// <param name="catalogue">The catalogue.</param>
internal sealed class CatalogueGate(CurrentCatalogue catalogue) : ICatalogue
{
    private readonly TaskCompletionSource _loaded = new(TaskCreationOptions.RunContinuationsAsynchronously);

    /// <summary>Whether it is loaded.</summary>
    public bool Ready => _loaded.Task.IsCompletedSuccessfully;

    /// <inheritdoc/>
    public async Task<CatalogueSnapshot> CurrentAsync(long? leastVersion, CancellationToken cancellation)
    {
        await _loaded.Task.WaitAsync(cancellation);
        return await catalogue.CurrentAsync(leastVersion, cancellation);
    }

    /// <inheritdoc/>
    public async Task<CatalogueSnapshot?> AsOfAsync(long version, IReadOnlyCollection<string>? structures, CancellationToken cancellation)
    {
        await _loaded.Task.WaitAsync(cancellation);
        return await catalogue.AsOfAsync(version, structures, cancellation);
    }

    /// <summary>Brings the snapshot up to what was committed.</summary>
    /// <param name="cancellation">Ends the wait.</param>
    public async Task RefreshAsync(CancellationToken cancellation)
    {
        if (Ready)
        {
            await catalogue.RefreshAsync(cancellation);
        }
    }

    /// <summary>It is loaded.</summary>
    public void Open() => _loaded.TrySetResult();

    /// <summary>It cannot be loaded.</summary>
    /// <param name="reason">Why.</param>
    public void Refuse(Exception reason) => _loaded.TrySetException(new CatalogueUnavailableException("The catalogue could not be read.", reason));
}

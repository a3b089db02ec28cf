namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Holds the newest snapshot; calls that come before the first one wait for it. Thread-safe.</summary>
public sealed class CatalogueHolder : ICatalogue
{
    private readonly TaskCompletionSource<CatalogueSnapshot> _first = new(TaskCreationOptions.RunContinuationsAsynchronously);
    private volatile CatalogueSnapshot? _newest;

    /// <summary>Whether there is a snapshot.</summary>
    public bool Ready => _newest is not null;

    /// <inheritdoc/>
    public Task<CatalogueSnapshot> CurrentAsync(CancellationToken cancellation) =>
        _newest is { } newest ? Task.FromResult(newest) : _first.Task.WaitAsync(cancellation);

    /// <summary>There will be no snapshot: calls that wait are told so.</summary>
    /// <param name="reason">Why.</param>
    public void Refuse(Exception reason) => _first.TrySetException(new CatalogueUnavailableException(reason));

    /// <summary>Makes a snapshot the newest one.</summary>
    /// <param name="snapshot">Snapshot.</param>
    public void Publish(CatalogueSnapshot snapshot)
    {
        _newest = snapshot;
        _first.TrySetResult(snapshot);
    }
}

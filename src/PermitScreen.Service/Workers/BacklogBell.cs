namespace PermitScreen.Service.Workers;

/// <summary>Wakes the worker when lines were put on the backlog. Thread-safe.</summary>
internal sealed class BacklogBell : IDisposable
{
    private readonly SemaphoreSlim _rung = new(0, 1);
    private readonly Lock _gate = new();

    /// <summary>There may be work.</summary>
    public void Ring()
    {
        lock (_gate)
        {
            if (_rung.CurrentCount == 0)
            {
                _rung.Release();
            }
        }
    }

    /// <summary>Waits until it rings, or for a time.</summary>
    /// <param name="most">Longest wait.</param>
    /// <param name="cancellation">Ends the wait.</param>
    public Task WaitAsync(TimeSpan most, CancellationToken cancellation) => _rung.WaitAsync(most, cancellation);

    /// <inheritdoc/>
    public void Dispose() => _rung.Dispose();
}

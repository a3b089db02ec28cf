using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>
/// Reads the newest version for many callers at once: one read serves all callers that came before it was issued. Whoever comes while a read runs
/// waits for the next one, because the running read may have looked before the newest commit. Thread-safe.
/// </summary>
/// <param name="read">Reads the version from the records.</param>
/// <param name="life">Ends all reading.</param>
public sealed class VersionConfirmation(Func<CancellationToken, Task<VersionStamp>> read, CancellationToken life)
{
    private readonly Lock _gate = new();
    private TaskCompletionSource<VersionStamp>? _next;
    private bool _reading;
    private long _reads;

    /// <summary>Number of reads issued.</summary>
    public long Reads => Interlocked.Read(ref _reads);

    /// <summary>The newest version, read after this call.</summary>
    /// <param name="cancellation">Ends this caller's wait; the read goes on for the others.</param>
    public Task<VersionStamp> ConfirmAsync(CancellationToken cancellation)
    {
        Task<VersionStamp> mine;
        lock (_gate)
        {
            _next ??= new TaskCompletionSource<VersionStamp>(TaskCreationOptions.RunContinuationsAsynchronously);
            mine = _next.Task;
            if (!_reading)
            {
                // Not on the caller's thread: it would go on reading for those who come after it.
                _reading = true;
                _ = Task.Run(ReadWhileAskedAsync, CancellationToken.None);
            }
        }

        return mine.WaitAsync(cancellation);
    }

    private async Task ReadWhileAskedAsync()
    {
        while (TakeNext() is { } callers)
        {
            Interlocked.Increment(ref _reads);
            try
            {
                callers.SetResult(await read(life));
            }
            catch (OperationCanceledException) when (life.IsCancellationRequested)
            {
                callers.SetCanceled(life);
            }
            catch (Exception trouble)
            {
                // Theirs to judge; the next callers get a read of their own.
                callers.SetException(trouble);
            }
        }
    }

    /// <summary>Closes the list of callers before their read is issued; null where nobody waits.</summary>
    private TaskCompletionSource<VersionStamp>? TakeNext()
    {
        lock (_gate)
        {
            var callers = _next;
            _next = null;
            _reading = callers is not null;
            return callers;
        }
    }
}

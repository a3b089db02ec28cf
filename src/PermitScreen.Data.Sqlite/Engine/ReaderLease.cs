namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>A connection taken from the pool, with an open transaction. One that is not given back was stopped by an error, and is closed.</summary>
/// <param name="pool">Pool.</param>
/// <param name="database">Connection.</param>
internal sealed class ReaderLease(ReaderPool pool, Database database) : IDisposable
{
    private bool _over;

    /// <summary>Connection.</summary>
    public Database Database => database;

    /// <summary>Ends the transaction and gives the connection back; no query may be open.</summary>
    public void GiveBack()
    {
        database.Guarded(d => d.Run("COMMIT"));
        _over = true;
        pool.Return(database);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        if (!_over)
        {
            _over = true;
            database.Dispose();
        }
    }
}

using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>The one connection that writes: one writer at a time, everything of a piece of work in one transaction, or nothing.</summary>
/// <param name="open">Opens a connection.</param>
/// <param name="probe">Told of the moments at which a process may end.</param>
internal sealed class Writer(Func<Database> open, IStoreProbe? probe) : IDisposable
{
    private readonly SemaphoreSlim _gate = new(1, 1);
    private Database? _database = open();
    private bool _closed;

    /// <summary>Does a piece of work in one transaction.</summary>
    /// <param name="what">What is done, for the probe.</param>
    /// <param name="work">The work; returns its result and whether anything is to be kept.</param>
    /// <param name="cancellation">Ends the wait for other writers; work that has begun is finished.</param>
    /// <exception cref="StoreException">The file cannot be written; nothing was changed.</exception>
    public Task<T> WriteAsync<T>(string what, Func<Database, (T Result, bool Keep)> work, CancellationToken cancellation) =>
        AloneAsync(database => InTransaction(database, what, work), cancellation);

    /// <summary>Does something while nobody else writes.</summary>
    /// <param name="work">The work.</param>
    /// <param name="cancellation">Ends the wait for other writers.</param>
    public async Task<T> AloneAsync<T>(Func<Database, T> work, CancellationToken cancellation)
    {
        await _gate.WaitAsync(cancellation);
        try
        {
            ObjectDisposedException.ThrowIf(_closed, this);
            _database ??= open();
            return _database.Guarded(work);
        }
        finally
        {
            CloseIfStuck();
            _gate.Release();
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        // A write that is running is finished first. Whoever waits behind it is turned away one after the other, and needs the gate for that.
        _gate.Wait();
        _closed = true;
        Close();
        _gate.Release();
    }

    private T InTransaction<T>(Database database, string what, Func<Database, (T Result, bool Keep)> work)
    {
        database.Run("BEGIN IMMEDIATE");
        T result;
        try
        {
            (result, var keep) = work(database);
            if (!keep)
            {
                database.Run("ROLLBACK");
                return result;
            }

            probe?.Reached(StoreMoment.InsideTransaction, what);
            database.Run("COMMIT");
        }
        catch
        {
            RollBack(database);
            throw;
        }

        probe?.Reached(StoreMoment.AfterCommit, what);
        return result;
    }

    /// <summary>SQLite rolls back by itself after some errors, for instance on a full device.</summary>
    private void RollBack(Database database)
    {
        if (!database.InTransaction)
        {
            return;
        }

        try
        {
            database.Run("ROLLBACK");
        }
        catch (SqliteException)
        {
            // The error that led here is the one to be told; closing the connection rolls back for certain.
            Close();
        }
    }

    private void CloseIfStuck()
    {
        if (_database is { InTransaction: true })
        {
            Close();
        }
    }

    private void Close()
    {
        _database?.Dispose();
        _database = null;
    }
}

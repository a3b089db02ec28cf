using System.Collections.Concurrent;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>Connections that read; the writer never blocks them. Thread-safe.</summary>
/// <param name="open">Opens a connection.</param>
internal sealed class ReaderPool(Func<Database> open) : IDisposable
{
    private const int MostKept = 16;

    private readonly ConcurrentBag<Database> _idle = [];
    private volatile bool _closed;

    /// <summary>Reads in one transaction: everything is of one instant.</summary>
    /// <param name="read">Reads.</param>
    /// <exception cref="StoreException">The file cannot be read.</exception>
    public T Read<T>(Func<Database, T> read)
    {
        using var lease = Rent();
        var result = lease.Database.Guarded(read);
        lease.GiveBack();
        return result;
    }

    /// <summary>Takes a connection with an open transaction.</summary>
    public ReaderLease Rent()
    {
        ObjectDisposedException.ThrowIf(_closed, this);
        var database = _idle.TryTake(out var idle) ? idle : open();
        try
        {
            database.Guarded(d => d.Run("BEGIN"));
            return new ReaderLease(this, database);
        }
        catch (StoreException)
        {
            database.Dispose();
            throw;
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _closed = true;
        while (_idle.TryTake(out var database))
        {
            database.Dispose();
        }
    }

    /// <summary>Takes a sound connection back.</summary>
    /// <param name="database">Connection without an open transaction.</param>
    internal void Return(Database database)
    {
        if (_closed || _idle.Count >= MostKept)
        {
            database.Dispose();
            return;
        }

        _idle.Add(database);
        if (_closed)
        {
            Dispose();
        }
    }
}

using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Lines;

/// <summary>Lines in SQLite. A cache: a damaged file is as good as an empty one, and is replaced at the next write.</summary>
internal sealed class SqliteLines : ILineStore, IDisposable
{
    private readonly SqliteSettings _settings;
    private readonly ReaderWriterLockSlim _swap = new();
    private readonly Lock _writing = new();

    // Null after a replacement that failed: there are no lines then, and the next write tries again.
    private LinesFile? _file;

    /// <summary>Opens the file; sets aside one that cannot be used.</summary>
    /// <param name="settings">Settings.</param>
    public SqliteLines(SqliteSettings settings)
    {
        _settings = settings;
        (_file, WereLost) = LinesFile.OpenOrReplace(settings);
    }

    /// <summary>Whether the file was missing, or was replaced.</summary>
    public bool WereLost { get; private set; }

    /// <summary>Identity of the file, made with it; empty while there is no file.</summary>
    public string Id
    {
        get
        {
            _swap.EnterReadLock();
            try
            {
                return _file?.Id ?? "";
            }
            finally
            {
                _swap.ExitReadLock();
            }
        }
    }

    /// <inheritdoc/>
    public byte[]? Find(Digest key) => Read<byte[]?>(
        database =>
        {
            using var rows = database.Query(LinesFile.Table, "SELECT blob FROM lines WHERE key = $1", key.ToArray());
            return rows.Next() ? rows.Bytes(0) : null;
        },
        damaged: null);

    /// <inheritdoc/>
    public void Keep(IReadOnlyList<(Digest Key, byte[] Blob)> blobs) => Write(
        "keep lines",
        database =>
        {
            foreach (var (key, blob) in blobs)
            {
                database.Run("INSERT INTO lines (key, blob) VALUES ($1, $2) ON CONFLICT DO UPDATE SET blob = $2", key.ToArray(), blob);
            }
        });

    /// <inheritdoc/>
    public IReadOnlySet<Digest> Known(IReadOnlyCollection<Digest> keys) => Read<IReadOnlySet<Digest>>(
        database => keys.Where(k => database.Whole("SELECT EXISTS (SELECT 1 FROM lines WHERE key = $1)", k.ToArray()) == 1).ToHashSet(),
        damaged: ImmutableHashSet<Digest>.Empty);

    /// <inheritdoc/>
    public IReadOnlyList<Digest> AllKeys() => Read<IReadOnlyList<Digest>>(
        database =>
        {
            using var rows = database.Query(LinesFile.Table, "SELECT key FROM lines ORDER BY key");
            var found = new List<Digest>();
            while (rows.Next())
            {
                found.Add(rows.Digest(0));
            }

            return found;
        },
        damaged: []);

    /// <inheritdoc/>
    public long Count() => Read(database => database.Whole("SELECT count(*) FROM lines"), damaged: 0);

    /// <inheritdoc/>
    public void Delete(ImmutableArray<Digest> keys) => Write(
        "delete lines",
        database =>
        {
            foreach (var key in keys)
            {
                database.Run("DELETE FROM lines WHERE key = $1", key.ToArray());
            }
        });

    /// <inheritdoc/>
    public void Dispose()
    {
        lock (_writing)
        {
            _file?.Dispose();
        }

        _swap.Dispose();
    }

    private T Read<T>(Func<Database, T> read, T damaged)
    {
        _swap.EnterReadLock();
        try
        {
            return _file is { } file ? file.Readers.Read(read) : damaged;
        }
        catch (StoreException error) when (error.Trouble == StoreTrouble.Damaged)
        {
            return damaged;
        }
        finally
        {
            _swap.ExitReadLock();
        }
    }

    private void Write(string what, Action<Database> work)
    {
        lock (_writing)
        {
            try
            {
                (_file ?? Swap(() => LinesFile.OpenOrReplace(_settings).File)).Write(what, work);
            }
            catch (StoreException error) when (error.Trouble == StoreTrouble.Damaged)
            {
                Swap(() => LinesFile.Replace(_settings)).Write(what, work);
            }
        }
    }

    private LinesFile Swap(Func<LinesFile> open)
    {
        _swap.EnterWriteLock();
        try
        {
            WereLost = true;
            _file?.Dispose();
            _file = null;
            return _file = open();
        }
        finally
        {
            _swap.ExitWriteLock();
        }
    }
}

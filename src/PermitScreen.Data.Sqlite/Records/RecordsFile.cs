using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;
using PermitScreen.Data.Sqlite.Schema;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>The file of the records with its connections: one that writes, one that reads the version, and those that read all else.</summary>
internal sealed class RecordsFile : IDisposable
{
    /// <summary>Name of the file in its folder.</summary>
    public const string FileName = "catalogue.db";

    private const int WriterCacheKib = 256 * 1024;
    private const int PagesBetweenCheckpoints = 4000;

    private readonly SqliteSettings _settings;
    private readonly Lock _versionLock = new();
    private Database? _versionReader;

    private RecordsFile(SqliteSettings settings)
    {
        _settings = settings;
        Path = System.IO.Path.Combine(settings.Folder, FileName);
        Writer = new Writer(OpenWriter, settings.Probe);
        Readers = new ReaderPool(OpenReader);
    }

    /// <summary>The file.</summary>
    public string Path { get; }

    /// <summary>Settings.</summary>
    public SqliteSettings Settings => _settings;

    /// <summary>The one connection that writes.</summary>
    public Writer Writer { get; }

    /// <summary>Connections that read.</summary>
    public ReaderPool Readers { get; }

    /// <summary>Opens the records; makes them where there are none, and brings them to the newest schema.</summary>
    /// <param name="settings">Settings.</param>
    /// <param name="now">When, for the first audit entry.</param>
    /// <exception cref="StoreException">They cannot be used; they are as they were.</exception>
    public static RecordsFile Open(SqliteSettings settings, DateTimeOffset now)
    {
        using (var database = Database.Open(System.IO.Path.Combine(settings.Folder, FileName), SqliteOpenMode.ReadWriteCreate, settings.BusyTimeout))
        {
            database.Guarded(d => Prepare(d, settings, now));
        }

        return new RecordsFile(settings);
    }

    /// <summary>Reads the newest version; cheap enough for every call.</summary>
    public VersionRow ReadVersion()
    {
        lock (_versionLock)
        {
            try
            {
                _versionReader ??= OpenReader();
                return _versionReader.Guarded(VersionRow.Read);
            }
            catch (StoreException)
            {
                _versionReader?.Dispose();
                _versionReader = null;
                throw;
            }
        }
    }

    /// <summary>Reads in one transaction.</summary>
    /// <param name="read">Reads.</param>
    /// <param name="cancellation">Looked at before.</param>
    public Task<T> ReadAsync<T>(Func<Database, T> read, CancellationToken cancellation) => OnThisThread(() => Readers.Read(read), cancellation);

    /// <summary>Reads on the caller's thread: reading waits for nothing but the device.</summary>
    /// <param name="read">Reads.</param>
    /// <param name="cancellation">Looked at before.</param>
    public static Task<T> OnThisThread<T>(Func<T> read, CancellationToken cancellation)
    {
        if (cancellation.IsCancellationRequested)
        {
            return Task.FromCanceled<T>(cancellation);
        }

        try
        {
            return Task.FromResult(read());
        }
        catch (StoreException error)
        {
            return Task.FromException<T>(error);
        }
    }

    /// <summary>Opens a connection that reads.</summary>
    public Database OpenReader()
    {
        var database = Database.Open(Path, SqliteOpenMode.ReadWrite, _settings.BusyTimeout);
        database.Pragma("query_only = ON");
        return database;
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        Readers.Dispose();
        lock (_versionLock)
        {
            _versionReader?.Dispose();
            _versionReader = null;
        }

        // The last connection moves everything from the log into the file.
        Writer.Dispose();
    }

    private static VersionRow Prepare(Database database, SqliteSettings settings, DateTimeOffset now)
    {
        var migrator = new Migrator(SchemaScripts.Records, settings.Probe);
        int schema;
        try
        {
            schema = migrator.Recognise(database);
        }
        catch
        {
            database.LeaveAsItIs();
            throw;
        }

        if (schema == 0)
        {
            database.Pragma(FormattableString.Invariant($"page_size = {Migrator.PageSizeBytes}"));
        }

        Tune(database, settings);
        if (schema > 0 && new FileInfo(database.File).Length <= settings.CheckPagesUpToBytes)
        {
            PageCheck.Demand(database);
        }

        migrator.Migrate(database, schema, d => Beginning.Write(d, now));
        return VersionRow.Read(database);
    }

    private Database OpenWriter()
    {
        var database = Database.Open(Path, SqliteOpenMode.ReadWrite, _settings.BusyTimeout);
        try
        {
            return database.Guarded(d =>
            {
                Tune(d, _settings);
                return d;
            });
        }
        catch
        {
            database.Dispose();
            throw;
        }
    }

    private static void Tune(Database database, SqliteSettings settings)
    {
        database.Pragma("journal_mode = WAL");

        // A change that was acknowledged must outlive a loss of power: with NORMAL the newest ones might not.
        database.Pragma(settings.Temporary ? "synchronous = OFF" : "synchronous = FULL");
        database.Pragma("foreign_keys = ON");
        database.Pragma("journal_size_limit = 67108864");

        // Contents are found by hash, so that an import touches pages all over the file: they are to stay in memory until its transaction ends.
        database.Pragma(FormattableString.Invariant($"cache_size = -{WriterCacheKib}"));
        database.Pragma(FormattableString.Invariant($"wal_autocheckpoint = {PagesBetweenCheckpoints}"));
        if (settings.MostPages is { } most)
        {
            database.Pragma(FormattableString.Invariant($"max_page_count = {most}"));
        }
    }
}

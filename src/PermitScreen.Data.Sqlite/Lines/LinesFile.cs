using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Schema;

namespace PermitScreen.Data.Sqlite.Lines;

/// <summary>The file of the lines with its connections. For one writer at a time.</summary>
internal sealed class LinesFile : IDisposable
{
    /// <summary>Name of the file in its folder.</summary>
    public const string FileName = "lines.db";

    /// <summary>Table.</summary>
    public const string Table = "lines";

    private const string AsideSuffix = ".damaged";
    private const int GuidLength = 16;

    private readonly Database _writer;
    private readonly IStoreProbe? _probe;

    private LinesFile(Database writer, string id, SqliteSettings settings)
    {
        _writer = writer;
        Id = id;
        _probe = settings.Probe;
        Readers = new ReaderPool(() =>
        {
            var database = Database.Open(writer.File, SqliteOpenMode.ReadWrite, settings.BusyTimeout);
            database.Pragma("query_only = ON");
            return database;
        });
    }

    /// <summary>Identity, made at random with the file.</summary>
    public string Id { get; }

    /// <summary>Connections that read.</summary>
    public ReaderPool Readers { get; }

    /// <summary>Opens the file. One that is damaged, foreign or of another schema is set aside.</summary>
    /// <param name="settings">Settings.</param>
    /// <returns>The file, and whether it is a new one.</returns>
    public static (LinesFile File, bool New) OpenOrReplace(SqliteSettings settings)
    {
        try
        {
            return Open(settings);
        }
        catch (StoreException error) when (error.Trouble is StoreTrouble.Damaged or StoreTrouble.NewerSchema or StoreTrouble.Other)
        {
            return (Replace(settings), true);
        }
    }

    /// <summary>Sets the file aside and makes another.</summary>
    /// <param name="settings">Settings.</param>
    public static LinesFile Replace(SqliteSettings settings)
    {
        var path = Path.Combine(settings.Folder, FileName);
        try
        {
            if (File.Exists(path))
            {
                File.Move(path, path + AsideSuffix, overwrite: true);
            }

            File.Delete(path + "-wal");
            File.Delete(path + "-shm");
        }
        catch (Exception error) when (StoreErrors.IsOfFile(error))
        {
            throw StoreErrors.Translate(error, path);
        }

        return Open(settings).File;
    }

    /// <summary>Writes in one transaction.</summary>
    /// <param name="what">What is done, for the probe.</param>
    /// <param name="work">Writes.</param>
    public void Write(string what, Action<Database> work) => _writer.Guarded(database =>
    {
        database.Run("BEGIN IMMEDIATE");
        try
        {
            work(database);
            _probe?.Reached(StoreMoment.LinesInsideTransaction, what);
            database.Run("COMMIT");
        }
        catch
        {
            if (database.InTransaction)
            {
                database.Run("ROLLBACK");
            }

            throw;
        }

        _probe?.Reached(StoreMoment.LinesAfterCommit, what);
        return true;
    });

    /// <inheritdoc/>
    public void Dispose()
    {
        Readers.Dispose();
        _writer.Dispose();
    }

    private static (LinesFile File, bool New) Open(SqliteSettings settings)
    {
        var database = Database.Open(Path.Combine(settings.Folder, FileName), SqliteOpenMode.ReadWriteCreate, settings.BusyTimeout);
        try
        {
            var (schema, id) = database.Guarded(d => (Prepare(d, settings), ReadId(d)));
            return (new LinesFile(database, id, settings), schema == 0);
        }
        catch
        {
            database.Dispose();
            throw;
        }
    }

    private static int Prepare(Database database, SqliteSettings settings)
    {
        var migrator = new Migrator(SchemaScripts.Lines, settings.Probe);
        var schema = migrator.Recognise(database);
        if (schema == 0)
        {
            database.Pragma(FormattableString.Invariant($"page_size = {Migrator.PageSizeBytes}"));
        }

        database.Pragma("journal_mode = WAL");

        // What a loss of power takes is computed anew.
        database.Pragma(settings.Temporary ? "synchronous = OFF" : "synchronous = NORMAL");
        migrator.Migrate(database, schema, static d => d.Run("INSERT INTO identity (id, value) VALUES (1, $1)", Guid.NewGuid().ToByteArray(bigEndian: true)));
        return schema;
    }

    private static string ReadId(Database database)
    {
        using var rows = database.Query("identity", "SELECT value FROM identity WHERE id = 1");
        return rows.Next() ? new Guid(rows.Bytes(0, GuidLength), bigEndian: true).ToString("N") : throw rows.Damaged("the one row", "it is missing");
    }
}

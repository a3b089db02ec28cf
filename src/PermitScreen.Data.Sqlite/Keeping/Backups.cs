using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Records;
using PermitScreen.Data.Sqlite.Rows;
using PermitScreen.Data.Sqlite.Schema;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>Makes backups and checks them. A backup is one file, and a database by itself.</summary>
/// <param name="file">Records.</param>
internal sealed class Backups(RecordsFile file)
{
    /// <summary>Copy that is checked; one that a process left behind is removed when the records are opened.</summary>
    public const string CheckingName = "catalogue.checking";

    private const string PartSuffix = ".part";

    /// <summary>Makes a backup; it is checked before it gets its name.</summary>
    /// <param name="path">File to be made.</param>
    /// <param name="cancellation">Ends the copying.</param>
    public VersionStamp Make(string path, CancellationToken cancellation) => Write(path, part => Finish(part, cancellation), cancellation);

    /// <summary>Copies the records page by page as they are, damaged ones too: what a restore replaces must be kept even where it is no sound backup.</summary>
    /// <param name="path">File to be made.</param>
    /// <returns>Whether what was copied is sound.</returns>
    public bool Keep(string path) => Write(path, FinishAsItIs, CancellationToken.None);

    /// <summary>Checks a backup.</summary>
    /// <param name="path">File.</param>
    /// <param name="cancellation">Ends the reading.</param>
    public VersionStamp Check(string path, CancellationToken cancellation)
    {
        DemandFile(path);
        int schema;
        using (var database = Database.Open(path, SqliteOpenMode.ReadOnly, file.Settings.BusyTimeout))
        {
            schema = database.Guarded(d => Recognise(d));
            if (schema == SchemaScripts.Records.Newest)
            {
                return database.Guarded(d => Verify(d, cancellation));
            }
        }

        // One of an older schema is read as it would be after a restore.
        var copy = Path.Combine(file.Settings.Folder, CheckingName);
        try
        {
            using var database = OpenCopy(path, copy);
            return database.Guarded(d => Verify(d, cancellation));
        }
        finally
        {
            Remove(copy);
        }
    }

    /// <summary>Copies a backup and brings the copy to the newest schema.</summary>
    /// <param name="path">Backup.</param>
    /// <param name="copy">File to be made, in place of one that is there.</param>
    public Database OpenCopy(string path, string copy)
    {
        DemandFile(path);
        Remove(copy);
        File.Copy(path, copy);
        File.SetAttributes(copy, FileAttributes.Normal);
        var database = Database.Open(copy, SqliteOpenMode.ReadWrite, file.Settings.BusyTimeout);
        try
        {
            return database.Guarded(d =>
            {
                var schema = Recognise(d);
                d.Pragma("journal_mode = DELETE");
                new Migrator(SchemaScripts.Records, probe: null).Migrate(d, schema, static _ => { });
                return d;
            });
        }
        catch
        {
            database.Dispose();
            throw;
        }
    }

    /// <summary>Removes a file and what SQLite may have left beside it.</summary>
    /// <param name="path">File.</param>
    public static void Remove(string path)
    {
        foreach (var name in new[] { path, path + "-journal", path + "-wal", path + "-shm" })
        {
            File.Delete(name);
        }
    }

    private static void RemoveIfThere(string path)
    {
        if (File.Exists(path))
        {
            Remove(path);
        }
    }

    private static int Recognise(Database database)
    {
        var schema = new Migrator(SchemaScripts.Records, probe: null).Recognise(database);
        return schema > 0 ? schema : throw new StoreException(StoreTrouble.Other, $"{database.File} is no backup: it is empty. Nothing was changed. Name a file that was made by a backup.");
    }

    private static VersionStamp Verify(Database database, CancellationToken cancellation)
    {
        Verification.Demand(database, cancellation);
        return VersionRow.Read(database).Stamp;
    }

    private static void DemandFile(string path)
    {
        if (!File.Exists(path))
        {
            throw new StoreException(StoreTrouble.NotAllowed, $"There is no file {path}. Nothing was changed. Name a file that was made by a backup.");
        }
    }

    private T Write<T>(string path, Func<string, T> finish, CancellationToken cancellation)
    {
        if (File.Exists(path))
        {
            throw new StoreException(StoreTrouble.NotAllowed, $"{path} is there already and was not overwritten. Choose another name for the backup.");
        }

        var part = path + PartSuffix;
        try
        {
            Remove(part);
            Copy(part, cancellation);
            var result = finish(part);
            File.Move(part, path);
            ForceName(path);
            return result;
        }
        catch (Exception error)
        {
            RemoveIfThere(part);
            if (StoreErrors.IsOfFile(error))
            {
                throw StoreErrors.Translate(error, path);
            }

            throw;
        }
    }

    private void Copy(string part, CancellationToken cancellation)
    {
        using var lease = file.Readers.Rent();

        // The first read fixes the instant; writers go on beside it. It reads the schema only, so that damaged records can be copied.
        lease.Database.Guarded(d => d.Whole("SELECT count(*) FROM sqlite_schema"));
        using (var target = Database.Open(part, SqliteOpenMode.ReadWriteCreate, file.Settings.BusyTimeout))
        {
            target.Guarded(t =>
            {
                PageCopy.Run(lease.Database, t, () =>
                {
                    cancellation.ThrowIfCancellationRequested();
                    file.Settings.Probe?.Reached(StoreMoment.InBackup, Path.GetFileName(part));
                });
                return true;
            });
        }

        lease.GiveBack();
    }

    private VersionStamp Finish(string part, CancellationToken cancellation)
    {
        using var database = Database.Open(part, SqliteOpenMode.ReadWrite, file.Settings.BusyTimeout);
        return database.Guarded(d =>
        {
            d.Pragma("journal_mode = DELETE");
            return Verify(d, cancellation);
        });
    }

    private bool FinishAsItIs(string part)
    {
        try
        {
            Finish(part, CancellationToken.None);
            return true;
        }
        catch (StoreException error) when (error.Trouble is StoreTrouble.Damaged or StoreTrouble.Other)
        {
            return false;
        }
    }

    /// <summary>
    /// A file's new name outlives a loss of power once its folder was forced to the device, which .NET cannot do. SQLite does it whenever it makes and
    /// deletes a journal beside a file, so that the smallest of all writes is enough.
    /// </summary>
    private void ForceName(string path)
    {
        using var database = Database.Open(path, SqliteOpenMode.ReadWrite, file.Settings.BusyTimeout);
        database.Guarded(d =>
        {
            d.Pragma("synchronous = EXTRA");
            d.Pragma(FormattableString.Invariant($"user_version = {d.Whole("PRAGMA user_version")}"));
            return true;
        });
    }
}

using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Imports;
using PermitScreen.Data.Sqlite.Keeping;
using PermitScreen.Data.Sqlite.Lines;
using PermitScreen.Data.Sqlite.Records;

namespace PermitScreen.Data.Sqlite;

/// <summary>The records of one installation in a folder, held by this process until disposed.</summary>
public sealed class SqliteRecords : IAsyncDisposable
{
    private const string SegmentName = "catalogue.segment";

    /// <summary>What a process may have left behind that ended while it made, received or checked a backup.</summary>
    private static readonly string[] Leftovers = ["backup-*.tmp*", "restore-*.tmp*", Backups.CheckingName + "*"];

    private readonly SqliteSettings _settings;
    private readonly FolderLock _lock;
    private readonly RecordsFile _file;
    private readonly SqliteLines _lines;

    private SqliteRecords(SqliteSettings settings, FolderLock folderLock, RecordsFile file, SqliteLines lines)
    {
        _settings = settings;
        _lock = folderLock;
        _file = file;
        _lines = lines;
        Catalogue = new SqliteCatalogue(file);
        Imports = new SqliteImports(file);
        Backlog = new SqliteBacklog(file);
        Keeping = new SqliteKeeping(file);
    }

    /// <summary>Versions, revisions, change sets, audit log.</summary>
    public ICatalogueStore Catalogue { get; }

    /// <summary>Imports.</summary>
    public IImportStore Imports { get; }

    /// <summary>Lines that are to be computed.</summary>
    public IBacklogStore Backlog { get; }

    /// <summary>Lines that are kept.</summary>
    public ILineStore Lines => _lines;

    /// <summary>Verification, backup, restore.</summary>
    public IRecordKeeping Keeping { get; }

    /// <summary>Where the copy of the newest version for a quick start is to be; written by others.</summary>
    public string SegmentPath => Path.Combine(_settings.Folder, SegmentName);

    /// <summary>Whether the file of the lines was missing, damaged or of another schema, so that it was made anew; what was there is kept beside it.</summary>
    public bool LinesWereLost => _lines.WereLost;

    /// <summary>
    /// Identity of the file of the lines, made at random with it: another one than before says that the lines were lost. It is current also where
    /// the file was replaced while this was running; empty while there is no file because a replacement failed.
    /// </summary>
    public string LinesId => _lines.Id;

    /// <summary>File of the records, for tests of what happens to it.</summary>
    internal RecordsFile File => _file;

    /// <summary>Opens the records of a folder; makes them where there are none, and brings them to the newest schema.</summary>
    /// <param name="settings">Where they are and how they are kept.</param>
    /// <param name="now">When, for the first audit entry.</param>
    /// <exception cref="StoreException">They cannot be used, or another process uses them; they are as they were.</exception>
    public static SqliteRecords Open(SqliteSettings settings, DateTimeOffset now)
    {
        var folderLock = FolderLock.Take(settings.Folder);
        RecordsFile? file = null;
        try
        {
            RemoveLeftovers(settings.Folder);
            file = RecordsFile.Open(settings, now);
            return new SqliteRecords(settings, folderLock, file, new SqliteLines(settings));
        }
        catch
        {
            file?.Dispose();
            folderLock.Dispose();
            throw;
        }
    }

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        _lines.Dispose();
        _file.Dispose();
        _lock.Dispose();
        if (_settings.Temporary)
        {
            Directory.Delete(_settings.Folder, recursive: true);
        }

        return ValueTask.CompletedTask;
    }

    private static void RemoveLeftovers(string folder)
    {
        try
        {
            Backups.Remove(Path.Combine(folder, Restore.ReadyName));
            foreach (var file in Leftovers.SelectMany(pattern => Directory.GetFiles(folder, pattern)))
            {
                System.IO.File.Delete(file);
            }
        }
        catch (Exception error) when (StoreErrors.IsOfFile(error))
        {
            throw StoreErrors.Translate(error, folder);
        }
    }
}

using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Records;
using SQLitePCL;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>Says in plain words what went wrong with a file, and how to mend it.</summary>
internal static class StoreErrors
{
    private const int NoSpaceLeft = 28; // ENOSPC of POSIX
    private const int ReadOnlyDevice = 30; // EROFS of POSIX
    private const int QuotaExceeded = 122; // EDQUOT of Linux
    private const int IoErrorNoMemory = raw.SQLITE_IOERR | (12 << 8);
    private const int IoErrorShortRead = raw.SQLITE_IOERR | (2 << 8);
    private const int IoErrorShmSize = raw.SQLITE_IOERR | (19 << 8);

    /// <summary>Whether an error is about a file.</summary>
    /// <param name="error">What was thrown.</param>
    public static bool IsOfFile(Exception error) => error is SqliteException or UnauthorizedAccessException or IOException;

    /// <summary>The error as the store tells it.</summary>
    /// <param name="error">What was thrown; about a file.</param>
    /// <param name="file">File.</param>
    public static StoreException Translate(Exception error, string file) => error switch
    {
        SqliteException sqlite => new StoreException(TroubleOf(sqlite), Message(TroubleOf(sqlite), file, sqlite.Message), sqlite),
        UnauthorizedAccessException denied => new StoreException(StoreTrouble.NotAllowed, Message(StoreTrouble.NotAllowed, file, denied.Message), denied),
        IOException io => new StoreException(TroubleOf(io), Message(TroubleOf(io), file, io.Message), io),
        _ => new StoreException(StoreTrouble.Other, Message(StoreTrouble.Other, file, error.Message), error),
    };

    /// <summary>A record that is damaged.</summary>
    /// <param name="file">File.</param>
    /// <param name="table">Table.</param>
    /// <param name="key">Key of the record.</param>
    /// <param name="what">What does not fit.</param>
    public static StoreException Damaged(string file, string table, string key, string what) =>
        new(StoreTrouble.Damaged, $"{file} is damaged: table {table}, {key}: {what}. It was not used, and nothing was changed. {Mend(StoreTrouble.Damaged)}");

    /// <summary>A message of the form: file, what happened, that nothing was changed, how to mend it.</summary>
    /// <param name="trouble">What happened.</param>
    /// <param name="file">File.</param>
    /// <param name="detail">Words of whoever noticed it.</param>
    public static string Message(StoreTrouble trouble, string file, string detail)
    {
        var what = trouble switch
        {
            StoreTrouble.Locked => "is held by another process",
            StoreTrouble.Full => "cannot grow: no room is left on the device",
            StoreTrouble.Damaged => "is damaged or is no database of PermitScreen",
            StoreTrouble.NewerSchema => "was written by a newer version of PermitScreen",
            StoreTrouble.NotAllowed => "may not be read or written",
            StoreTrouble.Device => "cannot be read or written: the device failed",
            _ => "cannot be used",
        };
        return $"{file} {what} ({detail.TrimEnd('.')}). Nothing was changed. {Mend(trouble)}";
    }

    private static string Mend(StoreTrouble trouble) => trouble switch
    {
        StoreTrouble.Locked => "Stop the other process, or speak to it with --server.",
        StoreTrouble.Full => "Make room and try again; the service need not be started anew.",
        StoreTrouble.Damaged =>
            "Verify the records, and restore the newest sound backup. Where the records cannot be opened, put the backup in their place: " +
            $"move {RecordsFile.FileName}, {RecordsFile.FileName}-wal and {RecordsFile.FileName}-shm away and copy the backup to {RecordsFile.FileName}.",
        StoreTrouble.NewerSchema => "Use that version, or a backup made before it.",
        StoreTrouble.NotAllowed => "Give the account that runs PermitScreen the right to read and write the folder and its files.",
        StoreTrouble.Device => "Check the device, and restore the newest sound backup on another one if need be.",
        _ => "Look at the cause, mend it and try again.",
    };

    private static StoreTrouble TroubleOf(SqliteException error) => error.SqliteExtendedErrorCode switch
    {
        IoErrorShmSize => StoreTrouble.Full,
        IoErrorShortRead => StoreTrouble.Damaged,
        IoErrorNoMemory => StoreTrouble.Other,
        _ => error.SqliteErrorCode switch
        {
            raw.SQLITE_BUSY or raw.SQLITE_LOCKED => StoreTrouble.Locked,
            raw.SQLITE_FULL => StoreTrouble.Full,
            raw.SQLITE_CORRUPT or raw.SQLITE_NOTADB => StoreTrouble.Damaged,

            // Every statement is written so that sound records fit it: where a rule of the schema is broken, the records contradict themselves.
            raw.SQLITE_CONSTRAINT => StoreTrouble.Damaged,
            raw.SQLITE_IOERR => StoreTrouble.Device,
            raw.SQLITE_READONLY or raw.SQLITE_CANTOPEN or raw.SQLITE_PERM or raw.SQLITE_AUTH => StoreTrouble.NotAllowed,
            _ => StoreTrouble.Other,
        },
    };

    private static StoreTrouble TroubleOf(IOException error) => (error.HResult & 0xFFFF) switch
    {
        NoSpaceLeft or QuotaExceeded => StoreTrouble.Full,
        ReadOnlyDevice => StoreTrouble.NotAllowed,
        _ when error is DirectoryNotFoundException or FileNotFoundException or PathTooLongException => StoreTrouble.NotAllowed,
        _ => StoreTrouble.Device,
    };
}

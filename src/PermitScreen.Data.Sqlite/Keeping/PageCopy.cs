using Microsoft.Data.Sqlite;
using PermitScreen.Data.Sqlite.Engine;
using SQLitePCL;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>
/// Copies a database page by page by SQLite's backup interface: the target sees all of it at once, in one transaction of its own, or nothing. Unlike
/// VACUUM INTO it copies every page as it is, so that damage is copied and found by the check of the copy, and it can be interrupted between steps.
/// </summary>
internal static class PageCopy
{
    private const string Main = "main";
    private const int PagesAStep = 256;

    /// <summary>Copies.</summary>
    /// <param name="from">Source; where others write to it, in a transaction, so that the copy is of one instant and need not begin anew.</param>
    /// <param name="to">Target, without an open transaction.</param>
    /// <param name="betweenSteps">Called between steps; what it throws ends the copying, and the target is as it was.</param>
    public static void Run(Database from, Database to, Action betweenSteps)
    {
        var backup = raw.sqlite3_backup_init(to.Handle, Main, from.Handle, Main);
        if (backup is null || backup.IsInvalid)
        {
            throw Error(to, raw.sqlite3_errcode(to.Handle));
        }

        int result;
        try
        {
            while ((result = raw.sqlite3_backup_step(backup, PagesAStep)) == raw.SQLITE_OK)
            {
                betweenSteps();
            }
        }
        finally
        {
            raw.sqlite3_backup_finish(backup);
        }

        if (result != raw.SQLITE_DONE)
        {
            throw Error(to, result);
        }
    }

    private static SqliteException Error(Database to, int code) => new(raw.sqlite3_errmsg(to.Handle).utf8_to_string(), code & 0xFF, code);
}

using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>What must be known of records that are replaced, also where they are damaged.</summary>
/// <param name="Version">Newest version; that of the restored records must be newer.</param>
/// <param name="Words">The same for the audit log, with the newest audit entry.</param>
internal sealed record ReplacedRecords(long Version, string Words)
{
    // Far beyond every true version, far below the end of the numbers: a damaged number must not use up those that are left.
    private const long HighestCredible = 1L << 53;

    /// <summary>Reads it.</summary>
    /// <param name="database">Records.</param>
    /// <exception cref="StoreException">No version can be read in any way.</exception>
    public static ReplacedRecords Read(Database database)
    {
        try
        {
            var row = database.Guarded(VersionRow.Read);
            return new ReplacedRecords(
                row.Version, FormattableString.Invariant($"version {row.Version} whose newest audit entry {row.AuditSequence} has the hash {row.AuditHash}"));
        }
        catch (StoreException error) when (error.Trouble is StoreTrouble.Damaged or StoreTrouble.Other)
        {
            // The row may hold the number still, and the change sets hold it too; with the greater one no version is given twice.
            long?[] numbers = [Number(database, "SELECT version FROM version WHERE id = 1"), Number(database, "SELECT max(version) FROM change_sets")];
            if (numbers.Max() is not { } version)
            {
                throw;
            }

            return new ReplacedRecords(version, FormattableString.Invariant($"version {version} whose newest audit entry cannot be read"));
        }
    }

    private static long? Number(Database database, string sql)
    {
        try
        {
            return database.Guarded(d =>
            {
                using var rows = d.Query("version", sql);
                return rows.Next() && rows.WholeOrNull(0) is { } number and >= 0 and <= HighestCredible ? number : (long?)null;
            });
        }
        catch (StoreException error) when (error.Trouble is StoreTrouble.Damaged or StoreTrouble.Other)
        {
            return null;
        }
    }
}

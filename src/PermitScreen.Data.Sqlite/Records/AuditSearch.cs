using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Reads the audit log: without a gap, each entry linked to the one before, the newest as the version row has it.</summary>
internal static class AuditSearch
{
    /// <summary>Entries, newest first.</summary>
    /// <param name="database">Records.</param>
    /// <param name="before">Only those below this number; null for all.</param>
    /// <param name="most">How many at most.</param>
    public static IReadOnlyList<AuditEntry> Read(Database database, long? before, int most)
    {
        var newest = VersionRow.Read(database);
        var below = before is { } given && given <= newest.AuditSequence ? given : newest.AuditSequence + 1;
        var expected = below - 1;
        Digest? hash = expected == newest.AuditSequence ? newest.AuditHash : null;
        var found = new List<AuditEntry>();
        foreach (var row in AuditRow.Below(database, below, most))
        {
            if (row.Entry.Sequence != expected || (hash is { } known && row.Entry.Hash != known))
            {
                throw Broken(database, expected);
            }

            found.Add(row.Entry);
            expected--;
            hash = row.Previous;
        }

        return found.Count < most && expected > 0 ? throw Broken(database, expected) : found;
    }

    private static StoreException Broken(Database database, long sequence) =>
        StoreErrors.Damaged(database.File, "audit", FormattableString.Invariant($"entry {sequence}"), "it is missing or not the one that the next entry names");
}

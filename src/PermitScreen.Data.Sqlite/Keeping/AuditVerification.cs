using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>Follows the audit chain from its first entry to the one that the version row names.</summary>
internal static class AuditVerification
{
    /// <summary>Follows it.</summary>
    /// <param name="log">Takes problems.</param>
    /// <param name="knownHash">Hash that must occur; null where none is given.</param>
    public static void Run(VerificationLog log, Digest? knownHash)
    {
        var (sequence, hash, seen) = (0L, AuditRow.OfNothing, knownHash is null);
        log.Each("audit", AuditRow.Every, AuditRow.Read, row =>
        {
            var entry = row.Entry;
            log.Demand(entry.Sequence == sequence + 1, $"Audit entries between {sequence} and {entry.Sequence} are missing.");
            log.Demand(row.Hash() == entry.Hash, $"Audit entry {entry.Sequence} does not fit its hash.");
            log.Demand(row.Previous == hash, $"Audit entry {entry.Sequence} does not follow the entry before it.");
            log.Demand(
                entry.Version is not { } version || ChangeSetRow.Find(log.Database, version) is not null,
                $"Audit entry {entry.Sequence} tells of version {entry.Version}, which has no change set.");
            (sequence, hash) = (entry.Sequence, entry.Hash);
            seen |= entry.Hash == knownHash;
        });
        log.Demand(seen, $"No audit entry has the hash {knownHash} that was noted down outside: the log was cut off or made anew.");
        var newest = VersionRow.Read(log.Database);
        log.Demand(
            newest.AuditSequence == sequence && newest.AuditHash == hash,
            $"The audit log ends with entry {sequence}, and its newest entry must be {newest.AuditSequence} with the hash {newest.AuditHash}.");
    }
}

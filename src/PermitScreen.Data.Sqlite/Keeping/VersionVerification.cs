using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Records;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>Goes through the versions in order: each follows from the one before by the revisions that it began and ended, and its audit entry says the same.</summary>
internal static class VersionVerification
{
    private const string OfVersion =
        $"SELECT {RevisionRow.Columns} FROM revisions r WHERE r.from_version = $1 OR r.to_version = $1 ORDER BY r.kind, r.name, r.from_version";

    /// <summary>Goes through them.</summary>
    /// <param name="log">Takes problems.</param>
    public static void Run(VerificationLog log)
    {
        var (version, state) = (0L, default(StateSum));
        log.Each("change_sets", ChangeSetRow.Every, ChangeSetRow.Read, row =>
        {
            var head = row.Head;
            log.Demand(row.Previous == version, $"Version {head.Version} follows version {row.Previous}, and the version before it is {version}.");
            var found = Replay(log.Database, head.Version, state);
            log.Demand(found.State == row.State, $"The revisions of version {head.Version} do not add up to its state.");
            log.Demand(
                found.Added == head.Added && found.Revised == head.Revised && found.Removed == head.Removed,
                $"Version {head.Version} began and ended another number of revisions than its change set says.");
            Compare(log, head, found.Records);
            (version, state) = (head.Version, row.State);
        });
        var newest = VersionRow.Read(log.Database);
        log.Demand(newest.Version == version && newest.State == state, $"The newest version must be {newest.Version}; the newest change set is {version}, or its state is another.");
    }

    private static void Compare(VerificationLog log, ChangeSetHead head, Digest records)
    {
        if (AuditRow.OfVersion(log.Database, head.Version)?.Entry is not { } entry)
        {
            log.Problem(FormattableString.Invariant($"Version {head.Version} has no audit entry."));
            return;
        }

        log.Demand(entry.Action == head.Action && entry.Provenance == head.Provenance, $"The change set of version {head.Version} says something else than audit entry {entry.Sequence}.");
        log.Demand(entry.Records == records, $"The revisions of version {head.Version} are not those of audit entry {entry.Sequence}.");
    }

    private static (StateSum State, int Added, int Revised, int Removed, Digest Records) Replay(Database database, long version, StateSum state)
    {
        using var digest = new RecordsDigest();
        var (begun, ended, both) = (0, 0, 0);
        RevisionHead? before = null;
        using var rows = database.Query(RevisionRow.Table, OfVersion, version);
        while (rows.Next())
        {
            var head = RevisionRow.Read(rows);
            if (head.ToVersion == version)
            {
                state = state.Without(head);
                digest.AddEnded(head);
                ended++;
            }
            else
            {
                state = state.With(head);
                digest.AddBegun(head);
                begun++;
                both += before is not null && before.Kind == head.Kind && before.Name == head.Name ? 1 : 0;
            }

            before = head;
        }

        return (state, begun - both, both, ended - both, digest.Finish());
    }
}

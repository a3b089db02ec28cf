using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Writes a change set: the one place where catalogue versions and audit entries are made.</summary>
internal static class ChangeSetWriter
{
    /// <summary>Writes a change set with its revisions, its audit entry and its part of the backlog.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="before">What was newest.</param>
    /// <param name="version">Catalogue version that it makes.</param>
    /// <param name="action">What is done.</param>
    /// <param name="subject">To what.</param>
    /// <param name="provenance">Who, why, when.</param>
    /// <param name="changes">Changes, in order of kind and name (ordinal).</param>
    /// <returns>What is newest now.</returns>
    public static VersionRow Write(
        Database database, VersionRow before, long version, string action, string subject, Provenance provenance, IReadOnlyList<ResourceChange> changes)
    {
        var state = before.State;
        foreach (var change in changes)
        {
            state = change.Ended is { } ended ? state.Without(ended) : state;
            state = Begun(change, version, provenance) is { } begun ? state.With(begun) : state;
        }

        var head = new ChangeSetHead(
            version,
            action,
            provenance,
            changes.Count(c => c.Ended is null),
            changes.Count(c => c is { Ended: not null, Content: not null }),
            changes.Count(c => c.Content is null));
        new ChangeSetRow(head, before.Version, state).Insert(database);
        var records = WriteRevisions(database, version, provenance, changes);
        return Log(database, before with { Version = version, State = state }, action, subject, provenance, version, records);
    }

    /// <summary>Writes an audit entry.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="row">What is newest, with the audit entry before this one.</param>
    /// <param name="action">What is done.</param>
    /// <param name="subject">To what.</param>
    /// <param name="provenance">Who, why, when.</param>
    /// <param name="version">Catalogue version that it makes, or null.</param>
    /// <param name="records">Digest over its revisions.</param>
    /// <returns>What is newest now.</returns>
    public static VersionRow Log(Database database, VersionRow row, string action, string subject, Provenance provenance, long? version, Digest records)
    {
        var entry = AuditRow.After(row.AuditSequence, row.AuditHash, action, subject, provenance, version, records);
        entry.Insert(database);
        var now = row with { AuditSequence = entry.Entry.Sequence, AuditHash = entry.Entry.Hash };
        now.Update(database);
        return now;
    }

    private static Digest WriteRevisions(Database database, long version, Provenance provenance, IReadOnlyList<ResourceChange> changes)
    {
        using var digest = new RecordsDigest();
        foreach (var change in changes)
        {
            if (change.Ended is { } ended)
            {
                RevisionRow.End(database, ended with { ToVersion = version });
                digest.AddEnded(ended);
            }

            var revisions = change.Known?.Revisions ?? 0;
            if (Begun(change, version, provenance) is { } begun)
            {
                RevisionRow.Insert(database, begun);
                digest.AddBegun(begun);
                new ResourceRow(change.Kind, change.Name, revisions + 1, version, NewestTo: null).Put(database);

                // Lines that the revision before needed too were asked for with it: they are kept, or on the backlog still. Those that failed are tried again.
                var asked = change.Ended is null ? [] : ContentRow.LinesOf(database, change.Ended.Content).Where(l => !BacklogRow.HasFailed(database, l));
                foreach (var line in ContentRow.LinesOf(database, begun.Content).Except(asked))
                {
                    BacklogRow.Ask(database, new PendingLines(line, change.Name, begun.Content, Instants.Kept(provenance.Instant), Failure: null));
                }
            }
            else
            {
                new ResourceRow(change.Kind, change.Name, revisions, change.Ended!.FromVersion, version).Put(database);
            }
        }

        return digest.Finish();
    }

    private static RevisionHead? Begun(ResourceChange change, long version, Provenance provenance) =>
        change.Content is { } content ? new RevisionHead(change.Kind, change.Name, version, ToVersion: null, content, provenance) : null;
}

using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Reads what changed after a version: the old state, less what ended, plus what began, must be the new state.</summary>
internal static class ChangesReader
{
    private const string BegunSince =
        $"SELECT {RevisionRow.Columns}, c.bytes FROM revisions r LEFT JOIN contents c ON c.hash = r.content WHERE r.from_version > $1 AND r.to_version IS NULL";

    private const string EndedSince = $"SELECT {RevisionRow.Columns} FROM revisions r WHERE r.to_version > $1 AND r.from_version <= $1";

    /// <summary>Reads it.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="after">Catalogue version.</param>
    public static CatalogueChanges Read(Database database, long after)
    {
        var newest = VersionRow.Read(database);
        var sum = VersionSearch.State(database, newest, after);
        if (after == newest.Version)
        {
            return new CatalogueChanges(newest.Stamp, [], []);
        }

        var ended = Ended(database, after);
        var began = Began(database, after);
        sum = ended.Aggregate(sum, (s, head) => s.Without(head));
        sum = began.Aggregate(sum, (s, revision) => s.With(revision.Head));
        if (sum != newest.State)
        {
            throw StoreErrors.Damaged(
                database.File, RevisionRow.Table, FormattableString.Invariant($"changes after version {after}"), "revisions are missing, or there are too many");
        }

        var stay = began.Select(r => (r.Head.Kind, r.Head.Name)).ToHashSet();
        var gone = ended.Select(h => (h.Kind, h.Name)).Where(n => !stay.Contains(n)).OrderBy(n => n.Kind).ThenBy(n => n.Name, StringComparer.Ordinal);
        return new CatalogueChanges(newest.Stamp, began, [.. gone]);
    }

    private static List<RevisionHead> Ended(Database database, long after)
    {
        using var rows = database.Query(RevisionRow.Table, EndedSince, after);
        var found = new List<RevisionHead>();
        while (rows.Next())
        {
            found.Add(RevisionRow.Read(rows));
        }

        return found;
    }

    private static ImmutableArray<StoredRevision> Began(Database database, long after)
    {
        using var rows = database.Query(RevisionRow.Table, BegunSince, after);
        var found = new List<StoredRevision>();
        while (rows.Next())
        {
            var head = RevisionRow.Read(rows);
            found.Add(new StoredRevision(head, ContentRow.Compared(database.File, rows.Bytes(RevisionRow.ColumnCount), head.Content)));
        }

        return [.. found.OrderBy(r => r.Head.Kind).ThenBy(r => r.Head.Name, StringComparer.Ordinal)];
    }
}

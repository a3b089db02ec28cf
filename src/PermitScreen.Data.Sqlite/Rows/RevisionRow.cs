using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>Revisions in their table.</summary>
internal static class RevisionRow
{
    /// <summary>Table.</summary>
    public const string Table = "revisions";

    /// <summary>Columns of the table r, in the order in which they are read.</summary>
    public const string Columns = "r.kind, r.name, r.from_version, r.to_version, r.content, r.actor, r.reason, r.instant_ms, r.\"check\"";

    /// <summary>Number of the columns.</summary>
    public const int ColumnCount = 9;

    /// <summary>The revision of a resource with the highest first version up to a given one; it may have ended before that.</summary>
    /// <param name="database">Records.</param>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    /// <param name="upTo">Catalogue version.</param>
    public static RevisionHead? FindBegun(Database database, ResourceKind kind, string name, long upTo)
    {
        using var rows = database.Query(
            Table,
            $"SELECT {Columns} FROM revisions r WHERE r.kind = $1 AND r.name = $2 AND r.from_version <= $3 ORDER BY r.from_version DESC LIMIT 1",
            (long)kind,
            name,
            upTo);
        return rows.Next() ? Read(rows, kind, name) : null;
    }

    /// <summary>All revisions of a resource, newest first.</summary>
    /// <param name="database">Records.</param>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    public static List<RevisionHead> OfResource(Database database, ResourceKind kind, string name)
    {
        using var rows = database.Query(
            Table, $"SELECT {Columns} FROM revisions r WHERE r.kind = $1 AND r.name = $2 ORDER BY r.from_version DESC", (long)kind, name);
        var found = new List<RevisionHead>();
        while (rows.Next())
        {
            found.Add(Read(rows, kind, name));
        }

        return found;
    }

    /// <summary>Reads a row.</summary>
    /// <param name="rows">Rows.</param>
    public static RevisionHead Read(RowCursor rows)
    {
        var head = new RevisionHead((ResourceKind)rows.Small(0), rows.Text(1), rows.Whole(2), rows.WholeOrNull(3), rows.Digest(4), rows.Provenance(5));
        rows.Compare(8, Check(head), FormattableString.Invariant($"{head.Name} from version {head.FromVersion}"));
        return head;
    }

    /// <summary>Writes a new revision.</summary>
    /// <param name="database">Records.</param>
    /// <param name="head">Revision.</param>
    public static void Insert(Database database, RevisionHead head) => database.Run(
        "INSERT INTO revisions (kind, name, from_version, to_version, content, actor, reason, instant_ms, \"check\") VALUES ($1, $2, $3, NULL, $4, $5, $6, $7, $8)",
        (long)head.Kind,
        head.Name,
        head.FromVersion,
        head.Content.ToArray(),
        head.Provenance.Actor,
        head.Provenance.Reason,
        Instants.Write(head.Provenance.Instant),
        Check(head));

    /// <summary>Writes the end of a revision.</summary>
    /// <param name="database">Records.</param>
    /// <param name="ended">Revision with its end.</param>
    public static void End(Database database, RevisionHead ended)
    {
        var changed = database.Run(
            "UPDATE revisions SET to_version = $4, \"check\" = $5 WHERE kind = $1 AND name = $2 AND from_version = $3 AND to_version IS NULL",
            (long)ended.Kind,
            ended.Name,
            ended.FromVersion,
            ended.ToVersion,
            Check(ended));
        if (changed != 1)
        {
            throw StoreErrors.Damaged(database.File, Table, ended.Name, "its newest revision cannot be found again");
        }
    }

    /// <summary>Adds a revision to canonical bytes, all but its end.</summary>
    /// <param name="form">Bytes.</param>
    /// <param name="head">Revision.</param>
    public static RowForm Write(RowForm form, RevisionHead head) =>
        form.Add((long)head.Kind).Add(head.Name).Add(head.FromVersion).Add(head.Content).Add(head.Provenance);

    private static RevisionHead Read(RowCursor rows, ResourceKind kind, string name)
    {
        var head = Read(rows);

        // A damaged page may lead the search to a sound row of another resource.
        return head.Kind == kind && head.Name == name ? head : throw rows.Damaged(name, $"the search for it led to {head.Name}");
    }

    private static byte[] Check(RevisionHead head) => Write(new RowForm(Table), head).Add(head.ToVersion).Check();
}

using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>A change set with the state after it.</summary>
/// <param name="Head">As callers know it.</param>
/// <param name="Previous">Catalogue version before it; 0 before the first.</param>
/// <param name="State">Sum over all revisions that hold at its version.</param>
internal sealed record ChangeSetRow(ChangeSetHead Head, long Previous, StateSum State)
{
    private const string Table = "change_sets";
    private const string Columns = "version, previous, action, actor, reason, instant_ms, added, revised, removed, state, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM change_sets ORDER BY version";

    /// <summary>The one of a version; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="version">Catalogue version.</param>
    public static ChangeSetRow? Find(Database database, long version) =>
        First(database, $"SELECT {Columns} FROM change_sets WHERE version = $1", version);

    /// <summary>The first one after a version; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="version">Catalogue version.</param>
    public static ChangeSetRow? FirstAfter(Database database, long version) =>
        First(database, $"SELECT {Columns} FROM change_sets WHERE version > $1 ORDER BY version LIMIT 1", version);

    /// <summary>Those below a version, newest first.</summary>
    /// <param name="database">Records.</param>
    /// <param name="below">Catalogue version.</param>
    /// <param name="most">How many at most.</param>
    public static IEnumerable<ChangeSetRow> Below(Database database, long below, long most)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM change_sets WHERE version < $1 ORDER BY version DESC LIMIT $2", below, most);
        while (rows.Next())
        {
            yield return Read(rows);
        }
    }

    /// <summary>Writes it.</summary>
    /// <param name="database">Records.</param>
    public void Insert(Database database) => database.Run(
        $"INSERT INTO change_sets ({Columns}) VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11)",
        Head.Version,
        Previous,
        Head.Action,
        Head.Provenance.Actor,
        Head.Provenance.Reason,
        Instants.Write(Head.Provenance.Instant),
        (long)Head.Added,
        (long)Head.Revised,
        (long)Head.Removed,
        State.ToArray(),
        Check());

    private static ChangeSetRow? First(Database database, string sql, long version)
    {
        using var rows = database.Query(Table, sql, version);
        return rows.Next() ? Read(rows) : null;
    }

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static ChangeSetRow Read(RowCursor rows)
    {
        var head = new ChangeSetHead(rows.Whole(0), rows.Text(2), rows.Provenance(3), rows.Small(6), rows.Small(7), rows.Small(8));
        var row = new ChangeSetRow(head, rows.Whole(1), new StateSum(rows.Bytes(9, StateSum.Length)));
        rows.Compare(10, row.Check(), FormattableString.Invariant($"version {head.Version}"));
        return row;
    }

    private byte[] Check() => new RowForm(Table)
        .Add(Head.Version).Add(Previous).Add(Head.Action).Add(Head.Provenance).Add(Head.Added).Add(Head.Revised).Add(Head.Removed).Add(State.ToArray()).Check();
}

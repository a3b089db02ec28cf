using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>An entry of the audit log with the hash of the one before.</summary>
/// <param name="Entry">Entry.</param>
/// <param name="Previous">Hash of the one before; of nothing before the first.</param>
internal sealed record AuditRow(AuditEntry Entry, Digest Previous)
{
    private const string Table = "audit";
    private const string Columns = "sequence, action, subject, actor, reason, instant_ms, version, records, previous, hash";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM audit ORDER BY sequence";

    /// <summary>What stands in place of a hash before the first entry, and in place of records where an entry has none.</summary>
    public static Digest OfNothing { get; } = Digest.Of([]);

    /// <summary>The entry that follows another.</summary>
    /// <param name="sequence">Number of the one before.</param>
    /// <param name="previous">Hash of the one before.</param>
    /// <param name="action">What was done.</param>
    /// <param name="subject">To what.</param>
    /// <param name="provenance">Who, why, when.</param>
    /// <param name="version">Catalogue version that it made, or null.</param>
    /// <param name="records">Digest over its revisions.</param>
    public static AuditRow After(long sequence, Digest previous, string action, string subject, Provenance provenance, long? version, Digest records)
    {
        var unhashed = new AuditRow(new AuditEntry(sequence + 1, action, subject, provenance, version, records, OfNothing), previous);
        return unhashed with { Entry = unhashed.Entry with { Hash = unhashed.Hash() } };
    }

    /// <summary>Those below a number, newest first; the hash of each was compared.</summary>
    /// <param name="database">Records.</param>
    /// <param name="below">Number.</param>
    /// <param name="most">How many at most.</param>
    public static IEnumerable<AuditRow> Below(Database database, long below, long most)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM audit WHERE sequence < $1 ORDER BY sequence DESC LIMIT $2", below, most);
        while (rows.Next())
        {
            yield return Checked(rows, Read(rows));
        }
    }

    /// <summary>The entry of a version; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="version">Catalogue version.</param>
    public static AuditRow? OfVersion(Database database, long version)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM audit WHERE version = $1", version);
        return rows.Next() ? Checked(rows, Read(rows)) : null;
    }

    /// <summary>Writes it.</summary>
    /// <param name="database">Records.</param>
    public void Insert(Database database) => database.Run(
        $"INSERT INTO audit ({Columns}) VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10)",
        Entry.Sequence,
        Entry.Action,
        Entry.Subject,
        Entry.Provenance.Actor,
        Entry.Provenance.Reason,
        Instants.Write(Entry.Provenance.Instant),
        Entry.Version,
        Entry.Records.ToArray(),
        Previous.ToArray(),
        Entry.Hash.ToArray());

    /// <summary>The hash that the entry must have.</summary>
    public Digest Hash() => new RowForm(Table)
        .Add(Entry.Sequence).Add(Entry.Action).Add(Entry.Subject).Add(Entry.Provenance).Add(Entry.Version).Add(Entry.Records).Add(Previous).Hash();

    /// <summary>Reads an entry as it stands.</summary>
    /// <param name="rows">Rows.</param>
    public static AuditRow Read(RowCursor rows) => new(
        new AuditEntry(rows.Whole(0), rows.Text(1), rows.Text(2), rows.Provenance(3), rows.WholeOrNull(6), rows.Digest(7), rows.Digest(9)), rows.Digest(8));

    private static AuditRow Checked(RowCursor rows, AuditRow row) => row.Hash() == row.Entry.Hash
        ? row
        : throw rows.Damaged(FormattableString.Invariant($"entry {row.Entry.Sequence}"), "the entry does not fit its hash");
}

using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>The one row that says what is newest.</summary>
/// <param name="Timeline">Identity of the records.</param>
/// <param name="Version">Newest catalogue version.</param>
/// <param name="State">Sum over all revisions that hold at it.</param>
/// <param name="AuditSequence">Number of the newest audit entry.</param>
/// <param name="AuditHash">Its hash.</param>
internal sealed record VersionRow(Guid Timeline, long Version, StateSum State, long AuditSequence, Digest AuditHash)
{
    private const string Table = "version";
    private const int GuidLength = 16;

    /// <summary>As callers know it.</summary>
    public VersionStamp Stamp => new(Timeline, Version, State);

    /// <summary>Reads it.</summary>
    /// <param name="database">Records.</param>
    public static VersionRow Read(Database database)
    {
        using var rows = database.Query(Table, "SELECT timeline, version, state, audit_sequence, audit_hash, \"check\" FROM version WHERE id = 1");
        if (!rows.Next())
        {
            throw rows.Damaged("the one row", "it is missing");
        }

        var row = new VersionRow(
            new Guid(rows.Bytes(0, GuidLength), bigEndian: true), rows.Whole(1), new StateSum(rows.Bytes(2, StateSum.Length)), rows.Whole(3), rows.Digest(4));
        rows.Compare(5, row.Check(), "the one row");
        return row;
    }

    /// <summary>Writes it for the first time.</summary>
    /// <param name="database">Records.</param>
    public void Insert(Database database) => database.Run(
        "INSERT INTO version (id, timeline, version, state, audit_sequence, audit_hash, \"check\") VALUES (1, $1, $2, $3, $4, $5, $6)",
        Timeline.ToByteArray(bigEndian: true),
        Version,
        State.ToArray(),
        AuditSequence,
        AuditHash.ToArray(),
        Check());

    /// <summary>Writes it in place of the one that is there.</summary>
    /// <param name="database">Records.</param>
    public void Update(Database database) => database.Run(
        "UPDATE version SET timeline = $1, version = $2, state = $3, audit_sequence = $4, audit_hash = $5, \"check\" = $6 WHERE id = 1",
        Timeline.ToByteArray(bigEndian: true),
        Version,
        State.ToArray(),
        AuditSequence,
        AuditHash.ToArray(),
        Check());

    private byte[] Check() => new RowForm(Table)
        .Add(Timeline.ToByteArray(bigEndian: true)).Add(Version).Add(State.ToArray()).Add(AuditSequence).Add(AuditHash).Check();
}

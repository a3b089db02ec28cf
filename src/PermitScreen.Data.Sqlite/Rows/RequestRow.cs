using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>What became of a request that carried an id.</summary>
/// <param name="Stamp">Id and fingerprint.</param>
/// <param name="Version">Catalogue version that it made.</param>
/// <param name="Content">Address of the content then; null where the resource was taken out.</param>
internal sealed record RequestRow(RequestStamp Stamp, long Version, Digest? Content)
{
    private const string Table = "requests";
    private const string Columns = "request_id, fingerprint, version, content, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM requests ORDER BY request_id";

    /// <summary>The one of an id; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="requestId">Id.</param>
    public static RequestRow? Find(Database database, string requestId)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM requests WHERE request_id = $1", requestId);
        return rows.Next() ? Read(rows) : null;
    }

    /// <summary>Writes it.</summary>
    /// <param name="database">Records.</param>
    public void Insert(Database database) => database.Run(
        $"INSERT INTO requests ({Columns}) VALUES ($1, $2, $3, $4, $5)", Stamp.RequestId, Stamp.Fingerprint.ToArray(), Version, Content?.ToArray(), Check());

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static RequestRow Read(RowCursor rows)
    {
        var row = new RequestRow(new RequestStamp(rows.Text(0), rows.Digest(1)), rows.Whole(2), rows.DigestOrNull(3));
        rows.Compare(4, row.Check(), row.Stamp.RequestId);
        return row;
    }

    private byte[] Check() => new RowForm(Table).Add(Stamp.RequestId).Add(Stamp.Fingerprint).Add(Version).Add(Content).Check();
}

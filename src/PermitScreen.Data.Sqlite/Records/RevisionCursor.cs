using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Reads every revision that holds at a version, and at the end compares their sum with that of the version.</summary>
internal sealed class RevisionCursor : IDisposable
{
    // Resource names are ASCII by the contract: the order of their bytes is the ordinal order.
    private const string Newest =
        $"SELECT {RevisionRow.Columns}, c.bytes FROM revisions r LEFT JOIN contents c ON c.hash = r.content WHERE r.to_version IS NULL ORDER BY r.kind, r.name";

    private const string Earlier =
        $"SELECT {RevisionRow.Columns}, c.bytes FROM revisions r LEFT JOIN contents c ON c.hash = r.content "
        + "WHERE r.from_version <= $1 AND (r.to_version IS NULL OR r.to_version > $1) ORDER BY r.kind, r.name, r.from_version";

    private readonly Database _database;
    private readonly RowCursor _rows;
    private readonly long _version;
    private readonly StateSum _expected;
    private StateSum _sum;

    /// <summary>Begins to read.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="version">Catalogue version.</param>
    /// <exception cref="StoreException">There is no such version.</exception>
    public RevisionCursor(Database database, long version)
    {
        _database = database;
        _version = version;
        (_rows, _expected) = database.Guarded(d =>
        {
            var newest = VersionRow.Read(d);
            var state = VersionSearch.State(d, newest, version);
            return (version == newest.Version ? d.Query(RevisionRow.Table, Newest) : d.Query(RevisionRow.Table, Earlier, version), state);
        });
    }

    /// <summary>The next revision; null after the last.</summary>
    /// <exception cref="StoreException">It is damaged, or one was missing.</exception>
    public StoredRevision? Next() => _database.Guarded(_ => _rows.Next() ? Read() : Finish());

    /// <inheritdoc/>
    public void Dispose() => _rows.Dispose();

    private StoredRevision Read()
    {
        var head = RevisionRow.Read(_rows);
        if (!head.HoldsAt(_version))
        {
            throw _rows.Damaged(head.Name, FormattableString.Invariant($"the search for version {_version} led to it"));
        }

        _sum = _sum.With(head);
        return new StoredRevision(head, ContentRow.Compared(_database.File, _rows.Bytes(RevisionRow.ColumnCount), head.Content));
    }

    private StoredRevision? Finish() => _sum == _expected
        ? null
        : throw _rows.Damaged(FormattableString.Invariant($"version {_version}"), "revisions are missing, or there are too many");
}

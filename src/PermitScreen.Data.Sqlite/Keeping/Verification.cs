using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Imports;
using PermitScreen.Data.Sqlite.Records;
using PermitScreen.Data.Sqlite.Rows;
using PermitScreen.Data.Sqlite.Schema;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>Reads every record again: pages, audit chain, contents, revisions, versions, and what is being imported.</summary>
internal sealed class Verification
{
    private readonly VerificationLog _log;
    private readonly Database _database;

    private Verification(VerificationLog log)
    {
        _log = log;
        _database = log.Database;
    }

    /// <summary>Verifies.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="knownHash">Hash of an audit entry that was noted down outside; null where none is given.</param>
    /// <param name="tell">Takes progress and problems.</param>
    /// <param name="cancellation">Ends it.</param>
    public static void Run(Database database, Digest? knownHash, Action<VerificationStep> tell, CancellationToken cancellation)
    {
        var log = new VerificationLog(database, tell, cancellation);
        var verification = new Verification(log);
        log.Stage("pages of the database", table: null, verification.Pages);
        log.Stage(VerificationStages.Audit, "audit", () => AuditVerification.Run(log, knownHash));
        log.Stage("contents", "contents", verification.Contents);
        log.Stage("lines that contents need", "content_lines", verification.ContentLines);
        log.Stage(VerificationStages.Revisions, "revisions", verification.Revisions);
        log.Stage("resources", "resources", verification.Resources);
        log.Stage("catalogue versions", "change_sets", () => VersionVerification.Run(log));
        log.Stage("requests and backlog", table: null, verification.RequestsAndBacklog);
        log.Stage("imports", "imports", verification.Imports);
    }

    /// <summary>Verifies, and refuses records that are not sound.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="cancellation">Ends it.</param>
    /// <exception cref="StoreException">A problem was found; the first one is told.</exception>
    public static void Demand(Database database, CancellationToken cancellation)
    {
        var problems = new List<string>();
        Run(database, knownHash: null, step => problems.AddRange(step.Problem is { } problem ? [problem] : []), cancellation);
        if (problems is [var first, ..])
        {
            throw new StoreException(
                StoreTrouble.Damaged, StoreErrors.Message(StoreTrouble.Damaged, database.File, FormattableString.Invariant($"{problems.Count} problems were found, the first: {first}")));
        }
    }

    private void Pages()
    {
        foreach (var problem in PageCheck.Problems(_database))
        {
            _log.Problem(problem);
        }

        _log.Demand(SchemaText.Of(_database).SequenceEqual(SchemaText.Expected(SchemaScripts.Records)), $"The tables are not those of the schema version.");
        _log.Each("foreign keys", "PRAGMA foreign_key_check", r => $"{r.Text(0)} names a row of {r.Text(2)} that is missing.", _log.Problem);
    }

    private void Contents()
    {
        const string Sql =
            "SELECT c.hash, c.bytes, EXISTS (SELECT 1 FROM revisions r WHERE r.content = c.hash) OR EXISTS (SELECT 1 FROM import_items i WHERE i.content = c.hash) FROM contents c";
        _log.Each(
            "contents",
            Sql,
            rows =>
            {
                var hash = rows.Digest(0);
                ContentRow.Compared(_database.File, rows.Bytes(1), hash);
                return (Hash: hash, Named: rows.Whole(2) == 1);
            },
            c => _log.Demand(c.Named, $"Content {c.Hash} is named by no revision and no staged item."));
    }

    private void ContentLines() => _log.Each("content_lines", ContentRow.EveryLine, ContentRow.ReadLine, static _ => { });

    private void Revisions()
    {
        var resource = new List<RevisionHead>();
        _log.Each(
            RevisionRow.Table,
            $"SELECT {RevisionRow.Columns} FROM revisions r ORDER BY r.kind, r.name, r.from_version DESC",
            RevisionRow.Read,
            head =>
            {
                if (resource is [var first, ..] && (first.Kind != head.Kind || first.Name != head.Name))
                {
                    Resource([.. resource]);
                    resource.Clear();
                }

                resource.Add(head);
            });
        Resource([.. resource]);
    }

    private void Resources() => _log.Each(
        "resources",
        ResourceRow.Every,
        ResourceRow.Read,
        r => _log.Demand(
            _database.Whole("SELECT count(*) FROM revisions WHERE kind = $1 AND name = $2", (long)r.Kind, r.Name) == r.Revisions,
            $"{r.Name} must have {r.Revisions} revisions and has another number."));

    private void Resource(IReadOnlyList<RevisionHead> revisions)
    {
        if (revisions is [var first, ..] && RevisionSearch.Problem(revisions, ResourceRow.Find(_database, first.Kind, first.Name)) is { } problem)
        {
            _log.Problem($"{first.Name}: {problem}.");
        }
    }

    private void RequestsAndBacklog()
    {
        _log.Each("requests", RequestRow.Every, RequestRow.Read, static _ => { });
        _log.Each("backlog", BacklogRow.Every, BacklogRow.Read, static _ => { });
        _log.Each("notes", NoteRow.Every, NoteRow.Read, static _ => { });
    }

    private void Imports()
    {
        _log.Each("imports", ImportRow.Every, ImportRow.Read, import =>
        {
            var staged = import.Head.State == ImportState.Staging ? import.Head.Staged : 0;
            Count("import_pieces", import, import.Head.NextPiece);
            Count("import_items", import, staged);
            Count("import_refusals", import, import.Head.Refused);
        });
        _log.Each("import_pieces", PieceRow.Every, PieceRow.Read, static _ => { });
        _log.Each("import_items", ImportItem.Every, ImportItem.Read, static _ => { });
        _log.Each("import_refusals", RefusalRow.Every, RefusalRow.Read, static _ => { });
    }

    private void Count(string table, ImportRow import, int expected)
    {
        var found = _database.Whole($"SELECT count(*) FROM {table} WHERE import = $1", import.Number);
        _log.Demand(found == expected, $"Import {import.Head.ImportId} must have {expected} rows in table {table} and has {found}.");
    }
}

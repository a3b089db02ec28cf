using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Records;
using PermitScreen.Data.Sqlite.Rows;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>Publishes an import as one change set.</summary>
internal sealed class PublishingWork
{
    private const string Action = "publish import";
    private const int RefusalsTold = 20;

    private readonly Database _database;
    private readonly ImportRow _import;
    private readonly VersionRow _before;
    private readonly List<ResourceChange> _changes = [];
    private readonly List<(ImportItem Item, string Fault)> _refused = [];
    private int _unchanged;

    private PublishingWork(Database database, ImportRow import)
    {
        _database = database;
        _import = import;
        _before = VersionRow.Read(database);
    }

    /// <summary>Publishes it.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="importId">Id of the import.</param>
    /// <param name="pieces">Pieces that were sent; null where the caller does not say.</param>
    /// <param name="provenance">Who publishes, and when.</param>
    public static (PublishOutcome Outcome, bool Keep) Do(Database database, string importId, int? pieces, Provenance provenance)
    {
        if (ImportRow.Find(database, importId) is not { } row)
        {
            return (new PublishOutcome.NoSuchImport(), false);
        }

        if (row.Head.State == ImportState.Published)
        {
            return (new PublishOutcome.Published(row.Head), false);
        }

        if (row.Head.State == ImportState.Cancelled)
        {
            return (new PublishOutcome.GivenUp(row.Head), false);
        }

        if (pieces is { } sent && sent != row.Head.NextPiece)
        {
            return (new PublishOutcome.PiecesMissing(row.Head), false);
        }

        var kept = provenance with { Reason = row.Head.Provenance.Reason, Instant = Instants.Kept(provenance.Instant) };
        return (new PublishingWork(database, row).Publish(kept), true);
    }

    private PublishOutcome Publish(Provenance provenance)
    {
        Decide();
        var now = NoteRefusals();
        if (now.Head is { AllowPartial: false, Refused: > 0 })
        {
            now.Put(_database);
            return new PublishOutcome.Refused(now.Head, [.. RefusalRow.Read(_database, now, 0, RefusalsTold)]);
        }

        var subject = StagingWork.Subject(now.Head.ImportId);
        long? version = null;
        if (_changes.Count > 0)
        {
            version = ChangeSetWriter.Write(_database, _before, _before.Version + 1, Action, subject, provenance, _changes).Version;
        }
        else
        {
            ChangeSetWriter.Log(_database, _before, Action, subject, provenance, version: null, AuditRow.OfNothing);
        }

        var added = _changes.Count(c => c.Ended is null);
        now = now with { Head = now.Head with { State = ImportState.Published, Result = new ImportResult(added, _changes.Count - added, _unchanged, version) } };
        now.Put(_database);
        StagingWork.DropItems(_database, now.Number);
        return new PublishOutcome.Published(now.Head);
    }

    /// <summary>Goes through the items in order; those of one resource stand beside each other.</summary>
    private void Decide()
    {
        var same = new List<ImportItem>();
        foreach (var item in ImportItem.Of(_database, _import.Number))
        {
            if (same is [var first, ..] && (first.Kind != item.Kind || first.Name != item.Name))
            {
                Decide(same);
                same.Clear();
            }

            same.Add(item);
        }

        if (same.Count > 0)
        {
            Decide(same);
        }
    }

    private void Decide(List<ImportItem> same)
    {
        if (same.Count > 1)
        {
            // None of them wins: which one is meant only the caller knows.
            var where = string.Join(", ", same.Select(i => i.Origin.Length > 0 ? i.Origin : FormattableString.Invariant($"piece {i.Piece}")));
            _refused.AddRange(same.Select(i => (i, FormattableString.Invariant($"{i.Name} stands {same.Count} times in this import ({where}); leave one."))));
            return;
        }

        var item = same[0];
        var (known, newest) = RevisionSearch.Newest(_database, item.Kind, item.Name);
        if (newest?.Content == item.Content)
        {
            _unchanged++;
        }
        else if ((known?.NewestTo ?? known?.NewestFrom) is { } changed && changed > _import.Head.BaseVersion)
        {
            var what = newest is null ? "taken out" : "changed";
            _refused.Add((item, FormattableString.Invariant(
                $"{item.Name} was {what} by others at version {changed}, after this import was begun at version {_import.Head.BaseVersion}; compare the two and begin another import.")));
        }
        else
        {
            _changes.Add(new ResourceChange(item.Kind, item.Name, known, newest, item.Content));
        }
    }

    private ImportRow NoteRefusals()
    {
        RefusalRow.DeleteThoseOfPublishing(_database, _import);
        var place = _import.RefusedStaging;
        foreach (var (item, fault) in _refused.OrderBy(r => r.Item.Item))
        {
            RefusalRow.Insert(_database, _import.Number, place++, new ImportRefusal(item.Piece, item.Name, item.Origin, [new Fault("name", fault)]));
        }

        return _import with { Head = _import.Head with { Refused = place }, RefusedPublishing = _refused.Count };
    }
}

using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Makes a change set of one edit.</summary>
internal static class EditWork
{
    /// <summary>Makes it.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="request">Change.</param>
    /// <returns>What became of it, and whether anything was written.</returns>
    public static (ChangeOutcome Outcome, bool Keep) Do(Database database, ChangeRequest request)
    {
        if (request.Stamp is { } stamp && Seen(database, stamp) is { } seen)
        {
            return (seen, false);
        }

        var before = VersionRow.Read(database);
        var (kind, content) = request.Edit switch
        {
            Edit.Add add => (add.Content.Kind, add.Content),
            Edit.Revise revise => (revise.Content.Kind, revise.Content),
            Edit.Remove remove => (remove.Kind, (ResourceContent?)null),
            _ => throw new ArgumentException($"unknown edit {request.Edit.GetType().Name}", nameof(request)),
        };
        var (known, newest) = RevisionSearch.Newest(database, kind, request.Edit.Name);
        if (Against(request.Edit, newest, before.Version) is { } against)
        {
            return (against, false);
        }

        if (content is not null)
        {
            ContentRow.Put(database, content);
        }

        var provenance = request.Provenance with { Instant = Instants.Kept(request.Provenance.Instant) };
        var now = ChangeSetWriter.Write(
            database, before, before.Version + 1, request.Action, request.Edit.Name, provenance, [new ResourceChange(kind, request.Edit.Name, known, newest, content?.Hash)]);
        if (request.Stamp is { } given)
        {
            new RequestRow(given, now.Version, content?.Hash).Insert(database);
        }

        return (new ChangeOutcome.Done(now.Version, content?.Hash, Repeated: false), true);
    }

    /// <summary>What was answered to a request before; null where it was not seen yet.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="stamp">Stamp of the request.</param>
    public static ChangeOutcome? Seen(Database database, RequestStamp stamp) => RequestRow.Find(database, stamp.RequestId) switch
    {
        null => null,
        { } earlier when earlier.Stamp.Fingerprint == stamp.Fingerprint => new ChangeOutcome.Done(earlier.Version, earlier.Content, Repeated: true),
        _ => new ChangeOutcome.RequestIdReused(),
    };

    /// <summary>What stands against an edit; null where nothing does.</summary>
    private static ChangeOutcome? Against(Edit edit, RevisionHead? newest, long version) => edit switch
    {
        Edit.Add => newest is null ? null : new ChangeOutcome.Exists(newest),
        _ when newest is null => new ChangeOutcome.Missing(),
        Edit.Revise revise when revise.Etag != newest.Content.Etag => new ChangeOutcome.Outdated(newest),
        Edit.Remove remove when remove.Etag != newest.Content.Etag => new ChangeOutcome.Outdated(newest),
        Edit.Revise revise when revise.Content.Hash == newest.Content => new ChangeOutcome.Unchanged(newest, version),
        _ => null,
    };
}

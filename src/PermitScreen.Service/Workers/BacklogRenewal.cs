using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Workers;

/// <summary>Puts the lines of the newest structures on the backlog where they are not kept: they were lost, damaged, or are of another version of the mechanics.</summary>
/// <param name="catalogue">Catalogue.</param>
/// <param name="backlog">Backlog.</param>
/// <param name="lines">Kept lines.</param>
/// <param name="bell">Wakes the worker.</param>
/// <param name="time">Clock.</param>
internal sealed class BacklogRenewal(CatalogueGate catalogue, IBacklogStore backlog, ILineStore lines, BacklogBell bell, TimeProvider time)
{
    /// <summary>Looks at every structure; returns how many need lines that are not kept.</summary>
    /// <param name="cancellation">Ends it between structures.</param>
    public async Task<int> RenewMissingAsync(CancellationToken cancellation)
    {
        var snapshot = await catalogue.CurrentAsync(null, cancellation);
        var renewed = 0;
        foreach (var entry in snapshot.StructuresAfter())
        {
            cancellation.ThrowIfCancellationRequested();
            if (RevisionReader.ReadRecord(entry.Revision) is not { } record)
            {
                continue;
            }

            var keys = TrussKeys.Of(record);
            if (lines.Known(keys).Count < keys.Length)
            {
                await backlog.RenewAsync(entry.Name, entry.Revision.Head.Content, keys, time.GetUtcNow(), cancellation);
                renewed++;
            }
        }

        bell.Ring();
        return renewed;
    }
}

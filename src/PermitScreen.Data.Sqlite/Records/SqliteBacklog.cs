using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>The backlog in SQLite.</summary>
/// <param name="file">File with its connections.</param>
internal sealed class SqliteBacklog(RecordsFile file) : IBacklogStore
{
    /// <inheritdoc/>
    public Task<IReadOnlyList<PendingLines>> ReadPendingAsync(int most, CancellationToken cancellation) =>
        file.ReadAsync<IReadOnlyList<PendingLines>>(database => BacklogRow.Oldest(database, failed: false, most), cancellation);

    /// <inheritdoc/>
    public Task<(long Pending, DateTimeOffset? Oldest, IReadOnlyList<PendingLines> Failures)> ReadSummaryAsync(int mostFailures, CancellationToken cancellation) =>
        file.ReadAsync<(long, DateTimeOffset?, IReadOnlyList<PendingLines>)>(
            database => (
                database.Whole("SELECT count(*) FROM backlog WHERE failure IS NULL"),
                BacklogRow.Oldest(database, failed: false, 1) is [var oldest] ? oldest.Since : null,
                BacklogRow.Oldest(database, failed: true, mostFailures)),
            cancellation);

    /// <inheritdoc/>
    public Task StrikeAsync(ImmutableArray<Digest> keys, CancellationToken cancellation)
    {
        file.Settings.Probe?.Reached(StoreMoment.BeforeStrike, "strike lines off");
        return file.Writer.WriteAsync("strike lines off", database => (0, keys.Sum(key => BacklogRow.Strike(database, key)) > 0), cancellation);
    }

    /// <inheritdoc/>
    public Task NoteFailureAsync(Digest key, string reason, CancellationToken cancellation) => file.Writer.WriteAsync(
        "note a failure",
        database =>
        {
            if (BacklogRow.Find(database, key) is not { } row)
            {
                return (0, false);
            }

            BacklogRow.Put(database, row with { Failure = reason });
            return (0, true);
        },
        cancellation);

    /// <inheritdoc/>
    public Task RenewAsync(string structure, Digest content, ImmutableArray<Digest> keys, DateTimeOffset instant, CancellationToken cancellation) => file.Writer.WriteAsync(
        "renew lines",
        database =>
        {
            if (!ContentRow.Has(database, content))
            {
                return (0, false); // Dropped since the caller read it: nothing needs the lines.
            }

            ContentRow.ForgetLines(database, content);
            foreach (var key in keys)
            {
                ContentRow.PutLine(database, content, key);
                BacklogRow.Ask(database, new PendingLines(key, structure, content, Instants.Kept(instant), Failure: null));
            }

            return (0, true);
        },
        cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlySet<Digest>> ReadNamedAsync(CancellationToken cancellation) =>
        file.ReadAsync<IReadOnlySet<Digest>>(database => ContentRow.AllLines(database).Select(l => l.Line).ToHashSet(), cancellation);

    /// <inheritdoc/>
    public Task<string?> ReadMechanicsVersionAsync(CancellationToken cancellation) => file.ReadAsync(database => NoteRow.Find(database, NoteRow.Mechanics), cancellation);

    /// <inheritdoc/>
    public Task NoteMechanicsVersionAsync(string version, CancellationToken cancellation) => file.Writer.WriteAsync(
        "note the version of the mechanics",
        database =>
        {
            NoteRow.Put(database, NoteRow.Mechanics, version);
            return (0, true);
        },
        cancellation);
}

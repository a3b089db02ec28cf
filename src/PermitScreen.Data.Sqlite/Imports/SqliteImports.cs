using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Records;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>Imports in SQLite.</summary>
/// <param name="file">File with its connections.</param>
internal sealed class SqliteImports(RecordsFile file) : IImportStore
{
    /// <inheritdoc/>
    public Task<ImportHead?> BeginAsync(ImportBeginning beginning, CancellationToken cancellation) =>
        file.Writer.WriteAsync("begin import", database => StagingWork.Begin(database, beginning), cancellation);

    /// <inheritdoc/>
    public Task<ImportHead?> FindAsync(string importId, CancellationToken cancellation) =>
        file.ReadAsync(database => ImportRow.Find(database, importId)?.Head, cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlyList<ImportHead>> ListAsync(ImportState? state, int skip, int most, CancellationToken cancellation) =>
        file.ReadAsync<IReadOnlyList<ImportHead>>(database => ImportRow.List(database, state, skip, most).ConvertAll(r => r.Head), cancellation);

    /// <inheritdoc/>
    public Task<(StagingOutcome Outcome, ImportHead? Head)> StageAsync(string importId, ImportPiece piece, CancellationToken cancellation) =>
        file.Writer.WriteAsync("stage piece", database => StagingWork.Stage(database, importId, piece), cancellation);

    /// <inheritdoc/>
    public Task<PublishOutcome> PublishAsync(string importId, int? pieces, Provenance provenance, CancellationToken cancellation) =>
        file.Writer.WriteAsync("publish import", database => PublishingWork.Do(database, importId, pieces, provenance), cancellation);

    /// <inheritdoc/>
    public Task<ImportHead?> CancelAsync(string importId, Provenance provenance, CancellationToken cancellation) =>
        file.Writer.WriteAsync("cancel import", database => StagingWork.Cancel(database, importId, provenance), cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlyList<ImportRefusal>> ReadRefusalsAsync(string importId, int skip, int most, CancellationToken cancellation) => file.ReadAsync(
        database => ImportRow.Find(database, importId) is { } import ? RefusalRow.Read(database, import, skip, most) : [],
        cancellation);
}

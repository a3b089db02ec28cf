namespace PermitScreen.Catalogue.Storage;

/// <summary>Imports, staged in pieces and published at once.</summary>
/// <exception cref="StoreException">Thrown by every member where the records cannot be read or written; nothing was changed then.</exception>
public interface IImportStore
{
    /// <summary>Begins an import; the one that is there where it was begun before with the same fields, null where other fields stand under the id.</summary>
    /// <param name="beginning">Import.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<ImportHead?> BeginAsync(ImportBeginning beginning, CancellationToken cancellation);

    /// <summary>An import; null where there is none.</summary>
    /// <param name="importId">Id.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<ImportHead?> FindAsync(string importId, CancellationToken cancellation);

    /// <summary>Imports, newest first.</summary>
    /// <param name="state">Only those in this state; null for all.</param>
    /// <param name="skip">How many to pass over.</param>
    /// <param name="most">How many at most.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlyList<ImportHead>> ListAsync(ImportState? state, int skip, int most, CancellationToken cancellation);

    /// <summary>Keeps a piece: the same piece again is kept once.</summary>
    /// <param name="importId">Id.</param>
    /// <param name="piece">Piece.</param>
    /// <param name="cancellation">Ends the wait; a piece that has begun is finished.</param>
    Task<(StagingOutcome Outcome, ImportHead? Head)> StageAsync(string importId, ImportPiece piece, CancellationToken cancellation);

    /// <summary>
    /// Publishes an import as one change set: one version, or none where nothing changed. A resource that stands in it twice, or that others
    /// revised after the import's base version, is refused with the other faults.
    /// </summary>
    /// <param name="importId">Id.</param>
    /// <param name="pieces">Pieces that were sent; null where the caller does not say.</param>
    /// <param name="provenance">Who publishes, and when; the reason is the import's.</param>
    /// <param name="cancellation">Ends the wait for other writers.</param>
    Task<PublishOutcome> PublishAsync(string importId, int? pieces, Provenance provenance, CancellationToken cancellation);

    /// <summary>Gives an import up and drops what it staged; null where there is none. A published one stays as it is.</summary>
    /// <param name="importId">Id.</param>
    /// <param name="provenance">Who, why, when.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<ImportHead?> CancelAsync(string importId, Provenance provenance, CancellationToken cancellation);

    /// <summary>What was refused, in order.</summary>
    /// <param name="importId">Id.</param>
    /// <param name="skip">How many to pass over.</param>
    /// <param name="most">How many at most.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlyList<ImportRefusal>> ReadRefusalsAsync(string importId, int skip, int most, CancellationToken cancellation);
}

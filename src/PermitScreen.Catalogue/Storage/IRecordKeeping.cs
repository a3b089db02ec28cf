namespace PermitScreen.Catalogue.Storage;

/// <summary>Verifying, backing up and restoring the records while the service goes on.</summary>
/// <exception cref="StoreException">Thrown by every member where the records cannot be read or written; nothing was changed then.</exception>
public interface IRecordKeeping
{
    /// <summary>Reads every record again: pages of the database, the audit chain, every revision and its content, the state of every version.</summary>
    /// <param name="knownHash">Hash of an entry that was noted down outside; null where none is given.</param>
    /// <param name="cancellation">Ends the reading.</param>
    IAsyncEnumerable<VerificationStep> VerifyAsync(Digest? knownHash, CancellationToken cancellation);

    /// <summary>Copies the records as of one instant to a file, while others read and write.</summary>
    /// <param name="path">File to be made; there must be none.</param>
    /// <param name="cancellation">Ends the copying; the file is then removed.</param>
    /// <returns>The version that the copy holds.</returns>
    Task<VersionStamp> BackUpAsync(string path, CancellationToken cancellation);

    /// <summary>Verifies a backup without using it.</summary>
    /// <param name="path">File.</param>
    /// <param name="cancellation">Ends the reading.</param>
    /// <returns>The version that it holds.</returns>
    /// <exception cref="StoreException">It is no backup, damaged, or of a newer version of this program; the message says which.</exception>
    Task<VersionStamp> CheckBackupAsync(string path, CancellationToken cancellation);

    /// <summary>
    /// Replaces the records by those of a backup, all or nothing, under a version newer than that of either and another timeline; the audit log
    /// gets an entry that names the hash of the log that was replaced.
    /// </summary>
    /// <param name="path">Backup, verified before.</param>
    /// <param name="keepAs">File to be made of what is replaced.</param>
    /// <param name="provenance">Who, why, when.</param>
    /// <param name="cancellation">Ends the wait for writers; a restore that has begun is finished.</param>
    Task<RestoreResult> RestoreAsync(string path, string keepAs, Provenance provenance, CancellationToken cancellation);
}

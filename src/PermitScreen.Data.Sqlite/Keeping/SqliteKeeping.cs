using System.Runtime.CompilerServices;
using System.Threading.Channels;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Records;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>Verifies, backs up and restores records in SQLite.</summary>
/// <param name="file">File with its connections.</param>
internal sealed class SqliteKeeping(RecordsFile file) : IRecordKeeping
{
    private readonly Backups _backups = new(file);

    /// <inheritdoc/>
    public async IAsyncEnumerable<VerificationStep> VerifyAsync(Digest? knownHash, [EnumeratorCancellation] CancellationToken cancellation)
    {
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        var steps = Channel.CreateUnbounded<VerificationStep>();
        var token = stop.Token;
        var work = Task.Run(() => Verify(knownHash, steps.Writer, token), CancellationToken.None);
        try
        {
            await foreach (var step in steps.Reader.ReadAllAsync(cancellation))
            {
                yield return step;
            }
        }
        finally
        {
            // Also where the caller reads no further.
            await stop.CancelAsync();
            await work.ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }

        await work;
    }

    /// <inheritdoc/>
    public Task<VersionStamp> BackUpAsync(string path, CancellationToken cancellation) => Task.Run(() => _backups.Make(path, cancellation), cancellation);

    /// <inheritdoc/>
    public Task<VersionStamp> CheckBackupAsync(string path, CancellationToken cancellation) => Task.Run(() => _backups.Check(path, cancellation), cancellation);

    /// <inheritdoc/>
    public Task<RestoreResult> RestoreAsync(string path, string keepAs, Provenance provenance, CancellationToken cancellation) => Task.Run(
        () => file.Writer.AloneAsync(writer => new Restore(file, _backups).Do(writer, path, keepAs, provenance), cancellation), cancellation);

    private void Verify(Digest? knownHash, ChannelWriter<VerificationStep> steps, CancellationToken cancellation)
    {
        try
        {
            using var lease = file.Readers.Rent();
            Verification.Run(lease.Database, knownHash, step => steps.TryWrite(step), cancellation);
            lease.GiveBack();
        }
        finally
        {
            steps.Complete();
        }
    }
}

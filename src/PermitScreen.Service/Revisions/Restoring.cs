using System.Globalization;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service.Revisions;

/// <summary>Restores a backup while the service goes on.</summary>
/// <param name="place">Where the records are.</param>
/// <param name="keeping">Records.</param>
/// <param name="desk">Warms the snapshot.</param>
/// <param name="worker">Puts lines that are not kept on the backlog.</param>
internal sealed class Restoring(RecordsPlace place, IRecordKeeping keeping, ChangeDesk desk, LineWorker worker)
{
    /// <summary>Verifies the backup and puts it in the place of the records.</summary>
    /// <param name="path">Backup.</param>
    /// <param name="provenance">Who, why, when.</param>
    /// <param name="cancellation">Ends it before it begins to replace anything.</param>
    public async Task<RestoreBackupResponse> RunAsync(string path, Provenance provenance, CancellationToken cancellation)
    {
        await keeping.CheckBackupAsync(path, cancellation);
        var keptAs = string.Create(CultureInfo.InvariantCulture, $"replaced-{provenance.Instant:yyyyMMdd'T'HHmmssfff'Z'}.db");
        var result = await keeping.RestoreAsync(path, place.FileOf(keptAs), provenance, cancellation);
        await desk.WarmAsync();
        worker.RenewSoon();
        return new RestoreBackupResponse
        {
            RestoredVersion = result.Restored,
            CatalogueVersion = result.Now.Version,
            ReplacedVersion = result.Replaced,
            KeptAs = keptAs,
        };
    }
}

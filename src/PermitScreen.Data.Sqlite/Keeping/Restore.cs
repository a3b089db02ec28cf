using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Records;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>
/// Replaces the records by those of a backup. Everything that is new about the restored records (timeline, version, change set, audit entry) is
/// written into a copy of the backup first, and the copy then takes the place of the records in one transaction. However the process ends, the
/// records are the old ones or the restored ones, and there is nothing to be finished afterwards. Damaged records can be replaced: they are why one
/// restores, so that nothing more of them is needed than a version to be newer than.
/// </summary>
/// <param name="file">Records.</param>
/// <param name="backups">Makes backups.</param>
internal sealed class Restore(RecordsFile file, Backups backups)
{
    private const string Action = "restore backup";

    /// <summary>Copy that is made ready; one that a process left behind is removed when the records are opened.</summary>
    public const string ReadyName = "catalogue.restoring";

    /// <summary>Restores.</summary>
    /// <param name="writer">Connection that writes, without an open transaction; nobody else writes meanwhile.</param>
    /// <param name="path">Backup.</param>
    /// <param name="keepAs">File to be made of what is replaced.</param>
    /// <param name="provenance">Who, why, when.</param>
    public RestoreResult Do(Database writer, string path, string keepAs, Provenance provenance)
    {
        var ready = Path.Combine(file.Settings.Folder, ReadyName);
        try
        {
            using var copy = backups.OpenCopy(path, ready);
            copy.Guarded(c =>
            {
                Verification.Demand(c, CancellationToken.None);
                return true;
            });
            var replaced = ReplacedRecords.Read(writer);
            var sound = backups.Keep(keepAs);
            var subject = replaced.Words + (sound ? "" : "; the replaced records were damaged");
            var (restored, now) = copy.Guarded(c => MakeReady(c, replaced.Version, subject, provenance with { Instant = Instants.Kept(provenance.Instant) }));
            Reached(StoreMoment.BeforeRestore);
            PageCopy.Run(copy, writer, () => Reached(StoreMoment.InRestore));
            Reached(StoreMoment.AfterRestore);
            return new RestoreResult(restored, replaced.Version, now.Stamp);
        }
        finally
        {
            Backups.Remove(ready);
        }
    }

    private static (long Restored, VersionRow Now) MakeReady(Database copy, long replaced, string inPlaceOf, Provenance provenance)
    {
        var held = VersionRow.Read(copy);
        var version = Math.Max(held.Version, replaced) + 1;
        var subject = FormattableString.Invariant($"version {held.Version}, in place of {inPlaceOf}");
        copy.Run("BEGIN IMMEDIATE");
        var now = ChangeSetWriter.Write(copy, held with { Timeline = Guid.NewGuid() }, version, Action, subject, provenance, []);
        copy.Run("COMMIT");
        return (held.Version, now);
    }

    private void Reached(StoreMoment moment) => file.Settings.Probe?.Reached(moment, Action);
}

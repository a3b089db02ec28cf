using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service.Revisions;

/// <summary>Reads every record and every kept line again.</summary>
/// <param name="keeping">Records.</param>
/// <param name="store">Records.</param>
/// <param name="lines">Kept lines.</param>
/// <param name="renewal">Puts damaged lines on the backlog.</param>
/// <param name="time">Clock, for how often progress is told.</param>
internal sealed class RecordsVerification(IRecordKeeping keeping, ICatalogueStore store, ILineStore lines, BacklogRenewal renewal, TimeProvider time)
{
    private const string LinesStage = "kept lines";
    private static readonly TimeSpan BetweenReports = TimeSpan.FromMilliseconds(200);

    /// <summary>Verifies, telling progress and problems as they are found, the result last.</summary>
    /// <param name="known">Hash of an entry that was noted down outside; null where none is given.</param>
    /// <param name="tell">Takes each message.</param>
    /// <param name="cancellation">Ends it.</param>
    public async Task RunAsync(Digest? known, Func<VerifyRecordsResponse, CancellationToken, Task> tell, CancellationToken cancellation)
    {
        var problems = 0L;
        var (stage, reported) = ("", time.GetTimestamp());
        var done = new Dictionary<string, long>(StringComparer.Ordinal);
        await foreach (var step in keeping.VerifyAsync(known, cancellation))
        {
            done[step.Stage] = Math.Max(step.Done, done.GetValueOrDefault(step.Stage));
            problems += step.Problem is null ? 0 : 1;
            if (step.Problem is not null || step.Stage != stage || time.GetElapsedTime(reported) >= BetweenReports)
            {
                (stage, reported) = (step.Stage, time.GetTimestamp());
                await tell(Message(step.Stage, step.Done, step.Total, step.Problem), cancellation);
            }
        }

        var (read, damaged) = await LinesAsync(tell, cancellation);
        problems += damaged;
        var result = new VerifyResult { Sound = problems == 0, ProblemCount = problems, LineCount = read };
        result.AuditEntryCount = done.GetValueOrDefault(VerificationStages.Audit);
        result.RevisionCount = done.GetValueOrDefault(VerificationStages.Revisions);
        if (problems == 0)
        {
            result.CatalogueVersion = (await store.ReadVersionAsync(cancellation)).Version;
            result.NewestHash = (await store.ReadAuditAsync(null, 1, cancellation))[0].Hash.ToString();
        }

        await tell(new VerifyRecordsResponse { Stage = "result", Result = result }, cancellation);
    }

    private static VerifyRecordsResponse Message(string stage, long done, long? total, string? problem)
    {
        var message = new VerifyRecordsResponse { Stage = stage, Done = done };
        if (total is { } all)
        {
            message.Total = all;
        }

        if (problem is not null)
        {
            message.Problems.Add(problem);
        }

        return message;
    }

    private async Task<(long Read, long Damaged)> LinesAsync(Func<VerifyRecordsResponse, CancellationToken, Task> tell, CancellationToken cancellation)
    {
        var keys = lines.AllKeys();
        var damaged = new List<Digest>();
        var reported = time.GetTimestamp();
        for (var i = 0; i < keys.Count; i++)
        {
            cancellation.ThrowIfCancellationRequested();
            if (lines.Find(keys[i]) is not { } blob || LineBlob.Decode(keys[i], blob) is null)
            {
                damaged.Add(keys[i]);
                await tell(Message(LinesStage, i + 1, keys.Count, $"The kept lines {keys[i]} are damaged; they are computed anew and were not used."), cancellation);
            }
            else if (time.GetElapsedTime(reported) >= BetweenReports)
            {
                reported = time.GetTimestamp();
                await tell(Message(LinesStage, i + 1, keys.Count, null), cancellation);
            }
        }

        if (damaged.Count > 0)
        {
            lines.Delete([.. damaged]);
            await renewal.RenewMissingAsync(cancellation);
        }

        return (keys.Count, damaged.Count);
    }
}

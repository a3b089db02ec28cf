using System.Text;
using Grpc.Core;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;

namespace PermitScreen.Service.Revisions;

/// <summary>Who writes, why and when, as a call says it.</summary>
/// <param name="place">Where the records are: those that are removed at the end take no changes, which would be lost.</param>
/// <param name="time">Clock.</param>
internal sealed class ChangeCaller(RecordsPlace place, TimeProvider time)
{
    /// <summary>Metadata that names who is writing. A sign-on before the service sets it; a caller must not be able to.</summary>
    public const string ActorHeader = "x-permitscreen-actor";

    /// <summary>The same in UTF-8, for names outside ASCII.</summary>
    public const string ActorBinaryHeader = "x-permitscreen-actor-bin";

    private const int LongestActor = 200;
    private const int LongestReason = 2000;

    /// <summary>Who, why and when; meaningless where faults were added.</summary>
    /// <param name="context">Call.</param>
    /// <param name="reason">Reason.</param>
    /// <param name="faults">Takes every fault.</param>
    /// <exception cref="RpcException">FAILED_PRECONDITION where the records do not last.</exception>
    public Provenance Read(ServerCallContext context, string reason, FaultList faults)
    {
        RequireLasting();
        if (string.IsNullOrWhiteSpace(reason) || reason.Length > LongestReason)
        {
            faults.Add("change_reason", string.IsNullOrWhiteSpace(reason)
                ? "Missing; say why, in words that a colleague understands years later."
                : FormattableString.Invariant($"Found {reason.Length} characters; allowed are at most {LongestReason}."));
        }

        RequirePlain("change_reason", reason, LongestReason, faults);

        return new Provenance(Actor(context, faults), reason.Trim(), Now());
    }

    /// <summary>Who and when, where no reason is asked for.</summary>
    /// <param name="context">Call.</param>
    /// <param name="faults">Takes every fault.</param>
    /// <exception cref="RpcException">FAILED_PRECONDITION where the records do not last.</exception>
    public Provenance Read(ServerCallContext context, FaultList faults)
    {
        RequireLasting();
        return new Provenance(Actor(context, faults), "", Now());
    }

    /// <summary>The stamp of a request; null where it has no id.</summary>
    /// <param name="requestId">Id, a UUID; may be empty.</param>
    /// <param name="fingerprint">Digest of the request without its id.</param>
    /// <param name="faults">Takes every fault.</param>
    public static RequestStamp? Stamp(string requestId, Digest fingerprint, FaultList faults)
    {
        if (requestId.Length == 0)
        {
            return null;
        }

        if (!Guid.TryParseExact(requestId, "D", out var id) || id == Guid.Empty)
        {
            faults.Add("request_id", $"Found \"{requestId}\"; allowed is a UUID such as 6f0a3c1e-2f4b-4a7e-9a43-0b8f6f1c2d3e, a new one for each request.");
            return null;
        }

        return new RequestStamp(id.ToString("D"), fingerprint);
    }

    /// <summary>Adds a fault where a change does not say which revision it rests on.</summary>
    /// <param name="faults">Takes the fault.</param>
    /// <param name="field">Field.</param>
    /// <param name="etag">Etag.</param>
    public static void RequireEtag(FaultList faults, string field, string etag)
    {
        if (etag.Length == 0)
        {
            faults.Add(field, "Missing; give the etag of the revision that the change rests on, so that nobody else's change is lost.");
        }
    }

    /// <summary>Adds a fault where a text that is kept holds what no text should.</summary>
    /// <param name="field">Field.</param>
    /// <param name="text">Text.</param>
    /// <param name="most">Most characters.</param>
    /// <param name="faults">Takes the fault.</param>
    public static void RequirePlain(string field, string text, int most, FaultList faults)
    {
        if (text.Length > most || text.Any(c => char.IsControl(c) && c is not ('\n' or '\r' or '\t')))
        {
            faults.Add(field, FormattableString.Invariant($"Allowed are at most {most} characters, none of them a control character but tabs and ends of lines."));
        }
    }

    private static string Actor(ServerCallContext context, FaultList faults)
    {
        var actor = context.RequestHeaders.GetValueBytes(ActorBinaryHeader) is { } bytes ? Encoding.UTF8.GetString(bytes) : context.RequestHeaders.GetValue(ActorHeader) ?? "";
        actor = actor.Trim();
        if (actor.Length is 0 or > LongestActor || actor.Any(char.IsControl))
        {
            faults.Add(ActorHeader, actor.Length == 0
                ? "Missing; name who is writing in this metadata of the call."
                : FormattableString.Invariant($"Allowed are at most {LongestActor} characters, none of them a control character."));
        }

        return actor;
    }

    private void RequireLasting()
    {
        if (place.Temporary)
        {
            throw BadRequests.Precondition("records", "This service was started on files, and its records end with it: a change would be lost. Start it with --data and a folder, and import the files.");
        }
    }

    private DateTimeOffset Now() => DateTimeOffset.FromUnixTimeMilliseconds(time.GetUtcNow().ToUnixTimeMilliseconds());
}

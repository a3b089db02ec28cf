using Google.Protobuf;
using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Revisions;

/// <summary>
/// Takes policy documents through their states (rule B9): a draft is written and revised, confirmed by a named person, put in force between two
/// days, withdrawn. The numbers of a document that was put in force stay as they are.
/// </summary>
public sealed class PolicyChanges
{
    private readonly ICatalogue _catalogue;
    private readonly ChangeDesk _desk;
    private readonly ChangeCaller _caller;

    internal PolicyChanges(ICatalogue catalogue, ChangeDesk desk, ChangeCaller caller) => (_catalogue, _desk, _caller) = (catalogue, desk, caller);

    internal async Task<Policy> CreateAsync(CreatePolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var (provenance, stamp) = Caller(request, request.ChangeReason, request.RequestId, context, faults);
        if (await RepeatedAsync(stamp, request.Policy, context) is { } before)
        {
            return before;
        }

        var content = Draft(request.Policy, faults);
        if (content is not null)
        {
            var snapshot = await _catalogue.CurrentAsync(null, context.CancellationToken);
            var newest = PolicyDocuments.Newest(snapshot, request.Policy.Name);
            var next = (newest is null ? 0 : PolicyDocuments.VersionOf(newest.Revision.Head.Name)) + 1;
            if (request.Policy.DocumentVersion != next)
            {
                var there = newest is null ? "" : $"the newest document is {newest.Revision.Head.Name}, ";
                faults.Add("policy.document_version", FormattableString.Invariant($"Found {request.Policy.DocumentVersion}; {there}the next document of {request.Policy.Name} is {next}."));
            }
        }

        return await KeepAsync("create policy", content, c => new Edit.Add(c), provenance, stamp, request.ValidateOnly, faults, context.CancellationToken);
    }

    internal async Task<Policy> UpdateAsync(UpdatePolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var (provenance, stamp) = Caller(request, request.ChangeReason, request.RequestId, context, faults);
        if (await RepeatedAsync(stamp, request.Policy, context) is { } before)
        {
            return before;
        }

        var content = Draft(request.Policy, faults);
        ChangeCaller.RequireEtag(faults, "policy.etag", request.Policy?.Etag ?? "");
        if (content is not null && !faults.Any)
        {
            RequireState(await NewestAsync(content.Name, context.CancellationToken), "revised; add the next document of the policy instead", PolicyState.Draft);
        }

        return await KeepAsync("update policy", content, c => new Edit.Revise(c, request.Policy!.Etag), provenance, stamp, request.ValidateOnly, faults, context.CancellationToken);
    }

    internal Task<Policy> ConfirmAsync(ConfirmPolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var (provenance, stamp) = Caller(request, request.ChangeReason, request.RequestId, context, faults);
        if (request.Confirmation is null)
        {
            faults.Add("confirmation", "Missing; name the person who confirmed the numbers, the day, and the decision.");
        }

        return StepAsync("confirm policy", request.Name, request.Etag, faults, provenance, stamp, context, policy =>
        {
            RequireState(policy, "confirmed", PolicyState.Draft);
            policy.Confirmation = request.Confirmation;
        });
    }

    internal Task<Policy> EnactAsync(EnactPolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var (provenance, stamp) = Caller(request, request.ChangeReason, request.RequestId, context, faults);
        if (request.InForceFrom is null)
        {
            faults.Add("in_force_from", "Missing; give the first day in force.");
        }

        return StepAsync("enact policy", request.Name, request.Etag, faults, provenance, stamp, context, policy =>
        {
            RequireState(policy, "put in force", PolicyState.Draft);
            if (policy.Confirmation is null && !policy.Demonstration)
            {
                throw BadRequests.Precondition(request.Name, $"{request.Name} is not confirmed: a named person has to confirm its numbers for the authority before it is put in force.");
            }

            policy.State = PolicyState.InForce;
            policy.InForceFrom = request.InForceFrom;
            policy.InForceTo = request.InForceTo;
        });
    }

    internal Task<Policy> WithdrawAsync(WithdrawPolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var (provenance, stamp) = Caller(request, request.ChangeReason, request.RequestId, context, faults);
        return StepAsync("withdraw policy", request.Name, request.Etag, faults, provenance, stamp, context, policy =>
        {
            RequireState(policy, "withdrawn again", PolicyState.Draft, PolicyState.InForce);
            policy.State = PolicyState.Withdrawn;
        });
    }

    private static void RequireState(Policy policy, string what, params ReadOnlySpan<PolicyState> allowed)
    {
        if (!allowed.Contains(policy.State))
        {
            var state = policy.State == PolicyState.InForce ? "in force" : policy.State == PolicyState.Withdrawn ? "withdrawn" : "a draft";
            throw BadRequests.Precondition(CanonicalForm.DocumentName(policy), $"{CanonicalForm.DocumentName(policy)} is {state} and cannot be {what}.");
        }
    }

    private static ResourceContent? Draft(Policy? policy, FaultList faults)
    {
        if (policy is null)
        {
            faults.Add("policy", "Missing; give the document.");
            return null;
        }

        var at = faults.Under("policy");
        if (policy.State is not (PolicyState.Draft or PolicyState.Unspecified))
        {
            at.Add("state", "A document is written as a draft; ConfirmPolicy and EnactPolicy take it further.");
        }

        if (policy.Confirmation is not null)
        {
            at.Add("confirmation", "A document is written unconfirmed; ConfirmPolicy says who confirmed its numbers.");
        }

        return Door.Policy(new Policy(policy) { State = PolicyState.Draft }, at)?.Content;
    }

    private (Provenance Provenance, RequestStamp? Stamp) Caller(IMessage request, string reason, string requestId, ServerCallContext context, FaultList faults) =>
        (_caller.Read(context, reason, faults), ChangeCaller.Stamp(requestId, CanonicalForm.Fingerprint(request), faults));

    private async Task<Policy?> RepeatedAsync(RequestStamp? stamp, Policy? policy, ServerCallContext context) =>
        policy is not null && await _desk.FindRepeatedAsync(stamp, ResourceKind.Policy, CanonicalForm.DocumentName(policy), context.CancellationToken) is { Revision: { } before }
            ? CanonicalForm.Policy(before)
            : null;

    private async Task<Policy> NewestAsync(string name, CancellationToken cancellation)
    {
        var snapshot = await _catalogue.CurrentAsync(null, cancellation);
        return CanonicalForm.Policy((snapshot.Policies.GetValueOrDefault(name) ?? throw PolicyDocuments.NoSuch(snapshot, name)).Revision);
    }

    private async Task<Policy> StepAsync(
        string action, string name, string etag, FaultList faults, Provenance provenance, RequestStamp? stamp, ServerCallContext context, Action<Policy> change)
    {
        Names.PolicyDocument(faults, "name", name);
        ChangeCaller.RequireEtag(faults, "etag", etag);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        if (await _desk.FindRepeatedAsync(stamp, ResourceKind.Policy, name, context.CancellationToken) is { Revision: { } before })
        {
            return CanonicalForm.Policy(before);
        }

        var policy = await NewestAsync(name, context.CancellationToken);
        if (policy.Etag == etag)
        {
            change(policy);
        }
        else
        {
            etag = ChangeDesk.NeverNewest;
        }

        // With an old etag the records refuse the change, or know it as a retry; the content is then not looked at.
        var content = Door.Policy(policy, faults)?.Content;
        return await KeepAsync(action, content, c => new Edit.Revise(c, etag), provenance, stamp, validateOnly: false, faults, context.CancellationToken);
    }

    private async Task<Policy> KeepAsync(
        string action, ResourceContent? content, Func<ResourceContent, Edit> edit, Provenance provenance, RequestStamp? stamp, bool validateOnly, FaultList faults, CancellationToken cancellation)
    {
        if (faults.Any || content is null)
        {
            throw BadRequests.From("The policy", faults.All);
        }

        if (validateOnly)
        {
            return Policy.Parser.ParseFrom(content.Bytes.Span);
        }

        var (revision, _) = await _desk.CommitAsync(new ChangeRequest(action, edit(content), provenance, stamp), ResourceKind.Policy, cancellation);
        return CanonicalForm.Policy(revision!);
    }
}

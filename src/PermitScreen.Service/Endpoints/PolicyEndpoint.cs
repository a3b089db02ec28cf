using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Endpoints;

/// <summary>PolicyService: reads, checks and changes policy documents.</summary>
/// <param name="catalogue">Catalogue, which holds the policies too.</param>
/// <param name="changes">Makes changes.</param>
public sealed class PolicyEndpoint(ICatalogue catalogue, PolicyChanges changes) : PolicyService.PolicyServiceBase
{
    private const int DefaultPolicies = 50;
    private const int MostPerPage = 1000;

    /// <inheritdoc/>
    public override async Task<GetPolicyResponse> GetPolicy(GetPolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        Names.PolicyReference(faults, "name", request.Name);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        var snapshot = await Snapshots.ReadAsync(catalogue, request.HasAsOfVersion ? request.AsOfVersion : null, [], context.CancellationToken);
        var entry = PolicyDocuments.Newest(snapshot, request.Name) ?? throw PolicyDocuments.NoSuch(snapshot, request.Name);
        return new GetPolicyResponse { Policy = CanonicalForm.Policy(entry.Revision) };
    }

    /// <inheritdoc/>
    public override async Task<ListPoliciesResponse> ListPolicies(ListPoliciesRequest request, ServerCallContext context)
    {
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultPolicies, MostPerPage);
        var asOf = Pages.Read(request.PageToken)?.Version ?? (request.HasAsOfVersion ? request.AsOfVersion : null);
        var snapshot = await Snapshots.ReadAsync(catalogue, asOf, [], context.CancellationToken);
        var (version, start) = Pages.ReadIndex(request.PageToken, snapshot.Version, snapshot.Policies.Count);
        var response = new ListPoliciesResponse { NextPageToken = Pages.Next(version, start, size, snapshot.Policies.Count), CatalogueVersion = snapshot.Version };
        response.Policies.AddRange(snapshot.Policies.Values.Skip(start).Take(size).Select(p => CanonicalForm.Policy(p.Revision)));
        return response;
    }

    /// <inheritdoc/>
    public override Task<ValidatePolicyResponse> ValidatePolicy(ValidatePolicyRequest request, ServerCallContext context)
    {
        if (request.Policy is null)
        {
            throw BadRequests.Of("policy", "Missing; give the policy to be checked.");
        }

        var faults = new FaultList();
        Door.Policy(request.Policy, faults);
        var response = new ValidatePolicyResponse();
        response.Faults.AddRange(faults.All.Select(ReasonWriter.Write));
        return Task.FromResult(response);
    }

    /// <inheritdoc/>
    public override async Task<CreatePolicyResponse> CreatePolicy(CreatePolicyRequest request, ServerCallContext context) =>
        new() { Policy = await changes.CreateAsync(request, context) };

    /// <inheritdoc/>
    public override async Task<UpdatePolicyResponse> UpdatePolicy(UpdatePolicyRequest request, ServerCallContext context) =>
        new() { Policy = await changes.UpdateAsync(request, context) };

    /// <inheritdoc/>
    public override async Task<ConfirmPolicyResponse> ConfirmPolicy(ConfirmPolicyRequest request, ServerCallContext context) =>
        new() { Policy = await changes.ConfirmAsync(request, context) };

    /// <inheritdoc/>
    public override async Task<EnactPolicyResponse> EnactPolicy(EnactPolicyRequest request, ServerCallContext context) =>
        new() { Policy = await changes.EnactAsync(request, context) };

    /// <inheritdoc/>
    public override async Task<WithdrawPolicyResponse> WithdrawPolicy(WithdrawPolicyRequest request, ServerCallContext context) =>
        new() { Policy = await changes.WithdrawAsync(request, context) };
}

using Grpc.Core;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Endpoints;

/// <summary>PolicyService: reads and checks policies.</summary>
/// <param name="policies">Policies.</param>
public sealed class PolicyEndpoint(PolicyShelf policies) : PolicyService.PolicyServiceBase
{
    private const int DefaultPolicies = 50;
    private const int MostPerPage = 1000;

    /// <inheritdoc/>
    public override Task<GetPolicyResponse> GetPolicy(GetPolicyRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        Names.Policy(faults, "name", request.Name);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        var shelved = policies.Find(request.Name)
            ?? throw BadRequests.NotFound("permitscreen.dev/Policy", request.Name, $"Known are: {string.Join(", ", policies.Names)}.");
        return Task.FromResult(new GetPolicyResponse { Policy = shelved.Contract });
    }

    /// <inheritdoc/>
    public override Task<ListPoliciesResponse> ListPolicies(ListPoliciesRequest request, ServerCallContext context)
    {
        var all = policies.All;
        var (start, count) = Pages.Read(request.HasPageSize, request.PageSize, request.PageToken, DefaultPolicies, MostPerPage, all.Count);
        var response = new ListPoliciesResponse { NextPageToken = Pages.Next(start, count, all.Count) };
        response.Policies.AddRange(all.Skip(start).Take(count).Select(p => p.Contract));
        return Task.FromResult(response);
    }

    /// <inheritdoc/>
    public override Task<ValidatePolicyResponse> ValidatePolicy(ValidatePolicyRequest request, ServerCallContext context)
    {
        if (request.Policy is null)
        {
            throw BadRequests.Of("policy", "Missing; give the policy to be checked.");
        }

        var faults = new FaultList();
        PolicyMapper.Map(request.Policy, faults);
        var response = new ValidatePolicyResponse();
        response.Faults.AddRange(faults.All.Select(ReasonWriter.Write));
        return Task.FromResult(response);
    }
}

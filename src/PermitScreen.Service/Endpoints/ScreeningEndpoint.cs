using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Policies;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;
using PolicyState = PermitScreen.Rating.Policies.PolicyState;

namespace PermitScreen.Service.Endpoints;

/// <summary>ScreeningService: screens one application over its route.</summary>
/// <param name="catalogue">Catalogue.</param>
/// <param name="policies">Policies.</param>
/// <param name="today">The authority's civil date.</param>
public sealed class ScreeningEndpoint(ICatalogue catalogue, PolicyShelf policies, AuthorityDate today) : ScreeningService.ScreeningServiceBase
{
    private const int DefaultNextEffects = 5;
    private const int MostNextEffects = 200;

    /// <inheritdoc/>
    public override async Task<ScreenApplicationResponse> ScreenApplication(ScreenApplicationRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var application = request.Application is null ? null : ApplicationMapper.Map(request.Application, faults.Under("application"));
        if (request.Application is null)
        {
            faults.Add("application", "Missing; give the application to be screened.");
        }

        Names.Policy(faults, "policy", request.Policy);
        var asOf = faults.Date("as_of_date", request.AsOfDate) ?? today.Today();
        var next = faults.Optional("next_effects", request.HasNextEffects, request.NextEffects, 0, MostNextEffects) ?? DefaultNextEffects;
        if (application?.TravelTo < asOf)
        {
            faults.Under("application").Add("travel_to", FormattableString.Invariant($"Found {application.TravelTo:yyyy-MM-dd}, before the as-of date {asOf:yyyy-MM-dd}; screen travel that is still to come, or state the as_of_date of the time."));
        }

        if (faults.Any || application is null)
        {
            throw BadRequests.From("The request", faults.All);
        }

        var document = policies.Find(request.Policy)?.Document
            ?? throw BadRequests.NotFound("permitscreen.dev/Policy", request.Policy, $"Known are: {string.Join(", ", policies.Names)}.");
        RequireUsable(document, asOf);
        var snapshot = await catalogue.CurrentAsync(context.CancellationToken);
        if (request.HasMinCatalogueVersion && snapshot.Version < request.MinCatalogueVersion)
        {
            throw new RpcException(new Status(StatusCode.Unavailable, FormattableString.Invariant($"The catalogue is at version {snapshot.Version}; {request.MinCatalogueVersion} was asked for. No verdict was given.")));
        }

        if (request.ValidateOnly)
        {
            var checkedOnly = new ScreenApplicationResponse();
            checkedOnly.Gaps.AddRange(ApplicationGaps.Of(application, snapshot).Select(ReasonWriter.WriteGap));
            return checkedOnly;
        }

        var result = RouteScreening.Of(application, document, snapshot, asOf, context.CancellationToken);
        var writer = new ScreeningWriter(request.View == ScreeningView.Full, next);
        return new ScreenApplicationResponse { Screening = writer.Write(result, application, document, asOf) };
    }

    private static void RequireUsable(PolicyDocument policy, DateOnly asOf)
    {
        if (policy.State == PolicyState.Withdrawn)
        {
            throw BadRequests.Precondition(policy.Name, $"{policy.Name} is withdrawn; screen under a policy that is in force.");
        }

        if (asOf < policy.InForceFrom || asOf > policy.InForceTo)
        {
            throw BadRequests.Precondition(policy.Name, FormattableString.Invariant($"{policy.Name} is not in force on {asOf:yyyy-MM-dd}."));
        }
    }
}

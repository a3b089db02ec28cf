using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Endpoints;

/// <summary>ScreeningService: screens one application over its route.</summary>
/// <param name="catalogue">Catalogue.</param>
/// <param name="today">The authority's civil date.</param>
public sealed class ScreeningEndpoint(ICatalogue catalogue, AuthorityDate today) : ScreeningService.ScreeningServiceBase
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

        Names.PolicyReference(faults, "policy", request.Policy);
        if (request.HasAsOfVersion && request.HasMinCatalogueVersion)
        {
            faults.Add("as_of_version", "Given together with min_catalogue_version; ask for one exact version, or for a current answer.");
        }

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

        var snapshot = await SnapshotAsync(request, [.. application.Crossings.Select(c => c.Structure).Distinct()], context.CancellationToken);
        var policy = PolicyDocuments.Usable(snapshot, request.Policy, asOf);
        if (request.ValidateOnly)
        {
            var checkedOnly = new ScreenApplicationResponse();
            checkedOnly.Gaps.AddRange(ApplicationGaps.Of(application, snapshot).Select(ReasonWriter.WriteGap));
            return checkedOnly;
        }

        var result = RouteScreening.Of(application, policy, snapshot, asOf, context.CancellationToken);
        var writer = new ScreeningWriter(request.View == ScreeningView.Full, next);
        return new ScreenApplicationResponse { Screening = writer.Write(result, application, policy, asOf) };
    }

    private async Task<CatalogueSnapshot> SnapshotAsync(ScreenApplicationRequest request, IReadOnlyCollection<string> structures, CancellationToken cancellation)
    {
        if (request.HasAsOfVersion)
        {
            return await Snapshots.ReadAsync(catalogue, request.AsOfVersion, structures, cancellation);
        }

        if (!request.HasMinCatalogueVersion)
        {
            return await catalogue.CurrentAsync(null, cancellation);
        }

        var snapshot = await catalogue.CurrentAsync(null, cancellation);
        return snapshot.Version >= request.MinCatalogueVersion
            ? snapshot
            : throw new RpcException(new Status(StatusCode.Unavailable, FormattableString.Invariant($"The catalogue is at version {snapshot.Version}; {request.MinCatalogueVersion} was asked for. No verdict was given.")));
    }
}

using Grpc.Core;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Endpoints;

/// <summary>CatalogueService: reads, checks and changes structures, lists their influence lines.</summary>
/// <param name="catalogue">Catalogue.</param>
/// <param name="changes">Makes changes.</param>
public sealed class CatalogueEndpoint(ICatalogue catalogue, StructureChanges changes) : CatalogueService.CatalogueServiceBase
{
    private const int DefaultStructures = 50;
    private const int DefaultLines = 200;
    private const int MostPerPage = 1000;

    /// <summary>A page ends early rather than grow beyond what a message may have.</summary>
    private const int MostPageBytes = 8 * 1024 * 1024;

    /// <inheritdoc/>
    public override async Task<GetStructureResponse> GetStructure(GetStructureRequest request, ServerCallContext context)
    {
        var name = Name(request.Name, "name");
        var snapshot = await Snapshots.ReadAsync(catalogue, request.HasAsOfVersion ? request.AsOfVersion : null, [name], context.CancellationToken);
        return new GetStructureResponse { Structure = CanonicalForm.Structure((snapshot.Find(name) ?? throw NoSuch(name)).Revision) };
    }

    /// <inheritdoc/>
    public override async Task<ListStructuresResponse> ListStructures(ListStructuresRequest request, ServerCallContext context)
    {
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultStructures, MostPerPage);
        var from = Pages.Read(request.PageToken);
        var version = from?.Version ?? (request.HasAsOfVersion ? request.AsOfVersion : null);
        var snapshot = await Snapshots.ReadAsync(catalogue, version, null, context.CancellationToken);
        var response = new ListStructuresResponse { CatalogueVersion = snapshot.Version };
        var bytes = 0;
        foreach (var entry in snapshot.StructuresAfter(from?.Place))
        {
            if (response.Structures.Count == size || (bytes > MostPageBytes && response.Structures.Count > 0))
            {
                response.NextPageToken = Pages.Token(snapshot.Version, response.Structures[^1].Name);
                break;
            }

            context.CancellationToken.ThrowIfCancellationRequested();
            var structure = CanonicalForm.Structure(entry.Revision);
            response.Structures.Add(request.View == StructureView.Basic ? StructureViews.Basic(structure) : structure);
            bytes += request.View == StructureView.Basic ? 0 : entry.Revision.Content.Length;
        }

        return response;
    }

    /// <inheritdoc/>
    public override async Task<ValidateStructureResponse> ValidateStructure(ValidateStructureRequest request, ServerCallContext context)
    {
        if (request.Structure is null)
        {
            throw BadRequests.Of("structure", "Missing; give the structure to be checked.");
        }

        var faults = new FaultList();
        var response = new ValidateStructureResponse();
        var found = new Door(new LineLibrary(null)).Prepared(request.Structure, faults);
        context.CancellationToken.ThrowIfCancellationRequested();
        response.Faults.AddRange(faults.All.Select(ReasonWriter.Write));
        if (found is { } prepared)
        {
            var snapshot = await catalogue.CurrentAsync(null, context.CancellationToken);
            var policies = snapshot.Policies.Values.Select(p => p.Document).OfType<Rating.Policies.PolicyDocument>();
            response.Gaps.AddRange(StructureGaps.Of(prepared).Concat(StructureGaps.Under(policies, prepared)).Select(ReasonWriter.WriteGap));
            response.EffectCount = prepared.Lines.Length;
        }

        return response;
    }

    /// <inheritdoc/>
    public override async Task<ListInfluenceLinesResponse> ListInfluenceLines(ListInfluenceLinesRequest request, ServerCallContext context)
    {
        var name = Name(request.Parent, "parent");
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultLines, MostPerPage);
        var asOf = Pages.Read(request.PageToken)?.Version ?? (request.HasAsOfVersion ? request.AsOfVersion : null);
        var snapshot = await Snapshots.ReadAsync(catalogue, asOf, [name], context.CancellationToken);
        var structure = (snapshot.Find(name) ?? throw NoSuch(name)).Prepared;
        var wanted = structure.Lines
            .Where(l => (request.UnitId.Length == 0 || l.UnitId == request.UnitId) && (request.EffectId.Length == 0 || l.EffectId == request.EffectId))
            .ToList();
        if (wanted.Count == 0 && (request.UnitId.Length > 0 || request.EffectId.Length > 0))
        {
            throw BadRequests.NotFound("permitscreen.dev/InfluenceLine", $"{request.Parent} {request.UnitId} {request.EffectId}".TrimEnd(), Near(structure.Lines.Select(l => l.EffectId), request.EffectId));
        }

        var (version, start) = Pages.ReadIndex(request.PageToken, snapshot.Version, wanted.Count);
        var response = new ListInfluenceLinesResponse { LargestResidual = structure.LargestResidual, NextPageToken = Pages.Next(version, start, size, wanted.Count) };
        response.InfluenceLines.AddRange(wanted.Skip(start).Take(size).Select(LineWriter.Write));
        return response;
    }

    /// <inheritdoc/>
    public override Task<CreateStructureResponse> CreateStructure(CreateStructureRequest request, ServerCallContext context) => changes.CreateAsync(request, context);

    /// <inheritdoc/>
    public override Task<UpdateStructureResponse> UpdateStructure(UpdateStructureRequest request, ServerCallContext context) => changes.UpdateAsync(request, context);

    /// <inheritdoc/>
    public override Task<DeleteStructureResponse> DeleteStructure(DeleteStructureRequest request, ServerCallContext context) => changes.DeleteAsync(request, context);

    private static string Near(IEnumerable<string> effects, string wanted)
    {
        var known = effects.Distinct().ToList();
        var near = known.Where(e => wanted.Length > 0 && e.StartsWith(wanted, StringComparison.OrdinalIgnoreCase)).ToList();
        return near.Count > 0
            ? $"Did you mean {string.Join(" or ", near)}?"
            : Spelling.Nearest(known, wanted) is { } one ? $"Did you mean {one}?" : $"Its effects are {string.Join(", ", known)}.";
    }

    private static string Name(string name, string field)
    {
        var faults = new FaultList();
        Names.Structure(faults, field, name);
        return faults.Any ? throw BadRequests.From("The request", faults.All) : name;
    }

    private static RpcException NoSuch(string name) =>
        BadRequests.NotFound("permitscreen.dev/Structure", name, "ListStructures names those in the catalogue.");
}

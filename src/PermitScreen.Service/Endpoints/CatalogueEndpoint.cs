using Grpc.Core;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Endpoints;

/// <summary>CatalogueService: reads and checks structures, lists their influence lines. Changing them comes with a catalogue that is kept in a database.</summary>
/// <param name="catalogue">Catalogue.</param>
/// <param name="shelf">Structures as they were read.</param>
/// <param name="policies">Policies, which say what must be stated.</param>
public sealed class CatalogueEndpoint(ICatalogue catalogue, StructureShelf shelf, PolicyShelf policies) : CatalogueService.CatalogueServiceBase
{
    private const int DefaultStructures = 50;
    private const int DefaultLines = 200;
    private const int MostPerPage = 1000;

    /// <inheritdoc/>
    public override async Task<GetStructureResponse> GetStructure(GetStructureRequest request, ServerCallContext context)
    {
        await catalogue.CurrentAsync(context.CancellationToken);
        return new GetStructureResponse { Structure = shelf.Find(Name(request.Name, "name")) ?? throw NoSuch(request.Name) };
    }

    /// <inheritdoc/>
    public override async Task<ListStructuresResponse> ListStructures(ListStructuresRequest request, ServerCallContext context)
    {
        var snapshot = await catalogue.CurrentAsync(context.CancellationToken);
        var all = shelf.All;
        var (start, count) = Pages.Read(request.HasPageSize, request.PageSize, request.PageToken, DefaultStructures, MostPerPage, all.Count);
        var response = new ListStructuresResponse { CatalogueVersion = snapshot.Version, NextPageToken = Pages.Next(start, count, all.Count) };
        response.Structures.AddRange(all.Skip(start).Take(count));
        return response;
    }

    /// <inheritdoc/>
    public override Task<ValidateStructureResponse> ValidateStructure(ValidateStructureRequest request, ServerCallContext context)
    {
        if (request.Structure is null)
        {
            throw BadRequests.Of("structure", "Missing; give the structure to be checked.");
        }

        var faults = new FaultList();
        var response = new ValidateStructureResponse();
        var prepared = StructureMapper.Map(request.Structure, faults) is { } record ? StructurePreparation.Prepare(record, new LineCache(), faults) : null;
        context.CancellationToken.ThrowIfCancellationRequested();
        response.Faults.AddRange(faults.All.Select(ReasonWriter.Write));
        if (prepared is not null)
        {
            response.Gaps.AddRange(StructureGaps.Of(prepared).Concat(StructureGaps.Under(policies.All, prepared)).Select(ReasonWriter.WriteGap));
            response.EffectCount = prepared.Lines.Length;
        }

        return Task.FromResult(response);
    }

    /// <inheritdoc/>
    public override async Task<ListInfluenceLinesResponse> ListInfluenceLines(ListInfluenceLinesRequest request, ServerCallContext context)
    {
        var snapshot = await catalogue.CurrentAsync(context.CancellationToken);
        var structure = snapshot.Find(Name(request.Parent, "parent")) ?? throw NoSuch(request.Parent);
        var wanted = structure.Lines
            .Where(l => (request.UnitId.Length == 0 || l.UnitId == request.UnitId) && (request.EffectId.Length == 0 || l.EffectId == request.EffectId))
            .ToList();
        if (wanted.Count == 0 && (request.UnitId.Length > 0 || request.EffectId.Length > 0))
        {
            throw BadRequests.NotFound("permitscreen.dev/InfluenceLine", $"{request.Parent} {request.UnitId} {request.EffectId}".TrimEnd(), Near(structure.Lines.Select(l => l.EffectId), request.EffectId));
        }

        var (start, count) = Pages.Read(request.HasPageSize, request.PageSize, request.PageToken, DefaultLines, MostPerPage, wanted.Count);
        var response = new ListInfluenceLinesResponse { LargestResidual = structure.LargestResidual, NextPageToken = Pages.Next(start, count, wanted.Count) };
        response.InfluenceLines.AddRange(wanted.Skip(start).Take(count).Select(LineWriter.Write));
        return response;
    }

    /// <inheritdoc/>
    public override Task<CreateStructureResponse> CreateStructure(CreateStructureRequest request, ServerCallContext context) => throw FromFiles();

    /// <inheritdoc/>
    public override Task<UpdateStructureResponse> UpdateStructure(UpdateStructureRequest request, ServerCallContext context) => throw FromFiles();

    /// <inheritdoc/>
    public override Task<DeleteStructureResponse> DeleteStructure(DeleteStructureRequest request, ServerCallContext context) => throw FromFiles();

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

    private static RpcException FromFiles() =>
        new(new Status(StatusCode.Unimplemented, "The catalogue is read from files when the service starts; change the files and start it again."));
}

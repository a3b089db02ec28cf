using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Revisions;
using ImportState = PermitScreen.Catalogue.Storage.ImportState;

namespace PermitScreen.Service.Endpoints;

/// <summary>ImportService: many structures and policies as one change set.</summary>
public sealed class ImportEndpoint : ImportService.ImportServiceBase
{
    private const int DefaultPage = 50;
    private const int MostPerPage = 1000;
    private const int MostItems = 2000;
    private const int MostPieces = 10_000_000;
    private const int RefusalsTold = 5;
    private const int FaultsTold = 2;
    private const int LongestText = 1000;
    private const int MostSkipped = 1_000_000_000;
    private readonly IImportStore _imports;
    private readonly ICatalogueStore _store;
    private readonly ICatalogue _catalogue;
    private readonly ImportChecks _checks;
    private readonly ChangeDesk _desk;
    private readonly ChangeCaller _caller;

    internal ImportEndpoint(IImportStore imports, ICatalogueStore store, ICatalogue catalogue, ImportChecks checks, ChangeDesk desk, ChangeCaller caller) =>
        (_imports, _store, _catalogue, _checks, _desk, _caller) = (imports, store, catalogue, checks, desk, caller);

    /// <inheritdoc/>
    public override async Task<CreateImportResponse> CreateImport(CreateImportRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var provenance = _caller.Read(context, request.ChangeReason, faults);
        var id = request.ImportId.Length > 0 ? request.ImportId : Guid.NewGuid().ToString("D");
        Names.Import(faults, "import_id", ImportWriter.Name(id));
        ChangeCaller.RequirePlain("source_fingerprint", request.SourceFingerprint, LongestText, faults);
        Refuse(faults);
        var head = await _imports.BeginAsync(new ImportBeginning(id, request.SourceFingerprint, request.AllowPartial, provenance), context.CancellationToken)
            ?? throw BadRequests.Exists("permitscreen.dev/Import", ImportWriter.Name(id), $"{ImportWriter.Name(id)} was begun with other fields; give another import_id.");
        return new CreateImportResponse { Import = await WriteAsync(head, context) };
    }

    /// <inheritdoc/>
    public override async Task<GetImportResponse> GetImport(GetImportRequest request, ServerCallContext context) =>
        new() { Import = await WriteAsync(await FindAsync(request.Name, "name", context), context) };

    /// <inheritdoc/>
    public override async Task<ListImportsResponse> ListImports(ListImportsRequest request, ServerCallContext context)
    {
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultPage, MostPerPage);
        var (_, start) = Pages.ReadIndex(request.PageToken, 0, MostSkipped);
        ImportState? state = request.State switch
        {
            Contracts.V1.ImportState.Staging => ImportState.Staging,
            Contracts.V1.ImportState.Published => ImportState.Published,
            Contracts.V1.ImportState.Cancelled => ImportState.Cancelled,
            _ => null,
        };
        var heads = await _imports.ListAsync(state, start, size + 1, context.CancellationToken);
        var version = await VersionAsync(context);
        var response = new ListImportsResponse { NextPageToken = Pages.Next(0, start, size, start + heads.Count) };
        response.Imports.AddRange(heads.Take(size).Select(h => ImportWriter.Write(h, version)));
        return response;
    }

    /// <inheritdoc/>
    public override async Task<StageImportPieceResponse> StageImportPiece(StageImportPieceRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        _caller.Read(context, faults);
        Names.Import(faults, "name", request.Name);
        var index = faults.Required("piece_index", request.HasPieceIndex, request.PieceIndex, 0, MostPieces);
        var items = request.Structures.Count + request.Policies.Count;
        if (items is 0 or > MostItems)
        {
            faults.Add("structures", FormattableString.Invariant($"Found {items} structures and policies; allowed are 1 to {MostItems} in a piece."));
        }

        if (request.Origins.Count > 0 && request.Origins.Count != items)
        {
            faults.Add("origins", FormattableString.Invariant($"Found {request.Origins.Count} for {items} items; give one for each, or none."));
        }

        for (var i = 0; i < request.Origins.Count; i++)
        {
            ChangeCaller.RequirePlain(FormattableString.Invariant($"origins[{i}]"), request.Origins[i], LongestText, faults);
        }

        Refuse(faults);
        var snapshot = request.Policies.Count > 0 ? await _catalogue.CurrentAsync(null, context.CancellationToken) : null;
        var piece = _checks.Check(index, CanonicalForm.Fingerprint(request), request.Structures, request.Policies, snapshot, request.Origins, context.CancellationToken);
        var (outcome, head) = await _imports.StageAsync(ImportWriter.Id(request.Name), piece, context.CancellationToken);
        switch (outcome)
        {
            case StagingOutcome.NoSuchImport:
                throw NoSuch(request.Name);
            case StagingOutcome.NotStaging:
                throw BadRequests.Precondition(request.Name, $"{request.Name} is {Words(head!.State)}; begin another import.");
            case StagingOutcome.OtherPiece:
                throw new RpcException(new Status(StatusCode.Aborted, FormattableString.Invariant($"{request.Name} has another piece under index {index}; go on with index {head!.NextPiece}, or begin another import. Nothing was changed.")));
            case StagingOutcome.Gap:
                throw BadRequests.Of("piece_index", FormattableString.Invariant($"Found {index}; the next piece is {head!.NextPiece}."));
            default:
                var response = new StageImportPieceResponse { Import = await WriteAsync(head!, context) };
                response.Refusals.AddRange(piece.Refusals.Select(ImportWriter.Write));
                return response;
        }
    }

    /// <inheritdoc/>
    public override async Task<PublishImportResponse> PublishImport(PublishImportRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var provenance = _caller.Read(context, faults);
        Names.Import(faults, "name", request.Name);
        Refuse(faults);
        switch (await _imports.PublishAsync(ImportWriter.Id(request.Name), request.HasPieceCount ? request.PieceCount : null, provenance, context.CancellationToken))
        {
            case PublishOutcome.Published published:
                await _desk.WarmAsync();
                return new PublishImportResponse { Import = ImportWriter.Write(published.Head, await VersionAfterAsync(published.Head)) };
            case PublishOutcome.Refused refused:
                throw BadRequests.Precondition(request.Name, FormattableString.Invariant($"{refused.Head.Refused} items of {request.Name} were refused, and it does not allow that; nothing was published. ListImportRefusals tells all: ")
                    + string.Join(" ", refused.First.Take(RefusalsTold).Select(r => $"{r.Origin} {r.Resource}: {string.Join(" ", r.Faults.Take(FaultsTold))}".Trim())));
            case PublishOutcome.GivenUp:
                throw BadRequests.Precondition(request.Name, $"{request.Name} was given up; begin another import.");
            case PublishOutcome.PiecesMissing missing:
                throw BadRequests.Of("piece_count", FormattableString.Invariant($"Found {request.PieceCount}; staged are {missing.Head.NextPiece}. Send the missing pieces, or the right count."));
            default:
                throw NoSuch(request.Name);
        }
    }

    /// <inheritdoc/>
    public override async Task<CancelImportResponse> CancelImport(CancelImportRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var provenance = _caller.Read(context, faults);
        Names.Import(faults, "name", request.Name);
        Refuse(faults);
        var head = await _imports.CancelAsync(ImportWriter.Id(request.Name), provenance, context.CancellationToken) ?? throw NoSuch(request.Name);
        return head.State == ImportState.Published
            ? throw BadRequests.Precondition(request.Name, $"{request.Name} is published; revise what it brought instead.")
            : new CancelImportResponse { Import = await WriteAsync(head, context) };
    }

    /// <inheritdoc/>
    public override async Task<ListImportRefusalsResponse> ListImportRefusals(ListImportRefusalsRequest request, ServerCallContext context)
    {
        var head = await FindAsync(request.Parent, "parent", context);
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultPage, MostPerPage);
        var (_, start) = Pages.ReadIndex(request.PageToken, 0, MostSkipped);
        var refusals = await _imports.ReadRefusalsAsync(head.ImportId, start, size + 1, context.CancellationToken);
        var response = new ListImportRefusalsResponse { NextPageToken = Pages.Next(0, start, size, start + refusals.Count) };
        response.Refusals.AddRange(refusals.Take(size).Select(ImportWriter.Write));
        return response;
    }

    private static string Words(ImportState state) => state == ImportState.Published ? "published" : "given up";

    private static RpcException NoSuch(string name) => BadRequests.NotFound("permitscreen.dev/Import", name, "ListImports names those that there are.");

    private static void Refuse(FaultList faults)
    {
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }
    }

    private async Task<ImportHead> FindAsync(string name, string field, ServerCallContext context)
    {
        var faults = new FaultList();
        Names.Import(faults, field, name);
        Refuse(faults);
        return await _imports.FindAsync(ImportWriter.Id(name), context.CancellationToken) ?? throw NoSuch(name);
    }

    private async Task<Import> WriteAsync(ImportHead head, ServerCallContext context) => ImportWriter.Write(head, await VersionAsync(context));

    /// <summary>It is published, whatever becomes of this question.</summary>
    private async Task<long> VersionAfterAsync(ImportHead head)
    {
        try
        {
            return (await _store.ReadVersionAsync(CancellationToken.None)).Version;
        }
        catch (StoreException)
        {
            return head.Result?.Version ?? head.BaseVersion;
        }
    }

    private async Task<long> VersionAsync(ServerCallContext context) => (await _store.ReadVersionAsync(context.CancellationToken)).Version;
}

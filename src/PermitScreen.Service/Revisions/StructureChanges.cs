using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Revisions;

/// <summary>Creates, revises and removes structures, each as one change set.</summary>
public sealed class StructureChanges
{
    private readonly ICatalogue _catalogue;
    private readonly ChangeDesk _desk;
    private readonly Door _door;
    private readonly ChangeCaller _caller;

    internal StructureChanges(ICatalogue catalogue, ChangeDesk desk, Door door, ChangeCaller caller) =>
        (_catalogue, _desk, _door, _caller) = (catalogue, desk, door, caller);

    internal async Task<CreateStructureResponse> CreateAsync(CreateStructureRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var provenance = _caller.Read(context, request.ChangeReason, faults);
        var stamp = ChangeCaller.Stamp(request.RequestId, CanonicalForm.Fingerprint(request), faults);
        var structure = Named(request, faults);
        if (!faults.Any && await _desk.FindRepeatedAsync(stamp, ResourceKind.Structure, structure!.Name, context.CancellationToken) is { Revision: { } before })
        {
            return new CreateStructureResponse { Structure = CanonicalForm.Structure(before) };
        }

        var content = structure is null ? null : _door.Structure(structure, faults.Under("structure"));
        if (faults.Any || content is null)
        {
            throw BadRequests.From("The structure", faults.All);
        }

        if (request.ValidateOnly)
        {
            var snapshot = await _catalogue.CurrentAsync(null, context.CancellationToken);
            return snapshot.Find(content.Name) is { } there
                ? throw BadRequests.Exists("permitscreen.dev/Structure", content.Name, FormattableString.Invariant($"{content.Name} is in the catalogue since version {there.Revision.Head.FromVersion}; revise it instead."))
                : new CreateStructureResponse { Structure = Checked(structure!, content) };
        }

        var (revision, _) = await _desk.CommitAsync(new ChangeRequest("create structure", new Edit.Add(content), provenance, stamp), ResourceKind.Structure, context.CancellationToken);
        return new CreateStructureResponse { Structure = CanonicalForm.Structure(revision!) };
    }

    internal async Task<UpdateStructureResponse> UpdateAsync(UpdateStructureRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var provenance = _caller.Read(context, request.ChangeReason, faults);
        var stamp = ChangeCaller.Stamp(request.RequestId, CanonicalForm.Fingerprint(request), faults);
        if (request.Structure is null)
        {
            faults.Add("structure", "Missing; give the structure as it is to be.");
            throw BadRequests.From("The request", faults.All);
        }

        Names.Structure(faults, "structure.name", request.Structure.Name);
        ChangeCaller.RequireEtag(faults, "structure.etag", request.Structure.Etag);
        var masks = UpdateMasks.Of(request.UpdateMask, faults);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        if (await _desk.FindRepeatedAsync(stamp, ResourceKind.Structure, request.Structure.Name, context.CancellationToken) is { Revision: { } before })
        {
            return new UpdateStructureResponse { Structure = CanonicalForm.Structure(before) };
        }

        var (whole, etag) = (request.Structure, request.Structure.Etag);
        if (masks is not null)
        {
            // Where the etag is an old one there is nothing to merge with: the records refuse it, or answer a retry, before they look at content.
            var snapshot = await _catalogue.CurrentAsync(null, context.CancellationToken);
            if (snapshot.Find(whole.Name) is { } entry && entry.Revision.Head.Content.Etag == whole.Etag)
            {
                whole = UpdateMasks.Merge(masks, request.Structure, CanonicalForm.Structure(entry.Revision));
            }
            else
            {
                // Should the old content come back before the commit: what was not merged must not be taken for the whole.
                etag = ChangeDesk.NeverNewest;
            }
        }

        if (_door.Structure(whole, faults.Under("structure")) is not { } content)
        {
            throw BadRequests.From("The structure", faults.All);
        }

        if (request.ValidateOnly)
        {
            await RequireNewestAsync(content.Name, request.Structure.Etag, context.CancellationToken);
            return new UpdateStructureResponse { Structure = Checked(whole, content) };
        }

        var edit = new Edit.Revise(content, etag);
        var (revision, _) = await _desk.CommitAsync(new ChangeRequest("update structure", edit, provenance, stamp), ResourceKind.Structure, context.CancellationToken);
        return new UpdateStructureResponse { Structure = CanonicalForm.Structure(revision!) };
    }

    internal async Task<DeleteStructureResponse> DeleteAsync(DeleteStructureRequest request, ServerCallContext context)
    {
        var faults = new FaultList();
        var provenance = _caller.Read(context, request.ChangeReason, faults);
        var stamp = ChangeCaller.Stamp(request.RequestId, CanonicalForm.Fingerprint(request), faults);
        Names.Structure(faults, "name", request.Name);
        ChangeCaller.RequireEtag(faults, "etag", request.Etag);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        if (request.ValidateOnly)
        {
            return new DeleteStructureResponse { CatalogueVersion = await RequireNewestAsync(request.Name, request.Etag, context.CancellationToken) };
        }

        var edit = new Edit.Remove(ResourceKind.Structure, request.Name, request.Etag);
        var (_, version) = await _desk.CommitAsync(new ChangeRequest("delete structure", edit, provenance, stamp), ResourceKind.Structure, context.CancellationToken);
        return new DeleteStructureResponse { CatalogueVersion = version };
    }

    private static Structure? Named(CreateStructureRequest request, FaultList faults)
    {
        if (request.Structure is null)
        {
            faults.Add("structure", "Missing; give the structure to be added.");
            return null;
        }

        if (request.StructureId.Length == 0)
        {
            return request.Structure;
        }

        var name = "structures/" + request.StructureId;
        if (request.Structure.Name.Length > 0 && request.Structure.Name != name)
        {
            faults.Add("structure_id", $"Found \"{request.StructureId}\", but the structure is named \"{request.Structure.Name}\"; give one of them, or the same.");
        }

        return new Structure(request.Structure) { Name = name };
    }

    private static Structure Checked(Structure structure, ResourceContent content) => new(structure) { Etag = content.Hash.Etag, CatalogueVersion = 0 };

    private async Task<long> RequireNewestAsync(string name, string etag, CancellationToken cancellation)
    {
        var snapshot = await _catalogue.CurrentAsync(null, cancellation);
        var entry = snapshot.Find(name) ?? throw BadRequests.NotFound("permitscreen.dev/Structure", name, "It is not in the newest catalogue version.");
        return entry.Revision.Head.Content.Etag == etag ? snapshot.Version : throw BadRequests.Outdated(name, entry.Revision.Head);
    }
}

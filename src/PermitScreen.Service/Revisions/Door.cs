using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Records;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Policies;
using PermitScreen.Service.Mapping;
using Policy = PermitScreen.Contracts.V1.Policy;

namespace PermitScreen.Service.Revisions;

/// <summary>What is to be kept is checked here, whichever way it comes: malformed input and trusses that do not stand get no further.</summary>
/// <param name="lines">Gives the lines: whether a truss stands is known once it is solved.</param>
internal sealed class Door(ILineSource lines)
{
    /// <summary>A structure ready to be kept, or null with every fault.</summary>
    public ResourceContent? Structure(Structure structure, FaultList faults) => Checked(structure, faults)?.Content;

    /// <summary>A structure ready to be screened, or null with every fault.</summary>
    public PreparedStructure? Prepared(Structure structure, FaultList faults) =>
        Checked(structure, faults) is { } passed ? StructurePreparation.Prepare(passed.Record, lines, faults) : null;

    private (ResourceContent Content, StructureRecord Record)? Checked(Structure structure, FaultList faults)
    {
        var before = faults.Count;
        var bytes = CanonicalForm.Of(structure);
        CanonicalForm.RequireKnown(Contracts.V1.Structure.Parser, bytes, faults);
        return StructureMapper.Map(structure, faults, Digest.Of(bytes).Etag) is { } record && faults.Count == before && StructurePreparation.HasLines(record, lines, faults)
            ? (new ResourceContent(ResourceKind.Structure, record.Name, bytes, TrussKeys.Of(record)), record)
            : null;
    }

    /// <summary>A policy document ready to be kept, or null with every fault.</summary>
    public static (ResourceContent Content, PolicyDocument Document)? Policy(Policy policy, FaultList faults)
    {
        var before = faults.Count;
        var bytes = CanonicalForm.Of(policy);
        CanonicalForm.RequireKnown(Contracts.V1.Policy.Parser, bytes, faults);
        return PolicyMapper.Map(policy, faults) is { } document && faults.Count == before
            ? (new ResourceContent(ResourceKind.Policy, CanonicalForm.DocumentName(policy), bytes, []), document)
            : null;
    }
}

using PermitScreen.Catalogue.Lines;
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
    public ResourceContent? Structure(Structure structure, FaultList faults) => Prepared(structure, faults)?.Content;

    /// <summary>A structure ready to be kept and to be screened, or null with every fault.</summary>
    public (ResourceContent Content, PreparedStructure Prepared)? Prepared(Structure structure, FaultList faults)
    {
        var before = faults.Count;
        CanonicalForm.RequireKnown(Contracts.V1.Structure.Parser, structure, faults);
        if (StructureMapper.Map(structure, faults) is not { } record || faults.Count > before || StructurePreparation.Prepare(record, lines, faults) is not { } prepared)
        {
            return null;
        }

        return (new ResourceContent(ResourceKind.Structure, record.Name, CanonicalForm.Of(structure), TrussKeys.Of(record)), prepared);
    }

    /// <summary>A policy document ready to be kept, or null with every fault.</summary>
    public static (ResourceContent Content, PolicyDocument Document)? Policy(Policy policy, FaultList faults)
    {
        var before = faults.Count;
        CanonicalForm.RequireKnown(Contracts.V1.Policy.Parser, policy, faults);
        return PolicyMapper.Map(policy, faults) is { } document && faults.Count == before
            ? (new ResourceContent(ResourceKind.Policy, CanonicalForm.DocumentName(policy), CanonicalForm.Of(policy), []), document)
            : null;
    }
}

using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Records;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Revisions;

/// <summary>Reads kept revisions by the same mappers as new input.</summary>
/// <param name="lines">Gives the lines.</param>
internal sealed class RevisionReader(ILineSource lines) : IRevisionReader
{
    private const int FaultsTold = 3;

    /// <inheritdoc/>
    public PreparedStructure ReadStructure(StoredRevision revision)
    {
        // A build that does not know a field must not read past it: it may be a restriction.
        var faults = new FaultList();
        CanonicalForm.RequireKnown(Contracts.V1.Structure.Parser, revision.Content.Span, faults);
        var structure = CanonicalForm.Structure(revision);
        return !faults.Any && StructureMapper.Map(structure, faults, structure.Etag) is { } record && StructurePreparation.Prepare(record, lines, faults) is { } prepared
            ? prepared
            : Unreadable(structure, faults);
    }

    /// <inheritdoc/>
    public PolicyDocument? ReadPolicy(StoredRevision revision)
    {
        var faults = new FaultList();
        CanonicalForm.RequireKnown(Contracts.V1.Policy.Parser, revision.Content.Span, faults);
        return faults.Any ? null : PolicyMapper.Map(CanonicalForm.Policy(revision), faults);
    }

    /// <summary>The record of a structure without its lines; null where this version cannot read it.</summary>
    /// <param name="revision">Revision.</param>
    public static StructureRecord? ReadRecord(StoredRevision revision)
    {
        var faults = new FaultList();
        CanonicalForm.RequireKnown(Contracts.V1.Structure.Parser, revision.Content.Span, faults);
        return faults.Any ? null : StructureMapper.Map(CanonicalForm.Structure(revision), faults, revision.Head.Content.Etag);
    }

    /// <summary>It was sound when it was kept; this version asks for more. It is not assessed, and says why.</summary>
    private static PreparedStructure Unreadable(Contracts.V1.Structure structure, FaultList faults)
    {
        var gap = new Reason(
            ReasonCode.DataMissing,
            $"This version of the service cannot read the kept revision: {string.Join(" ", faults.All.Take(FaultsTold))} Revise the structure.",
            faults.All.Count > 0 ? faults.All[0].Path : "");
        var record = new StructureRecord { Name = structure.Name, Title = structure.Title, Units = [], Gaps = [gap], Etag = structure.Etag };
        return new PreparedStructure(record, null, [], [], 0);
    }
}

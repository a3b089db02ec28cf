using System.Collections.Immutable;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Policies;
using PermitScreen.Screening.Applications;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Tests.Support;

/// <summary>
/// Screens messages of the contract without the wire, by the same mappers and the same engine as the endpoint. What does not
/// change from one screening to the next is prepared once.
/// </summary>
internal sealed class InProcess(Application application, IReadOnlyList<Structure> structures, Contracts.V1.Policy policy, DateOnly asOf)
{
    private readonly LineLibrary _lines = new();
    private ImmutableDictionary<string, PreparedStructure>? _structures;
    private ApplicationRecord? _application;
    private PolicyDocument? _policy;

    public Application Application => application;

    public IReadOnlyList<Structure> Structures => structures;

    public Contracts.V1.Policy Policy => policy;

    /// <summary>The result of the unchanged messages.</summary>
    public RouteResult Screen(CancellationToken cancellation = default) => Screen(Known().Application, Known().Policy, Known().Structures, cancellation);

    /// <summary>The result with another application, or null where it is refused.</summary>
    public RouteResult? With(Application changed) => Map(changed) is { } record ? Screen(record, Known().Policy, Known().Structures) : null;

    /// <summary>The result with another policy, or null where it is refused or not usable.</summary>
    public RouteResult? With(Contracts.V1.Policy changed) =>
        Map(changed) is { } document && document.State != Rating.Policies.PolicyState.Withdrawn && !(asOf < document.InForceFrom) && !(asOf > document.InForceTo)
            ? Screen(Known().Application, document, Known().Structures)
            : null;

    /// <summary>The result with another structure in the place of one of the same index, or null where it is refused.</summary>
    public RouteResult? With(int index, Structure changed) =>
        Map(changed) is { } prepared
            ? Screen(Known().Application, Known().Policy, Known().Structures.Remove(structures[index].Name).SetItem(prepared.Record.Name, prepared))
            : null;

    private static ApplicationRecord? Map(Application application) => ApplicationMapper.Map(application, new FaultList());

    private static PolicyDocument? Map(Contracts.V1.Policy policy) => PolicyMapper.Map(policy, new FaultList());

    private PreparedStructure? Map(Structure structure)
    {
        var faults = new FaultList();
        return StructureMapper.Map(structure, faults) is { } record ? StructurePreparation.Prepare(record, _lines, faults) : null;
    }

    private (ApplicationRecord Application, PolicyDocument Policy, ImmutableDictionary<string, PreparedStructure> Structures) Known()
    {
        _application ??= Map(application) ?? throw new InvalidOperationException("The application is refused.");
        _policy ??= Map(policy) ?? throw new InvalidOperationException("The policy is refused.");
        _structures ??= structures.Select(s => Map(s) ?? throw new InvalidOperationException($"{s.Name} is refused.")).ToImmutableDictionary(s => s.Record.Name);
        return (_application, _policy, _structures);
    }

    private RouteResult Screen(
        ApplicationRecord record, PolicyDocument document, ImmutableDictionary<string, PreparedStructure> prepared, CancellationToken cancellation = default) =>
        RouteScreening.Of(record, document, Ready.Snapshot(prepared.Values), asOf, cancellation);
}

using PermitScreen.Catalogue.Records;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads one superstructure unit.</summary>
internal static class UnitMapper
{
    /// <summary>The record; meaningless where faults were added.</summary>
    /// <param name="unit">Unit of the contract.</param>
    /// <param name="path">Path of the unit, for reasons.</param>
    /// <param name="structureCondition">Condition of the superstructure, where stated.</param>
    /// <param name="faults">Takes every fault.</param>
    public static UnitRecord Map(C.Unit unit, string path, int? structureCondition, FaultList faults)
    {
        var gaps = new List<Reason>();
        Names.Id(faults, "unit_id", unit.UnitId, "main-span");
        var start = faults.Within("start_chainage_m", unit.HasStartChainageM, unit.StartChainageM, Limits.ChainageM);
        if (!unit.HasStartChainageM)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "The chainage of the unit's datum is not in the catalogue.", $"{path}.start_chainage_m"));
        }

        if (unit.KindCase != C.Unit.KindOneofCase.Truss)
        {
            gaps.Add(unit.KindCase == C.Unit.KindOneofCase.None
                ? new Reason(ReasonCode.DataMissing, $"It is not said what unit {unit.UnitId} is.", path)
                : new Reason(ReasonCode.NotModelled, $"Units of this kind ({Words(unit.KindCase)}) are not modelled yet.", path));
            return new UnitRecord { UnitId = unit.UnitId, StartChainageM = start ?? 0, Gaps = [.. gaps], Path = path };
        }

        var truss = TrussMapper.Model(unit.Truss, path, faults.Under("truss"), gaps);
        var planes = TrussMapper.Planes(unit.Truss, path, faults.Under("truss"), gaps);
        var effects = new EffectMapper(unit, path, structureCondition).Map(faults);
        return new UnitRecord
        {
            UnitId = unit.UnitId,
            StartChainageM = start ?? 0,
            Truss = truss,
            Planes = planes,
            Effects = effects,
            Gaps = [.. gaps],
            Path = path,
        };
    }

    private static string Words(C.Unit.KindOneofCase kind) => kind switch
    {
        C.Unit.KindOneofCase.Girder => "girders",
        C.Unit.KindOneofCase.FloorSystem => "a floor system",
        C.Unit.KindOneofCase.RatedOnly => "rated only",
        _ => "given lines",
    };
}

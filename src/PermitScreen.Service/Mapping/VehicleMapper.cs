using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Vehicles;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads an axle train.</summary>
internal static class VehicleMapper
{
    private const int FewestWheelLines = 2;
    private const int MostWheelLines = 32;

    /// <summary>The vehicle; null where it cannot be rated: with faults where it is malformed, with gaps where something is absent or not modelled.</summary>
    /// <param name="train">Train of the contract.</param>
    /// <param name="path">Path of the train, for reasons.</param>
    /// <param name="faults">Takes every fault.</param>
    /// <param name="gaps">Takes every gap.</param>
    public static PermitVehicle? Map(C.AxleTrain train, string path, FaultList faults, List<Reason> gaps)
    {
        var before = faults.Count;
        var gapsBefore = gaps.Count;
        if (!faults.Within("axles", train.Axles.Count, Limits.Axles))
        {
            return null;
        }

        if (train.Axles.Count == 0)
        {
            faults.Add("axles", "Missing; give at least one axle, from the lead axle backwards.");
        }

        var loads = new double[train.Axles.Count];
        var offsets = new double[train.Axles.Count];
        var form = Form(train, faults);
        for (var i = 0; i < train.Axles.Count; i++)
        {
            var axle = train.Axles[i];
            var at = faults.At("axles", i);
            var field = FormattableString.Invariant($"{path}.axles[{i}]");
            loads[i] = at.Required("load_kn", axle.HasLoadKn, axle.LoadKn, Allowed.Positive, "kN");
            offsets[i] = Offset(axle, i, form, i == 0 ? 0 : offsets[i - 1], at, field, gaps);
            at.Optional("gauge_m", axle.HasGaugeM, axle.GaugeM, Allowed.Positive, "m");
            at.Optional("wheel_lines", axle.HasWheelLines, axle.WheelLines, FewestWheelLines, MostWheelLines);
            at.Optional("lateral_offset_m", axle.HasLateralOffsetM, axle.LateralOffsetM, Allowed.Any, "m");
            if (axle.HasOmittedWhereRelieving && axle.OmittedWhereRelieving)
            {
                gaps.Add(new Reason(ReasonCode.NotModelled, "Axles that are left out where they relieve are not modelled yet.", $"{field}.omitted_where_relieving"));
            }
        }

        var width = faults.Optional("width_over_tyres_m", train.HasWidthOverTyresM, train.WidthOverTyresM, Allowed.Positive, "m");
        if (!train.HasWidthOverTyresM)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "The width over tyres is not stated; it limits how far the vehicle can stand aside.", $"{path}.width_over_tyres_m"));
        }

        var laterals = Laterals(train, path, gaps);
        CheckWidth(train, width, faults);
        if (faults.Count > before)
        {
            return null;
        }

        return AxleTrain.TryCreate(loads, offsets, faults) is { } axles && gaps.Count == gapsBefore ? new PermitVehicle(axles, width!.Value, laterals) : null;
    }

    /// <summary>An axle that reaches beyond the width over tyres means that one of the two is wrong.</summary>
    private static void CheckWidth(C.AxleTrain train, double? widthM, FaultList faults)
    {
        for (var i = 0; i < train.Axles.Count; i++)
        {
            var axle = train.Axles[i];
            var reachM = Math.Abs(axle.LateralOffsetM) + (axle.HasGaugeM ? axle.GaugeM / 2 : 0);
            if (widthM is { } width && reachM > width / 2)
            {
                faults.At("axles", i).Add("gauge_m", $"The outer wheels stand {Fields.Text(reachM)} m off the centreline; half the width over tyres is {Fields.Text(width / 2)} m.");
            }
        }
    }

    private static C.Axle.PlaceOneofCase Form(C.AxleTrain train, FaultList faults)
    {
        var byOffset = train.Axles.Any(a => a.PlaceCase == C.Axle.PlaceOneofCase.OffsetM);
        var byGap = train.Axles.Skip(1).Any(a => a.PlaceCase is C.Axle.PlaceOneofCase.GapM or C.Axle.PlaceOneofCase.GapRange);
        if (byOffset && byGap)
        {
            faults.Add("axles", "Some axles give offset_m and others gap_m; use one of them for the whole train.");
        }

        return byGap ? C.Axle.PlaceOneofCase.GapM : C.Axle.PlaceOneofCase.OffsetM;
    }

    private static double Offset(C.Axle axle, int index, C.Axle.PlaceOneofCase form, double previousM, FaultList faults, string field, List<Reason> gaps)
    {
        switch (axle.PlaceCase)
        {
            case C.Axle.PlaceOneofCase.OffsetM:
                var offset = faults.Required("offset_m", has: true, axle.OffsetM, Limits.VehicleM);
                if (index == 0 && offset != 0)
                {
                    faults.Add("offset_m", $"Found {Fields.Text(axle.OffsetM)}; the lead axle has offset 0.");
                }
                else if (offset < previousM)
                {
                    faults.Add("offset_m", $"Found {Fields.Text(axle.OffsetM)}; offsets never decrease from the lead axle backwards (the axle in front has {Fields.Text(previousM)}).");
                }

                return offset;
            case C.Axle.PlaceOneofCase.GapM:
                var gap = faults.Required("gap_m", has: true, axle.GapM, Limits.VehicleM);
                if (gap < 0)
                {
                    faults.Add("gap_m", $"Found {Fields.Text(axle.GapM)}; allowed is a number of 0 or more, m.");
                }

                if (index == 0 && gap != 0)
                {
                    faults.Add("gap_m", "The lead axle has no axle in front of it; leave its gap out.");
                }

                return previousM + gap;
            case C.Axle.PlaceOneofCase.GapRange:
                gaps.Add(new Reason(ReasonCode.NotModelled, "Ranged gaps are not modelled yet.", $"{field}.gap_range"));
                return previousM;
            default:
                if (index > 0)
                {
                    faults.Add(form == C.Axle.PlaceOneofCase.GapM ? "gap_m" : "offset_m", "Missing; say where the axle stands behind the lead axle (offset_m) or behind the axle in front (gap_m), m.");
                }

                return previousM;
        }
    }

    private static ImmutableArray<double> Laterals(C.AxleTrain train, string path, List<Reason> gaps)
    {
        var stating = train.Axles.Count(a => a.HasLateralOffsetM);
        if (stating == 0)
        {
            return default;
        }

        if (stating < train.Axles.Count)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, $"{stating} of {train.Axles.Count} axles state their lateral offset; all of them must (0 where on the centreline), or none.", $"{path}.axles.lateral_offset_m"));
        }

        return [.. train.Axles.Select(a => a.LateralOffsetM)];
    }
}

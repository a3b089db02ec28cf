using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Policies;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads the ladder of travel conditions, and refuses what its source does not pair (rule B1).</summary>
/// <param name="policy">Policy of the contract.</param>
internal sealed class RungMapper(C.Policy policy)
{
    public ImmutableArray<Rung> Map(FaultList faults)
    {
        if (policy.Rungs.Count == 0)
        {
            faults.Add("rungs", "Missing; give at least one set of travel conditions.");
        }

        faults.Within("rungs", policy.Rungs.Count, Limits.Rungs);
        foreach (var twice in policy.Rungs.GroupBy(r => r.RungId).Where(g => g.Count() > 1))
        {
            faults.Add("rungs", $"\"{twice.Key}\" names {twice.Count()} rungs; give each an id of its own.");
        }

        return [.. policy.Rungs.Select((r, i) => Map(r, faults.At("rungs", i)))];
    }

    public static Allowance Allowance(C.DynamicAllowance? allowance, FaultList faults)
    {
        switch (allowance?.RuleCase ?? C.DynamicAllowance.RuleOneofCase.None)
        {
            case C.DynamicAllowance.RuleOneofCase.Constant:
                return Rating.Policies.Allowance.Constant(faults.Required("constant", has: true, allowance!.Constant, Allowed.NotNegative, "dimensionless"));
            case C.DynamicAllowance.RuleOneofCase.ByLength:
                var at = faults.Under("by_length");
                var law = allowance!.ByLength;
                return Rating.Policies.Allowance.ByLength(
                    at.Required("intercept", law.HasIntercept, law.Intercept, Allowed.OneOrMore, "dimensionless"),
                    at.Required("slope_per_m", law.HasSlopePerM, law.SlopePerM, Allowed.NotNegative, "1/m"));
            default:
                faults.Add("", "Missing; give the dynamic load allowance, 0 where there is none.");
                return Rating.Policies.Allowance.Constant(0);
        }
    }

    private Rung Map(C.Rung rung, FaultList faults)
    {
        Names.Id(faults, "rung_id", rung.RungId, "with-traffic");
        faults.Text("conditions", rung.Conditions, "the conditions in words; they are printed on the report");
        var traffic = Traffic(rung, faults);
        var place = Place(rung, faults);
        var tolerance = faults.Optional("centreline_tolerance_m", rung.HasCentrelineToleranceM, rung.CentrelineToleranceM, Allowed.NotNegative, "m");
        if (place == LateralPlace.Centreline && tolerance is null)
        {
            faults.Add("centreline_tolerance_m", "Missing; say how far the vehicle's centre may be off the centreline, m.");
        }

        var allowance = Allowance(rung.Allowance, faults.Under("allowance"));
        CheckSpeed(rung, allowance, faults);
        CheckRows(rung, traffic, faults);
        return new Rung
        {
            RungId = rung.RungId,
            Conditions = rung.Conditions,
            OtherTraffic = traffic,
            LateralPlace = place,
            CentrelineToleranceM = place == LateralPlace.Centreline ? tolerance ?? 0 : 0,
            SpeedLimitKmPerH = rung.HasSpeedLimitKmPerH ? rung.SpeedLimitKmPerH : null,
            Exclusion = traffic == OtherTraffic.Mixed ? null : rung.Exclusion == C.ExclusionExtent.Unit ? ExclusionExtent.Unit : ExclusionExtent.Structure,
            LiveLoadRowIds = [.. rung.LiveLoadRowIds],
            Allowance = allowance,
            OtherLanesLoaded = rung.OtherLanesLoaded,
            SameLaneLoaded = rung.SameLaneLoaded,
        };
    }

    private static OtherTraffic Traffic(C.Rung rung, FaultList faults)
    {
        switch (rung.OtherTraffic)
        {
            case C.OtherTraffic.Mixed:
                if (!rung.OtherLanesLoaded)
                {
                    faults.Add("other_lanes_loaded", "Ordinary traffic mixes with the vehicle, so a vehicle stands in each other lane; say true.");
                }

                if (!rung.SameLaneLoaded)
                {
                    faults.Add("same_lane_loaded", "Ordinary traffic mixes with the vehicle, so others follow it in its lane; say true, and 0 kN/m in same_lane_load where the source asks for no load.");
                }

                return OtherTraffic.Mixed;
            case C.OtherTraffic.None:
                if (rung.OtherLanesLoaded || rung.SameLaneLoaded)
                {
                    faults.Add("other_traffic", "Nobody else is on the structure, yet other_lanes_loaded or same_lane_loaded is set.");
                }

                CheckExtent(rung, faults);
                return OtherTraffic.None;
            default:
                faults.Add("other_traffic", "Missing; say OTHER_TRAFFIC_MIXED or OTHER_TRAFFIC_NONE.");
                return OtherTraffic.Mixed;
        }
    }

    private static void CheckExtent(C.Rung rung, FaultList faults)
    {
        if (rung.Exclusion == C.ExclusionExtent.Unspecified)
        {
            faults.Add("exclusion", "Missing; say how far \"nobody else\" reaches.");
        }

        var distance = faults.Optional("exclusion_distance_m", rung.HasExclusionDistanceM, rung.ExclusionDistanceM, Allowed.Positive, "m");
        if (rung.Exclusion == C.ExclusionExtent.Distance && distance is null)
        {
            faults.Add("exclusion_distance_m", "Missing; give the distance before and behind the vehicle, m.");
        }

        if (rung.Exclusion == C.ExclusionExtent.Distance)
        {
            faults.Add("exclusion", "A distance before and behind the vehicle is not modelled yet: it must reach beyond the lines; use the span, the unit or the structure.");
        }

        if (rung.Exclusion == C.ExclusionExtent.Span)
        {
            faults.Add("exclusion", "The span alone is not modelled yet: on continuous spans the neighbours load it too; use the unit or the structure.");
        }
    }

    private static LateralPlace Place(C.Rung rung, FaultList faults)
    {
        switch (rung.LateralPlace)
        {
            case C.LateralPlace.Anywhere:
                return LateralPlace.Anywhere;
            case C.LateralPlace.Centreline:
                if (rung.OtherLanesLoaded)
                {
                    faults.Add("lateral_place", "On the centreline no lane is left for other traffic; drop other_lanes_loaded, or drive anywhere.");
                }

                return LateralPlace.Centreline;
            default:
                faults.Add("lateral_place", "Missing; say LATERAL_PLACE_ANYWHERE or LATERAL_PLACE_CENTRELINE.");
                return LateralPlace.Anywhere;
        }
    }

    /// <summary>A smaller allowance than that of ordinary speed goes with a speed limit, which is printed with the conditions.</summary>
    private void CheckSpeed(C.Rung rung, Allowance allowance, FaultList faults)
    {
        faults.Optional("speed_limit_km_per_h", rung.HasSpeedLimitKmPerH, rung.SpeedLimitKmPerH, Allowed.Positive, "km/h");
        var ordinary = policy.Rungs.FirstOrDefault(r => r.OtherTraffic == C.OtherTraffic.Mixed) ?? policy.Rungs[0];
        var full = Allowance(ordinary.Allowance, new FaultList());
        if (!rung.HasSpeedLimitKmPerH && (allowance.For(0) < full.For(0) || (allowance.For(0) <= 0 && full.For(0) <= 0)))
        {
            faults.Add("speed_limit_km_per_h", "Missing; an allowance below that of ordinary speed goes with a speed limit, km/h.");
        }
    }

    private void CheckRows(C.Rung rung, OtherTraffic traffic, FaultList faults)
    {
        if (rung.LiveLoadRowIds.Count == 0)
        {
            faults.Add("live_load_row_ids", "Missing; name the rows of live-load factors of these conditions.");
        }

        var kinds = new HashSet<C.PermitKind>();
        for (var i = 0; i < rung.LiveLoadRowIds.Count; i++)
        {
            var field = FormattableString.Invariant($"live_load_row_ids[{i}]");
            if (policy.LiveLoadRows.FirstOrDefault(r => r.RowId == rung.LiveLoadRowIds[i]) is not { } row)
            {
                faults.Add(field, $"\"{rung.LiveLoadRowIds[i]}\" is no row of this policy.");
                continue;
            }

            if ((row.OtherTraffic == C.OtherTraffic.Mixed) != (traffic == OtherTraffic.Mixed))
            {
                faults.Add(field, $"Row \"{row.RowId}\" was calibrated for other traffic than this rung's; the source does not pair them.");
            }

            if (!kinds.Add(row.PermitKind))
            {
                faults.Add(field, $"Two rows of this rung are for {row.PermitKind}; name one.");
            }
        }
    }
}

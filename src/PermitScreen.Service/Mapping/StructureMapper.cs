using System.Collections.Immutable;
using PermitScreen.Catalogue.Records;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;
using PermitScreen.Service.Revisions;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads a structure: what is malformed is a fault and refused; what is absent is a gap and makes verdicts NOT_ASSESSED.</summary>
internal static class StructureMapper
{
    private const int WorstCondition = 0;
    private const int BestCondition = 9;
    private const int MostMonths = 240;
    private const int MostLanes = 20;

    /// <summary>The record, or null with faults.</summary>
    /// <param name="structure">Structure of the contract.</param>
    /// <param name="faults">Takes every fault.</param>
    /// <param name="etag">Its etag, where it is known already.</param>
    public static StructureRecord? Map(C.Structure structure, FaultList faults, string? etag = null)
    {
        var before = faults.Count;
        var gaps = new List<Reason>();
        var name = Names.Structure(faults, "name", structure.Name);
        faults.Text("title", structure.Title, "what people call it");
        Place(structure.Place, faults);
        if (structure.PostedLimits.Count > 0 && structure.State is not (C.StructureState.Posted or C.StructureState.Closed))
        {
            faults.Add("posted_limits", "Limits are posted, but the state is not STRUCTURE_STATE_POSTED; state what holds.");
        }

        faults.Within("posted_limits", structure.PostedLimits.Count, Limits.Restrictions);
        faults.Within("dated_restrictions", structure.DatedRestrictions.Count, Limits.Restrictions);
        var inspection = Inspection(structure.Inspection, faults);
        if (!faults.Within("units", structure.Units.Count, Limits.Units))
        {
            return null;
        }

        var units = ImmutableArray.CreateBuilder<UnitRecord>();
        var unitIds = new HashSet<string>(StringComparer.Ordinal);
        for (var u = 0; u < structure.Units.Count; u++)
        {
            var at = faults.At("units", u);
            if (!unitIds.Add(structure.Units[u].UnitId))
            {
                at.Add("unit_id", $"\"{structure.Units[u].UnitId}\" names two units; give each an id of its own.");
            }

            units.Add(UnitMapper.Map(structure.Units[u], FormattableString.Invariant($"units[{u}]"), inspection?.SuperstructureCondition, at));
        }

        var record = new StructureRecord
        {
            Name = name,
            Title = structure.Title,
            State = State(structure.State),
            PostedSigns = [.. structure.PostedLimits.Select((p, i) => Posted(p, faults.At("posted_limits", i)))],
            DatedRestrictions = [.. structure.DatedRestrictions.Select((r, i) => Restriction(r, faults.At("dated_restrictions", i)))],
            ClearanceOn = Clearance(structure.ClearanceOn, faults.Under("clearance_on")),
            ClearanceUnder = Clearance(structure.ClearanceUnder, faults.Under("clearance_under")),
            Roadway = Roadway(structure.Roadway, faults.Under("roadway"), gaps),
            Inspection = inspection,
            HasOverride = structure.EngineerOverride is not null,
            Units = units.ToImmutable(),
            Gaps = [.. gaps],
            Etag = etag ?? Etag(structure),
        };
        return faults.Count > before ? null : record;
    }

    /// <summary>Fingerprint of a structure's content, without what the service itself adds.</summary>
    /// <param name="structure">Structure.</param>
    public static string Etag(C.Structure structure) => Digest.Of(CanonicalForm.Of(structure)).Etag;

    private static void Place(C.Place? place, FaultList faults)
    {
        if (place is null)
        {
            return;
        }

        var at = faults.Under("place");
        if (at.Optional("latitude_deg", place.HasLatitudeDeg, place.LatitudeDeg, Allowed.Any, "degrees north") is < -90 or > 90)
        {
            at.Add("latitude_deg", $"Found {Fields.Text(place.LatitudeDeg)}; allowed is -90 to 90, degrees north.");
        }

        if (at.Optional("longitude_deg", place.HasLongitudeDeg, place.LongitudeDeg, Allowed.Any, "degrees east") is < -180 or > 180)
        {
            at.Add("longitude_deg", $"Found {Fields.Text(place.LongitudeDeg)}; allowed is -180 to 180, degrees east.");
        }

        for (var i = 0; i < place.Roads.Count; i++)
        {
            var road = place.Roads[i];
            var atRoad = at.At("roads", i);
            atRoad.Text("road", road.Road, "the road's id");
            atRoad.Optional("kilometre_point_km", road.HasKilometrePointKm, road.KilometrePointKm, Allowed.Any, "km");
        }
    }

    private static StructureState? State(C.StructureState state) => state switch
    {
        C.StructureState.Open => StructureState.Open,
        C.StructureState.Posted => StructureState.Posted,
        C.StructureState.Closed => StructureState.Closed,
        C.StructureState.Shored => StructureState.Shored,
        C.StructureState.Temporary => StructureState.Temporary,
        _ => null,
    };

    private static string Posted(C.PostedLimit posted, FaultList faults)
    {
        var words = posted.LimitCase switch
        {
            C.PostedLimit.LimitOneofCase.GrossKn => Limit("gross_kn", posted.GrossKn, "kN gross"),
            C.PostedLimit.LimitOneofCase.AxleKn => Limit("axle_kn", posted.AxleKn, "kN an axle"),
            C.PostedLimit.LimitOneofCase.SpeedKmPerH => Limit("speed_km_per_h", posted.SpeedKmPerH, "km/h"),
            _ => "limit not stated",
        };
        return posted.Sign.Length > 0 ? $"{posted.Sign} ({words})" : words;

        string Limit(string field, double value, string unit) =>
            $"{Fields.Text(faults.Optional(field, has: true, value, Allowed.Positive, unit) ?? value)} {unit}";
    }

    private static DatedRestriction Restriction(C.DatedRestriction restriction, FaultList faults)
    {
        var from = faults.Date("from", restriction.From);
        var to = faults.Date("to", restriction.To);
        if (from > to)
        {
            faults.Add("to", "The last day lies before the first one.");
        }

        return new DatedRestriction(from, to, State(restriction.State), restriction.Reason);
    }

    private static Clearance? Clearance(C.Clearance? clearance, FaultList faults)
    {
        if (clearance is null)
        {
            return null;
        }

        var height = clearance.VerticalCase switch
        {
            C.Clearance.VerticalOneofCase.HeightM => Limit("height_m", clearance.HeightM),
            C.Clearance.VerticalOneofCase.NoHeightLimit => None("no_height_limit", clearance.NoHeightLimit),
            _ => default,
        };
        var width = clearance.HorizontalCase switch
        {
            C.Clearance.HorizontalOneofCase.WidthM => Limit("width_m", clearance.WidthM),
            C.Clearance.HorizontalOneofCase.NoWidthLimit => None("no_width_limit", clearance.NoWidthLimit),
            _ => default,
        };
        return new Clearance(height, width, clearance.Profile.Count > 0);

        ClearLimit Limit(string field, double value) => new(Stated: true, faults.Optional(field, has: true, value, Allowed.Positive, "m"));

        ClearLimit None(string field, C.StatedNone none)
        {
            faults.Under(field).Text("reason", none.Reason, "the reason why there is no limit");
            return new ClearLimit(Stated: true, null);
        }
    }

    private static Roadway? Roadway(C.Roadway? roadway, FaultList faults, List<Reason> gaps)
    {
        if (roadway is null)
        {
            return null;
        }

        var left = faults.Within("left_kerb_m", roadway.HasLeftKerbM, roadway.LeftKerbM, Limits.LateralM);
        var right = faults.Within("right_kerb_m", roadway.HasRightKerbM, roadway.RightKerbM, Limits.LateralM);
        var lanes = faults.Optional("lane_count", roadway.HasLaneCount, roadway.LaneCount, 1, MostLanes);
        var adtt = faults.Optional("adtt_one_direction", roadway.HasAdttOneDirection, roadway.AdttOneDirection, Allowed.NotNegative, "trucks a day");
        if (left is not { } leftM || right is not { } rightM)
        {
            if (!roadway.HasLeftKerbM)
            {
                gaps.Add(new Reason(ReasonCode.DataMissing, "The lateral position of the left kerb is not in the catalogue.", "roadway.left_kerb_m"));
            }

            if (!roadway.HasRightKerbM)
            {
                gaps.Add(new Reason(ReasonCode.DataMissing, "The lateral position of the right kerb is not in the catalogue.", "roadway.right_kerb_m"));
            }

            return null;
        }

        if (leftM >= rightM)
        {
            faults.Add("right_kerb_m", $"Found {Fields.Text(rightM)}; the right kerb lies to the right of the left one at {Fields.Text(leftM)} m (lateral positions grow to the right, looking forward).");
        }

        return new Roadway(leftM, rightM, lanes, adtt);
    }

    private static Inspection? Inspection(C.Inspection? inspection, FaultList faults)
    {
        if (inspection is null)
        {
            return null;
        }

        var at = faults.Under("inspection");
        return new Inspection(
            at.Date("inspected_on", inspection.InspectedOn),
            at.Optional("interval_months", inspection.HasIntervalMonths, inspection.IntervalMonths, 1, MostMonths),
            at.Optional("superstructure_condition", inspection.HasSuperstructureCondition, inspection.SuperstructureCondition, WorstCondition, BestCondition));
    }
}

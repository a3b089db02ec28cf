using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Vehicles;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads the rows of live-load factors: a full table of truck counts by classes of weight over length.</summary>
internal static class LiveLoadRowMapper
{
    public static ImmutableArray<LiveLoadRow> Map(C.Policy policy, FaultList faults)
    {
        if (policy.LiveLoadRows.Count == 0)
        {
            faults.Add("live_load_rows", "Missing; give at least one row of live-load factors.");
        }

        faults.Within("live_load_rows", policy.LiveLoadRows.Count, Limits.Rows);
        foreach (var twice in policy.LiveLoadRows.GroupBy(r => r.RowId).Where(g => g.Count() > 1))
        {
            faults.Add("live_load_rows", $"\"{twice.Key}\" names {twice.Count()} rows; give each an id of its own.");
        }

        return [.. policy.LiveLoadRows.Select((r, i) => Row(r, faults.At("live_load_rows", i)))];
    }

    public static PermitKind? ToDomain(C.PermitKind kind) => kind switch
    {
        C.PermitKind.Routine => PermitKind.Routine,
        C.PermitKind.SpecialSingleTrip => PermitKind.SpecialSingleTrip,
        C.PermitKind.SpecialMultipleTrips => PermitKind.SpecialMultipleTrips,
        _ => null,
    };

    private static LiveLoadRow Row(C.LiveLoadRow row, FaultList faults)
    {
        Names.Id(faults, "row_id", row.RowId, "single-trip-mixed");
        var kind = ToDomain(row.PermitKind);
        if (kind is null)
        {
            faults.Add("permit_kind", "Missing; say the kind of permit.");
        }

        if (row.OtherTraffic is not (C.OtherTraffic.Mixed or C.OtherTraffic.None))
        {
            faults.Add("other_traffic", "Missing; say OTHER_TRAFFIC_MIXED or OTHER_TRAFFIC_NONE.");
        }

        if (row.ShareBasis is not (C.ShareBasis.OneLane or C.ShareBasis.TwoOrMoreLanes))
        {
            faults.Add("share_basis", "Missing; say SHARE_BASIS_ONE_LANE or SHARE_BASIS_TWO_OR_MORE_LANES.");
        }

        if (kind == PermitKind.Routine && row.ShareBasis == C.ShareBasis.OneLane)
        {
            faults.Add("share_basis", "Routine permits are paired with the share of two or more lanes (MBE 6A.4.5.4.2).");
        }

        if (kind is PermitKind.SpecialSingleTrip or PermitKind.SpecialMultipleTrips && row.ShareBasis == C.ShareBasis.TwoOrMoreLanes)
        {
            faults.Add("share_basis", "Special permits are paired with the share of one lane (MBE 6A.4.5.4.2).");
        }

        if (kind is PermitKind.Routine or PermitKind.SpecialMultipleTrips && row.OtherTraffic == C.OtherTraffic.None)
        {
            faults.Add("other_traffic", "A factor for nobody else on the structure is paired with single trips only (MBE 6A.4.5.4.2).");
        }

        var (counts, classes) = Table(row, faults);
        return new LiveLoadRow(row.RowId, kind ?? PermitKind.Routine, counts, classes);
    }

    private static (ImmutableArray<double> Counts, ImmutableArray<LiveLoadClass> Classes) Table(C.LiveLoadRow row, FaultList faults)
    {
        faults.Within("factors", row.Factors.Count, Limits.Factors);
        var cells = new Dictionary<(double Count, double UpTo), double>();
        for (var i = 0; i < row.Factors.Count; i++)
        {
            var factor = row.Factors[i];
            var at = faults.At("factors", i);
            var count = at.Optional("adtt_one_direction", factor.HasAdttOneDirection, factor.AdttOneDirection, Allowed.NotNegative, "trucks a day") ?? -1;
            var upTo = at.Optional("up_to_gvw_over_length_kn_per_m", factor.HasUpToGvwOverLengthKnPerM, factor.UpToGvwOverLengthKnPerM, Allowed.Positive, "kN/m") ?? double.PositiveInfinity;
            var value = at.Required("factor", factor.HasFactor, factor.Factor, Allowed.Positive, "dimensionless");
            if (!cells.TryAdd((count, upTo), value))
            {
                at.Add("factor", "Another factor of this row has the same truck count and the same class of weight over length.");
            }
        }

        var counts = cells.Keys.Select(k => k.Count).Distinct().Order().ToImmutableArray();
        var limits = cells.Keys.Select(k => k.UpTo).Distinct().Order().ToImmutableArray();
        if (cells.Count == 0 || !double.IsPositiveInfinity(limits[^1]) || cells.Count != counts.Length * limits.Length || (counts.Length > 1 && counts[0] < 0))
        {
            faults.Add("factors", "The factors are no full table: every truck count (or none) with every class of weight over length, the last class without upper limit.");
            return ([], []);
        }

        var classes = limits.Select(limit => new LiveLoadClass(limit, [.. counts.Select(c => cells[(c, limit)])])).ToImmutableArray();
        for (var c = 0; c < counts.Length; c++)
        {
            for (var i = 1; i < classes.Length; i++)
            {
                if (classes[i].Factors[c] > classes[i - 1].Factors[c])
                {
                    faults.Add("factors", "A heavier class of weight over length has a larger factor than a lighter one; factors fall with weight over length, and a boundary belongs to the larger one.");
                }
            }
        }

        return (counts.Length == 1 && counts[0] < 0 ? [] : counts, classes);
    }
}

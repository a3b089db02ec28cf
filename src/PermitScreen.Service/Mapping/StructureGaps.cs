using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Ladder;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Service.Mapping;

/// <summary>What would keep a structure from being assessed under any policy, though it may be kept.</summary>
internal static class StructureGaps
{
    public static IEnumerable<Reason> Of(PreparedStructure prepared)
    {
        var record = prepared.Record;
        if (record.State is null)
        {
            yield return Missing("The state of the structure is not said.", "state");
        }

        if (record.Roadway is null)
        {
            yield return Missing("The roadway is not said.", "roadway");
        }
        else if (record.Roadway.LaneCount is null)
        {
            yield return Missing("The number of lanes is not said; conditions with other traffic cannot be assessed.", "roadway.lane_count");
        }

        if (record.ClearanceOn is not { } clearance)
        {
            yield return Missing("The clearances on the structure are not said.", "clearance_on");
        }
        else
        {
            if (!clearance.Height.Stated)
            {
                yield return Missing("The clear height is not said.", "clearance_on.height_m");
            }

            if (!clearance.Width.Stated)
            {
                yield return Missing("The clear width is not said.", "clearance_on.width_m");
            }
        }

        if (record.Inspection?.InspectedOn is null)
        {
            yield return Missing("The day of the last inspection is not said.", "inspection.inspected_on");
        }

        if (record.Inspection?.IntervalMonths is null)
        {
            yield return Missing("The inspection interval is not said.", "inspection.interval_months");
        }

        if (record.Inspection?.SuperstructureCondition is null)
        {
            yield return Missing("The condition of the superstructure is not said.", "inspection.superstructure_condition");
        }

        foreach (var gap in record.Gaps.Concat(prepared.Rated?.Units.SelectMany(u => u.Gaps) ?? []))
        {
            yield return gap;
        }
    }

    /// <summary>What a policy asks for and rated effects do not state.</summary>
    public static IEnumerable<Reason> Under(IEnumerable<PolicyDocument> policies, PreparedStructure prepared)
    {
        foreach (var policy in policies)
        {
            var reasons = (prepared.Rated?.Units.SelectMany(u => u.Effects) ?? []).SelectMany(e => EffectCheck.Gaps(e, policy.Policy));
            var rules = policy.Standing;
            if (prepared.Record.Inspection?.SuperstructureCondition is { } condition && condition <= rules.PoorUpToRating && rules.PoorCondition == DoubtRule.NotAssessed)
            {
                var poor = FormattableString.Invariant($"A superstructure rated {condition} is in poor condition and is not assessed.");
                reasons = reasons.Append(new Reason(ReasonCode.PoorCondition, poor, "inspection.superstructure_condition"));
            }

            foreach (var reason in reasons.Distinct())
            {
                yield return reason with { Message = $"Under {policy.Name}: {reason.Message}" };
            }
        }
    }

    private static Reason Missing(string message, string field) => new(ReasonCode.DataMissing, message, field);
}

using System.Globalization;
using PermitScreen.Catalogue.Records;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Screening.Crossings;

/// <summary>State, condition and inspection of a structure, on the as-of date and on the days of travel (rules F1, F2).</summary>
public static class StandingCheck
{
    /// <summary>Adds what stands against the structure.</summary>
    /// <param name="record">Structure.</param>
    /// <param name="rules">The policy's rules.</param>
    /// <param name="asOf">Civil date for which the inspection is judged.</param>
    /// <param name="firstDay">First day to look at, the as-of date or the first day of travel, whichever is later.</param>
    /// <param name="lastDay">Last day of travel.</param>
    /// <param name="findings">Takes what is found.</param>
    public static void Of(StructureRecord record, StandingRules rules, DateOnly asOf, DateOnly firstDay, DateOnly lastDay, Findings findings)
    {
        OfState(record.State, record, "", "state", findings);
        for (var i = 0; i < record.DatedRestrictions.Length; i++)
        {
            var restriction = record.DatedRestrictions[i];
            if (restriction.HoldsWithin(firstDay, lastDay))
            {
                OfState(restriction.State, record, $" ({restriction.Reason}, {Span(restriction)})", FormattableString.Invariant($"dated_restrictions[{i}].state"), findings);
            }
        }

        OfInspection(record.Inspection, rules, asOf, firstDay, findings);
    }

    private static void OfState(StructureState? state, StructureRecord record, string when, string field, Findings findings)
    {
        switch (state)
        {
            case StructureState.Open:
                break;
            case StructureState.Closed:
                findings.Fail(ReasonCode.Closed, $"The structure is closed{when}.", field);
                break;
            case StructureState.Posted:
                var signs = record.PostedSigns.IsEmpty ? "limits not stated" : string.Join("; ", record.PostedSigns);
                findings.Fail(ReasonCode.Posted, $"The structure is posted{when}: {signs}.", field);
                break;
            case StructureState.Shored or StructureState.Temporary:
                findings.NotAssessed(ReasonCode.Standing, $"The structure is {(state == StructureState.Shored ? "shored" : "a temporary one")}{when}; it needs an engineer's own assessment.", field);
                break;
            default:
                findings.NotAssessed(ReasonCode.DataMissing, $"The state of the structure{when} is not in the catalogue: say open, posted, closed, shored or temporary.", field);
                break;
        }
    }

    private static void OfInspection(Inspection? inspection, StandingRules rules, DateOnly asOf, DateOnly firstDay, Findings findings)
    {
        if (inspection?.SuperstructureCondition is not { } condition)
        {
            findings.NotAssessed(ReasonCode.DataMissing, "The condition of the superstructure is not in the catalogue.", "inspection.superstructure_condition");
        }
        else if (condition <= rules.PoorUpToRating)
        {
            findings.Doubt(rules.PoorCondition, ReasonCode.PoorCondition, FormattableString.Invariant($"The superstructure is in poor condition: rated {condition}, the policy takes ratings up to {rules.PoorUpToRating} as poor."), "inspection.superstructure_condition");
        }

        if (inspection?.InspectedOn is not { } day)
        {
            findings.NotAssessed(ReasonCode.DataMissing, "The day of the last inspection is not in the catalogue.", "inspection.inspected_on");
        }
        else if (day > asOf)
        {
            findings.NotAssessed(ReasonCode.DataMissing, $"The last inspection is dated {Iso(day)}, after the as-of date {Iso(asOf)}.", "inspection.inspected_on");
        }
        else if (inspection.IntervalMonths is not { } months)
        {
            findings.NotAssessed(ReasonCode.DataMissing, "The inspection interval is not in the catalogue.", "inspection.interval_months");
        }
        else if (day.AddMonths(months) < firstDay)
        {
            findings.Doubt(rules.OverdueInspection, ReasonCode.InspectionOverdue, $"The inspection is overdue: last on {Iso(day)}, due by {Iso(day.AddMonths(months))}, looked at for {Iso(firstDay)}.", "inspection.inspected_on");
        }
    }

    private static string Span(DatedRestriction restriction) =>
        (restriction.From, restriction.To) switch
        {
            ({ } from, { } to) => $"{Iso(from)} to {Iso(to)}",
            ({ } from, null) => $"from {Iso(from)} until further notice",
            (null, { } to) => $"until {Iso(to)}",
            _ => "until further notice",
        };

    private static string Iso(DateOnly day) => day.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}

using System.Collections.Immutable;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Ladder;
using PermitScreen.Rating.Policies;
using PermitScreen.Screening.Applications;

namespace PermitScreen.Screening.Crossings;

/// <summary>Screens an application over its route against one snapshot of the catalogue.</summary>
public static class RouteScreening
{
    /// <summary>Judges every crossing; what cannot be assessed is never passed.</summary>
    /// <param name="application">Application.</param>
    /// <param name="policy">Policy.</param>
    /// <param name="catalogue">Snapshot; all crossings see the same version.</param>
    /// <param name="asOf">Civil date for which standing is read.</param>
    /// <param name="cancellation">Cancels between effects.</param>
    public static RouteResult Of(
        ApplicationRecord application, PolicyDocument policy, CatalogueSnapshot catalogue, DateOnly asOf, CancellationToken cancellation)
    {
        var crossings = application.Crossings
            .Select(c => OfCrossing(c, application, policy, catalogue.Find(c.Structure)?.Prepared, asOf, cancellation))
            .ToImmutableArray();
        var worst = crossings.Select(c => c.Verdict).DefaultIfEmpty(Verdict.NotAssessed).Aggregate(Verdicts.Worse);
        return new RouteResult(worst, crossings, catalogue.Version);
    }

    private static CrossingResult OfCrossing(
        Crossing crossing, ApplicationRecord application, PolicyDocument policy, PreparedStructure? structure, DateOnly asOf, CancellationToken cancellation)
    {
        if (structure is null)
        {
            return new CrossingResult
            {
                Crossing = crossing,
                Verdict = Verdict.NotAssessed,
                Basis = crossing.Relation == CrossingRelation.On ? AssessmentBasis.MemberCheck : AssessmentBasis.FitOnly,
                Reasons = [new Reason(ReasonCode.NotInCatalogue, $"{crossing.Structure} is not in the catalogue.", "route.crossing_list.crossings.structure")],
            };
        }

        var states = application.States.Where(s => s.TravelsOn(crossing.LegId)).ToImmutableArray();
        var findings = new Findings();
        if (states.IsEmpty)
        {
            findings.NotAssessed(ReasonCode.DataMissing, $"No configuration of the application travels on leg \"{crossing.LegId}\".", "application.configurations.leg_ids");
        }

        return crossing.Relation == CrossingRelation.Under
            ? Beneath(crossing, structure, states, policy, findings)
            : Over(crossing, structure, states, application, policy, asOf, findings, cancellation);
    }

    private static CrossingResult Beneath(
        Crossing crossing, PreparedStructure structure, ImmutableArray<TravelState> states, PolicyDocument policy, Findings findings)
    {
        FitCheck.Of(structure.Record.ClearanceUnder, "clearance_under", states, policy.Standing, findings);
        return new CrossingResult
        {
            Crossing = crossing,
            Structure = structure,
            Verdict = findings.Verdict,
            Basis = AssessmentBasis.FitOnly,
            Reasons = [.. findings.Reasons],
            Flags = [.. findings.Flags],
        };
    }

    private static CrossingResult Over(
        Crossing crossing,
        PreparedStructure structure,
        ImmutableArray<TravelState> states,
        ApplicationRecord application,
        PolicyDocument policy,
        DateOnly asOf,
        Findings findings,
        CancellationToken cancellation)
    {
        var record = structure.Record;
        var firstDay = asOf > application.TravelFrom ? asOf : application.TravelFrom;
        StandingCheck.Of(record, policy.Standing, asOf, firstDay, application.TravelTo, findings);
        FitCheck.Of(record.ClearanceOn, "clearance_on", states, policy.Standing, findings);
        if (record.HasOverride)
        {
            findings.NotAssessed(ReasonCode.NotModelled, "An engineer's override is recorded; overrides are not modelled yet.", "engineer_override");
        }

        LadderResult? ladder = null;
        if (structure.Rated is not { } rated)
        {
            findings.NotAssessed(ReasonCode.DataMissing, "The roadway is not in the catalogue.", "roadway");
            foreach (var gap in record.Gaps)
            {
                findings.NotAssessed(gap.Code, gap.Message, gap.Field);
            }
        }
        else if (!states.IsEmpty)
        {
            ladder = LadderScreening.Of(rated, [.. states.Select(s => s.Rating)], application.PermitKind, crossing.Directions, policy.Policy, cancellation);
        }

        var verdict = Verdicts.Worse(findings.Verdict, ladder?.Verdict ?? Verdict.NotAssessed);
        return new CrossingResult
        {
            Crossing = crossing,
            Structure = structure,
            Verdict = verdict,
            Basis = AssessmentBasis.MemberCheck,
            Reasons = [.. findings.Reasons.Concat(LadderReasons(ladder)).Distinct()],
            Flags = [.. findings.Flags],
            Ladder = ladder,
        };
    }

    private static IEnumerable<Reason> LadderReasons(LadderResult? ladder)
    {
        if (ladder is null || ladder.Verdict.IsPass())
        {
            return [];
        }

        // A rung that fails must not hide that another one could not be assessed.
        return ladder.Reported is { } reported
            ? reported.Reasons.Concat(ladder.Rungs.Where(r => r.Outcome == RungOutcome.NotAssessed).SelectMany(r => r.Reasons))
            : [new Reason(ReasonCode.NoRungAvailable, "No travel conditions of the policy are available to this permit on this structure: "
                + string.Join(" ", ladder.Rungs.Select(r => $"{r.Rung.RungId}: {string.Join(" ", r.Reasons.Select(x => x.Message))}")))];
    }
}

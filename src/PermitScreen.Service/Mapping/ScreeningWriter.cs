using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Screening.Applications;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Revisions;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Writes a screening for the contract.</summary>
/// <param name="full">Whether all rungs, the arithmetic and the next effects are written (FULL view).</param>
/// <param name="nextEffects">How many effects after the governing one stand in each rung.</param>
internal sealed class ScreeningWriter(bool full, int nextEffects)
{
    /// <summary>The whole answer.</summary>
    public C.Screening Write(RouteResult result, ApplicationRecord application, PolicyDocument policy, DateOnly asOf)
    {
        var screening = new C.Screening
        {
            ApplicationReference = application.Reference,
            Verdict = Verdict(result.Verdict),
            Counts = new C.VerdictCounts
            {
                Pass = result.Count(Rating.Checks.Verdict.Pass),
                PassWithConditions = result.Count(Rating.Checks.Verdict.PassWithConditions),
                NotAssessed = result.Count(Rating.Checks.Verdict.NotAssessed),
                Fail = result.Count(Rating.Checks.Verdict.Fail),
            },
            Policy = CanonicalForm.DocumentName(policy.Name, policy.DocumentVersion),
            PolicyEtag = policy.Etag,
            AsOfDate = asOf.ToContract(),
            CatalogueVersion = result.CatalogueVersion,
            MechanicsVersion = EngineVersions.Mechanics,
            RatingVersion = EngineVersions.Rating,
            Caution = Cautions.Caution,
        };
        screening.Notices.Add(Cautions.NotChecked);
        if (!policy.Confirmed)
        {
            screening.Notices.Add(policy.Demonstration ? Cautions.DemonstrationPolicy : Cautions.UnconfirmedPolicy);
        }

        if (policy.State == PolicyState.Draft)
        {
            screening.Notices.Add(Cautions.DraftPolicy);
        }

        if (application.TravelFrom < policy.InForceFrom || application.TravelTo > policy.InForceTo)
        {
            screening.Notices.Add("The policy is not in force on all days of travel.");
        }

        screening.Notices.Add(FormattableString.Invariant($"Weighing tolerance {policy.Policy.Weighing.Tolerance:0.###}."));
        screening.Crossings.AddRange(result.Crossings.Select(Crossing));
        return screening;
    }

    private C.CrossingResult Crossing(CrossingResult result)
    {
        var reported = result.Ladder?.Reported;
        var passing = result.Verdict.IsPass() ? reported : null;
        var written = new C.CrossingResult
        {
            Structure = result.Crossing.Structure,
            Title = result.Structure?.Record.Title ?? "",
            Relation = result.Crossing.Relation == CrossingRelation.On ? C.CrossingRelation.On : C.CrossingRelation.Under,
            Direction = result.Crossing.Directions.ToContract(),
            LegId = result.Crossing.LegId,
            Verdict = Verdict(result.Verdict),
            Basis = result.Basis == AssessmentBasis.MemberCheck ? C.AssessmentBasis.MemberCheck : C.AssessmentBasis.FitOnly,
            RungId = passing?.Rung.RungId ?? "",
            Conditions = passing?.Rung.Conditions ?? "",
            StructureEtag = result.Structure?.Record.Etag ?? "",
        };
        written.Reasons.AddRange(result.Reasons.Select(ReasonWriter.Write));
        written.Flags.AddRange(result.Flags.Select(ReasonWriter.Write));
        if (result.Structure is { } structure && result.Crossing.Relation == CrossingRelation.On)
        {
            written.NotRated.AddRange(structure.NotRated.Select(n => new C.UnratedEffect
            {
                Effect = new C.EffectReference { UnitId = n.UnitId, EffectId = n.EffectId, PlaneId = n.PlaneId, Description = n.Description },
                Reason = n.Reason,
            }));
        }

        if (reported is not null)
        {
            written.TravelConditions = passing is null ? null : Conditions(passing.Rung);
        }

        // Where some effects could not be rated, the least of the others is no answer for the crossing; the rungs still tell it.
        if (reported is { Outcome: not RungOutcome.NotAssessed })
        {
            Set(reported.RatingFactor, v => written.RatingFactor = v);
            Set(reported.LargestAxleFactor, v => written.LargestAxleFactor = v);
            if (reported.Governing is { } governing)
            {
                written.Governing = EffectWriter.Write(governing, full);
            }
        }

        if (full && result.Ladder is { } ladder)
        {
            written.Rungs.AddRange(ladder.Rungs.Select(Rung));
        }

        return written;
    }

    private C.RungResult Rung(RungResult result)
    {
        var written = new C.RungResult
        {
            RungId = result.Rung.RungId,
            Conditions = result.Rung.Conditions,
            TravelConditions = Conditions(result.Rung),
            Outcome = result.Outcome switch
            {
                RungOutcome.Passes => C.RungOutcome.Passes,
                RungOutcome.Fails => C.RungOutcome.Fails,
                RungOutcome.Unavailable => C.RungOutcome.Unavailable,
                _ => C.RungOutcome.NotAssessed,
            },
        };
        written.Reasons.AddRange(result.Reasons.Select(ReasonWriter.Write));
        Set(result.RatingFactor, v => written.RatingFactor = v);
        Set(result.LargestAxleFactor, v => written.LargestAxleFactor = v);
        if (result.Governing is { } governing)
        {
            written.Governing = EffectWriter.Write(governing, full);
            written.Next.AddRange(result.Effects.Skip(1).Take(nextEffects).Select(e => EffectWriter.Write(e, full)));
        }

        return written;
    }

    private static C.TravelConditions Conditions(Rung rung)
    {
        var conditions = new C.TravelConditions
        {
            OtherTraffic = rung.OtherTraffic == OtherTraffic.Mixed ? C.OtherTraffic.Mixed : C.OtherTraffic.None,
            Exclusion = rung.Exclusion switch
            {
                ExclusionExtent.Unit => C.ExclusionExtent.Unit,
                ExclusionExtent.Structure => C.ExclusionExtent.Structure,
                _ => C.ExclusionExtent.Unspecified,
            },
            LateralPlace = rung.LateralPlace == LateralPlace.Anywhere ? C.LateralPlace.Anywhere : C.LateralPlace.Centreline,
        };
        if (rung.LateralPlace == LateralPlace.Centreline)
        {
            conditions.CentrelineToleranceM = rung.CentrelineToleranceM;
        }

        Set(rung.SpeedLimitKmPerH, v => conditions.SpeedLimitKmPerH = v);
        return conditions;
    }

    private static C.Verdict Verdict(Verdict verdict) => verdict switch
    {
        Rating.Checks.Verdict.Pass => C.Verdict.Pass,
        Rating.Checks.Verdict.PassWithConditions => C.Verdict.PassWithConditions,
        Rating.Checks.Verdict.Fail => C.Verdict.Fail,
        _ => C.Verdict.NotAssessed,
    };

    private static void Set(double? value, Action<double> set)
    {
        if (value is { } number)
        {
            set(number);
        }
    }
}

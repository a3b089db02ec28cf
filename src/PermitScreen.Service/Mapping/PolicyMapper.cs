using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Service.Revisions;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads a policy. A policy is complete or refused: a missing number is a fault that names it, never a default.</summary>
internal static class PolicyMapper
{
    private const int MostVersions = 1_000_000;
    private const int BestCondition = 9;

    /// <summary>The document, or null with every fault.</summary>
    /// <param name="policy">Policy of the contract.</param>
    /// <param name="faults">Takes every fault.</param>
    public static PolicyDocument? Map(C.Policy policy, FaultList faults)
    {
        var before = faults.Count;
        var name = Names.Policy(faults, "name", policy.Name);
        faults.Text("title", policy.Title, "what people call it");
        faults.Text("edition", policy.Edition, "the edition of the standard that it follows");
        var version = faults.Required("document_version", policy.HasDocumentVersion, policy.DocumentVersion, 1, MostVersions);
        var from = faults.Date("in_force_from", policy.InForceFrom);
        var to = faults.Date("in_force_to", policy.InForceTo);
        if (policy.State == C.PolicyState.InForce && from is null)
        {
            faults.Add("in_force_from", "Missing; a policy in force says from which day.");
        }

        if (to < from)
        {
            faults.Add("in_force_to", "The last day in force lies before the first one.");
        }

        if (policy.Confirmation is { } confirmation)
        {
            var at = faults.Under("confirmation");
            at.Text("person", confirmation.Person, "the name of the person who confirmed the numbers");
            if (at.Date("confirmed_on", confirmation.ConfirmedOn) is null && confirmation.ConfirmedOn is null)
            {
                at.Add("confirmed_on", "Missing; give the day of the confirmation.");
            }
        }

        var numbers = Numbers(policy, faults);
        var standing = Standing(policy.StandingRules, faults.Under("standing_rules"));
        if (State(policy.State) is not { } state)
        {
            faults.Add("state", "Missing; say POLICY_STATE_DRAFT, POLICY_STATE_IN_FORCE or POLICY_STATE_WITHDRAWN.");
            return null;
        }

        if (faults.Count > before || numbers is null)
        {
            return null;
        }

        return new PolicyDocument
        {
            Name = name,
            Title = policy.Title,
            Edition = policy.Edition,
            DocumentVersion = version,
            State = state,
            InForceFrom = from,
            InForceTo = to,
            Confirmed = policy.Confirmation is not null,
            Demonstration = policy.Demonstration,
            Etag = Etag(policy),
            Policy = numbers,
            Standing = standing,
        };
    }

    /// <summary>Fingerprint of a policy's content.</summary>
    /// <param name="policy">Policy.</param>
    public static string Etag(C.Policy policy) => Digest.Of(CanonicalForm.Of(policy)).Etag;

    private static Policy? Numbers(C.Policy policy, FaultList faults)
    {
        var method = policy.Method.ToDomain();
        if (method is null)
        {
            faults.Add("method", "Missing; say the rating method.");
        }

        var limitState = policy.LimitState.ToDomain();
        if (limitState is null)
        {
            faults.Add("limit_state", "Missing; say LIMIT_STATE_STRENGTH or LIMIT_STATE_SERVICE.");
        }

        if (policy.Level.ToDomain() is null)
        {
            faults.Add("level", "Missing; say the level, RATING_LEVEL_NONE where the method knows none: it decides which resistances fit.");
        }
        else if (policy.Method is C.RatingMethod.Lfr or C.RatingMethod.AllowableStress && policy.Level is not (C.RatingLevel.Inventory or C.RatingLevel.Operating))
        {
            faults.Add("level", "This method rates at a level; say RATING_LEVEL_INVENTORY or RATING_LEVEL_OPERATING.");
        }

        var deadLoad = DeadLoadFactors(policy, faults);
        var rows = LiveLoadRowMapper.Map(policy, faults);
        var rungs = new RungMapper(policy).Map(faults);
        var otherLane = OtherLane(policy, faults);
        var sameLane = SameLane(policy, faults);
        var lateral = Lateral(policy.LateralRules, faults.Under("lateral_rules"));
        var presence = Presence(policy, faults);
        var capacity = CapacityRulesMapper.Map(policy.CapacityRules, faults.Under("capacity_rules"));
        var weighing = Weighing(policy.WeighingRule, faults.Under("weighing_rule"));
        return method is null || limitState is null
            ? null
            : new Policy
            {
                Method = method.Value,
                LimitState = limitState.Value,
                Level = policy.Level.ToDomain() ?? RatingLevel.None,
                DeadLoadFactors = deadLoad,
                LiveLoadRows = rows,
                Rungs = rungs,
                OtherLane = otherLane,
                SameLane = sameLane,
                Lateral = lateral,
                MultiplePresence = presence,
                Capacity = capacity,
                Weighing = weighing,
            };
    }

    private static PolicyState? State(C.PolicyState state) => state switch
    {
        C.PolicyState.Draft => PolicyState.Draft,
        C.PolicyState.InForce => PolicyState.InForce,
        C.PolicyState.Withdrawn => PolicyState.Withdrawn,
        _ => null,
    };

    private static ImmutableArray<DeadLoadFactor> DeadLoadFactors(C.Policy policy, FaultList faults)
    {
        var factors = ImmutableArray.CreateBuilder<DeadLoadFactor>();
        for (var i = 0; i < policy.DeadLoadFactors.Count; i++)
        {
            var factor = policy.DeadLoadFactors[i];
            var at = faults.At("dead_load_factors", i);
            var adverse = at.Required("adverse", factor.HasAdverse, factor.Adverse, Allowed.Positive, "dimensionless");
            var relieving = at.Required("relieving", factor.HasRelieving, factor.Relieving, Allowed.NotNegative, "dimensionless");
            if (factor.Component.ToDomain() is not { } component)
            {
                at.Add("component", "Missing; say which component of dead load.");
                continue;
            }

            if (relieving > adverse)
            {
                at.Add("relieving", $"Found {Fields.Text(relieving)}; the factor where the component relieves is not larger than the adverse one, {Fields.Text(adverse)}.");
            }

            if (factors.Any(f => f.Component == component))
            {
                at.Add("component", $"{component.ToString().ToUpperInvariant()} has two rows of factors; give one.");
            }

            factors.Add(new DeadLoadFactor(component, adverse, relieving, factor.Required));
        }

        RequireOwnWeight(policy, faults);
        return factors.ToImmutable();
    }

    /// <summary>Every structure has its own weight and a surface: effects that do not state them must not be rated as if they had none.</summary>
    private static void RequireOwnWeight(C.Policy policy, FaultList faults)
    {
        foreach (var component in new[] { C.DeadLoadComponent.Dc, C.DeadLoadComponent.Dw })
        {
            var words = component.ToString().ToUpperInvariant();
            var index = policy.DeadLoadFactors.ToList().FindIndex(f => f.Component == component);
            if (index < 0)
            {
                faults.Add("dead_load_factors", $"Missing; give the factors of {words}, with required true.");
            }
            else if (!policy.DeadLoadFactors[index].Required)
            {
                faults.At("dead_load_factors", index).Add("required", $"Every rated effect states its {words}, or that there is none with the reason; say true.");
            }
        }
    }

    private static OtherLaneLoad? OtherLane(C.Policy policy, FaultList faults)
    {
        if (policy.OtherLaneLoad is not { } load)
        {
            if (policy.Rungs.Any(r => r.OtherLanesLoaded))
            {
                faults.Add("other_lane_load", "Missing; a rung loads the other lanes.");
            }

            return null;
        }

        var at = faults.Under("other_lane_load");
        var factor = at.Required("live_load_factor", load.HasLiveLoadFactor, load.LiveLoadFactor, Allowed.Positive, "dimensionless");
        var allowance = RungMapper.Allowance(load.Allowance, at.Under("allowance"));
        if (load.Vehicle is null)
        {
            at.Add("vehicle", "Missing; give the vehicle that stands in each other lane.");
            return null;
        }

        var gaps = new List<Reason>();
        var vehicle = VehicleMapper.Map(load.Vehicle, "policy.other_lane_load.vehicle", at.Under("vehicle"), gaps);
        foreach (var gap in gaps)
        {
            at.Add("vehicle", $"{gap.Message} ({gap.Field})");
        }

        return vehicle is null ? null : new OtherLaneLoad(vehicle, factor, allowance);
    }

    private static SameLaneLoad? SameLane(C.Policy policy, FaultList faults)
    {
        if (policy.SameLaneLoad is not { } load)
        {
            if (policy.Rungs.Any(r => r.SameLaneLoaded))
            {
                faults.Add("same_lane_load", "Missing; a rung loads the permit's own lane.");
            }

            return null;
        }

        var at = faults.Under("same_lane_load");
        var intensity = at.Required("load_kn_per_m", load.HasLoadKnPerM, load.LoadKnPerM, Allowed.NotNegative, "kN/m");
        var spansOver = at.Required("for_spans_over_m", load.HasForSpansOverM, load.ForSpansOverM, Allowed.NotNegative, "m");
        if (intensity > 0 && spansOver > 0 && !load.ForHoggingAndInteriorReactions)
        {
            at.Add("for_hogging_and_interior_reactions", "Hogging moments and interior reactions take the load of two spans, whatever their length (MBE 6A.4.5.4.1); say true, or 0 kN/m where there is no such load.");
        }

        return new SameLaneLoad(intensity, spansOver, load.ForHoggingAndInteriorReactions);
    }

    private static LateralRules Lateral(C.LateralRules? rules, FaultList faults)
    {
        rules ??= new C.LateralRules();
        return new LateralRules(
            faults.Required("kerb_distance_m", rules.HasKerbDistanceM, rules.KerbDistanceM, Allowed.NotNegative, "m"),
            faults.Required("tyre_gap_m", rules.HasTyreGapM, rules.TyreGapM, Allowed.NotNegative, "m"));
    }

    private static ImmutableArray<double> Presence(C.Policy policy, FaultList faults)
    {
        var factors = new SortedDictionary<int, double>();
        for (var i = 0; i < policy.MultiplePresence.Count; i++)
        {
            var presence = policy.MultiplePresence[i];
            var at = faults.At("multiple_presence", i);
            var lanes = at.Required("lanes_loaded", presence.HasLanesLoaded, presence.LanesLoaded, 1, 20);
            if (!factors.TryAdd(lanes, at.Required("factor", presence.HasFactor, presence.Factor, Allowed.Positive, "dimensionless")))
            {
                at.Add("lanes_loaded", FormattableString.Invariant($"{lanes} lanes have two factors; give one."));
            }
        }

        if (factors.Count == 0 || !factors.Keys.SequenceEqual(Enumerable.Range(1, factors.Count)))
        {
            faults.Add("multiple_presence", "Give a factor for 1 loaded lane, 2, and so on without a break; the last one holds for more lanes.");
        }

        return [.. factors.Values];
    }

    private static WeighingRule Weighing(C.WeighingRule? rule, FaultList faults)
    {
        rule ??= new C.WeighingRule();
        if (!rule.HasRelievingAxlesCount)
        {
            faults.Add("relieving_axles_count", "Missing; say whether axles that relieve an effect count.");
        }

        return new WeighingRule(
            faults.Required("tolerance", rule.HasTolerance, rule.Tolerance, Allowed.BelowOne, "dimensionless"),
            rule.RelievingAxlesCount);
    }

    private static StandingRules Standing(C.StandingRules? rules, FaultList faults)
    {
        rules ??= new C.StandingRules();
        return new StandingRules(
            faults.Required("height_margin_m", rules.HasHeightMarginM, rules.HeightMarginM, Allowed.NotNegative, "m"),
            faults.Required("width_margin_m", rules.HasWidthMarginM, rules.WidthMarginM, Allowed.NotNegative, "m"),
            faults.Required("poor_up_to_rating", rules.HasPoorUpToRating, rules.PoorUpToRating, 0, BestCondition),
            Doubt(rules.PoorCondition),
            Doubt(rules.OverdueInspection));
    }

    private static DoubtRule Doubt(C.DoubtRule rule) => rule == C.DoubtRule.Flag ? DoubtRule.Flag : DoubtRule.NotAssessed;
}

using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Ladder;

/// <summary>From a resistance to a capacity, C = φ·R·max(φc·φs, floor) (rule D1).</summary>
public static class Capacities
{
    /// <summary>Whether a policy may use a resistance.</summary>
    /// <param name="resistance">Resistance.</param>
    /// <param name="policy">Policy.</param>
    public static bool Fits(Resistance resistance, Policy policy)
    {
        // Load and resistance factor rating and the Eurocodes know no levels of resistance, so none of theirs may fall out; the other methods do.
        var levelled = policy.Method is RatingMethod.Lfr or RatingMethod.AllowableStress;
        return resistance.Method == policy.Method
            && resistance.LimitState == policy.LimitState
            && (resistance.Level == policy.Level || !levelled);
    }

    /// <summary>The capacity of one resistance, or null with the reasons why it cannot be told.</summary>
    /// <param name="effect">Effect.</param>
    /// <param name="resistance">Resistance that fits the policy.</param>
    /// <param name="policy">Policy.</param>
    /// <param name="reasons">Takes what is missing.</param>
    public static CapacityArithmetic? Of(RatedEffect effect, Resistance resistance, Policy policy, List<Reason> reasons)
    {
        var before = reasons.Count;
        var rules = policy.Capacity;
        if (resistance.Nominal && resistance.ResistanceFactor is null)
        {
            Missing("resistance_factor", "A nominal resistance needs its resistance factor");
        }

        Said(resistance.IncludesConditionFactor, "includes_condition_factor", "whether the resistance already holds the condition factor");
        Said(resistance.IncludesSystemFactor, "includes_system_factor", "whether the resistance already holds the system factor");
        Said(resistance.IncludesMeasuredLoss, "includes_measured_loss", "whether measured loss is already in the resistance");

        var conditionIncluded = resistance.IncludesConditionFactor == true;
        var lossInstead = resistance.IncludesMeasuredLoss == true && !rules.ConditionFactorOnMeasuredLoss;
        if (effect.Condition.Own is null && HasMeasuredLoss(effect))
        {
            reasons.Add(new Reason(
                ReasonCode.DataMissing,
                $"A member with measured loss states its own condition rating, and this one does not: give condition_rating, 0 to 9 ({effect.Description}, {effect.PlaneId}).",
                $"{effect.Path}.rated.condition_rating"));
        }

        var condition = conditionIncluded || lossInstead ? 1.0 : ConditionFactor(effect, rules, reasons);
        var system = resistance.IncludesSystemFactor == true ? 1.0 : SystemFactor(effect, rules, reasons);

        if (reasons.Count > before)
        {
            return null;
        }

        var phi = resistance.Nominal ? resistance.ResistanceFactor!.Value : 1.0;
        var product = condition * system;
        if (policy.LimitState == LimitState.Strength)
        {
            product = Math.Max(product, rules.FactorFloor);
        }

        var note = (conditionIncluded ? "condition factor already in the resistance; " : lossInstead ? "no condition factor on measured loss; " : "")
            + (resistance.IncludesSystemFactor == true ? "system factor already in the resistance; " : "")
            + (product > condition * system ? FormattableString.Invariant($"product raised to the floor {rules.FactorFloor:0.###}; ") : "");
        return new CapacityArithmetic(resistance.AmountKn, phi, condition, system, product, phi * resistance.AmountKn * product, note.TrimEnd(' ', ';'));

        void Missing(string field, string message) =>
            reasons.Add(new Reason(ReasonCode.DataMissing, $"{message} ({effect.Description}, {effect.PlaneId}).", $"{resistance.Path}.{field}"));

        void Said(bool? said, string field, string what)
        {
            if (said is null)
            {
                Missing(field, $"It is not said {what}");
            }
        }
    }

    /// <summary>
    /// What an effect states of its own may not be less favourable than what stands for the whole, measured loss excepted:
    /// otherwise an own statement that got lost would quietly be replaced by a better one.
    /// </summary>
    private static double ConditionFactor(RatedEffect effect, CapacityRules rules, List<Reason> reasons)
    {
        if (effect.Condition.Value is not { } rating)
        {
            reasons.Add(new Reason(ReasonCode.DataMissing, $"No condition rating for {effect.Description} ({effect.PlaneId}): neither the effect nor the structure's inspection states one.", $"{effect.Path}.rated.condition_rating"));
            return 1.0;
        }

        var factor = rules.ConditionFactorOf(rating);
        if (!HasMeasuredLoss(effect) && effect.Condition is { Own: not null, OfWhole: { } whole } && factor < rules.ConditionFactorOf(whole))
        {
            reasons.Add(new Reason(ReasonCode.DataMissing, FormattableString.Invariant($"{effect.Description} ({effect.PlaneId}) is rated {rating} in condition, its superstructure {whole}: the superstructure's rating is that of its worst member, or the member's loss is measured."), "inspection.superstructure_condition"));
        }

        return factor;
    }

    private static bool HasMeasuredLoss(RatedEffect effect) => effect.Resistances.Any(r => r.IncludesMeasuredLoss == true);

    private static double SystemFactor(RatedEffect effect, CapacityRules rules, List<Reason> reasons)
    {
        if (effect.System.Value is not { } kind)
        {
            reasons.Add(new Reason(ReasonCode.DataMissing, $"No kind of member for the system factor of {effect.Description} ({effect.PlaneId}).", $"{effect.Path}.rated.system"));
            return 1.0;
        }

        if (!rules.SystemFactors.TryGetValue(kind, out var factor))
        {
            reasons.Add(new Reason(ReasonCode.DataMissing, $"The policy has no system factor for {kind}.", "policy.capacity_rules.system_factors"));
            return 1.0;
        }

        if (effect.System is { Own: not null, OfWhole: { } whole } && rules.SystemFactors.TryGetValue(whole, out var ofWhole) && factor < ofWhole)
        {
            reasons.Add(new Reason(ReasonCode.DataMissing, $"{effect.Description} ({effect.PlaneId}) is of a less favourable kind ({kind}) than its unit ({whole}): the unit states the least favourable kind of its members.", $"{effect.Path}.rated.system"));
        }

        return factor;
    }

    /// <summary>The capacity in uplift of a bearing without hold-down: 0 (rule D6).</summary>
    public static CapacityArithmetic NoHoldDown { get; } = new(0, 1, 1, 1, 1, 0, "no hold-down: uplift capacity 0");
}

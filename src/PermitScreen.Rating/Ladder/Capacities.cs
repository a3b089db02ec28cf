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
        // Load and resistance factor rating and the Eurocodes know no levels of resistance; the other methods do.
        var levelled = policy.Method is RatingMethod.Lfr or RatingMethod.AllowableStress;
        return resistance.Method == policy.Method
            && resistance.LimitState == policy.LimitState
            && (resistance.Level == policy.Level || (!levelled && resistance.Level == RatingLevel.None));
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
        var condition = 1.0;
        if (!conditionIncluded && !lossInstead)
        {
            if (effect.ConditionRating is { } rating)
            {
                condition = rules.ConditionFactorOf(rating);
            }
            else
            {
                reasons.Add(new Reason(ReasonCode.DataMissing, $"No condition rating for {effect.Description} ({effect.PlaneId}): neither the effect nor the structure's inspection states one.", $"{effect.Path}.rated.condition_rating"));
            }
        }

        var system = 1.0;
        if (resistance.IncludesSystemFactor != true)
        {
            if (effect.System is not { } kind)
            {
                reasons.Add(new Reason(ReasonCode.DataMissing, $"No kind of member for the system factor of {effect.Description} ({effect.PlaneId}).", $"{effect.Path}.rated.system"));
            }
            else if (!rules.SystemFactors.TryGetValue(kind, out system))
            {
                reasons.Add(new Reason(ReasonCode.DataMissing, $"The policy has no system factor for {kind}.", "policy.capacity_rules.system_factors"));
            }
        }

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

    /// <summary>The capacity in uplift of a bearing without hold-down: 0 (rule D6).</summary>
    public static CapacityArithmetic NoHoldDown { get; } = new(0, 1, 1, 1, 1, 0, "no hold-down: uplift capacity 0");
}

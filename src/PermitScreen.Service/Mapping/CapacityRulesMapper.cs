using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads how a resistance becomes a capacity.</summary>
internal static class CapacityRulesMapper
{
    private const int BestCondition = 9;

    public static CapacityRules Map(C.CapacityRules? rules, FaultList faults)
    {
        rules ??= new C.CapacityRules();
        var condition = ImmutableArray.CreateBuilder<ConditionFactor>();
        for (var i = 0; i < rules.ConditionFactors.Count; i++)
        {
            var band = rules.ConditionFactors[i];
            var at = faults.At("condition_factors", i);
            var from = at.Required("from_rating", band.HasFromRating, band.FromRating, 0, BestCondition);
            if (condition.Any(c => c.FromRating == from))
            {
                at.Add("from_rating", FormattableString.Invariant($"Two bands begin at {from}; give one."));
            }

            condition.Add(new ConditionFactor(from, at.Required("factor", band.HasFactor, band.Factor, Allowed.Fraction, "dimensionless")));
        }

        if (condition.All(c => c.FromRating != 0))
        {
            faults.Add("condition_factors", "Missing; give bands of condition ratings, the lowest one from 0.");
        }

        var system = ImmutableDictionary.CreateBuilder<SystemKind, double>();
        for (var i = 0; i < rules.SystemFactors.Count; i++)
        {
            var factor = rules.SystemFactors[i];
            var at = faults.At("system_factors", i);
            var value = at.Required("factor", factor.HasFactor, factor.Factor, Allowed.Fraction, "dimensionless");
            if (factor.System.ToDomain() is not { } kind)
            {
                at.Add("system", "Missing; say the kind of member.");
            }
            else if (!system.TryAdd(kind, value))
            {
                at.Add("system", "This kind of member has two factors; give one.");
            }
        }

        var floor = faults.Required("factor_floor", rules.HasFactorFloor, rules.FactorFloor, Allowed.Fraction, "dimensionless");
        if (!rules.HasConditionFactorOnMeasuredLoss)
        {
            faults.Add("condition_factor_on_measured_loss", "Missing; say whether the condition factor also applies where measured loss is already in the resistance.");
        }

        return new CapacityRules(condition.ToImmutable(), system.ToImmutable(), floor, rules.ConditionFactorOnMeasuredLoss);
    }
}

using System.Collections.Immutable;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Ladder;

/// <summary>Factored dead load per effect and sense, component by component (rule B5).</summary>
public static class DeadLoads
{
    /// <summary>The terms in one sense, or null with the reasons why they cannot be told.</summary>
    /// <param name="effect">Effect.</param>
    /// <param name="sense">Sense.</param>
    /// <param name="policy">Policy.</param>
    /// <param name="reasons">Takes what is missing: absent is never zero (rule F4).</param>
    public static ImmutableArray<DeadLoadArithmetic>? Of(RatedEffect effect, EffectSense sense, Policy policy, List<Reason> reasons)
    {
        var before = reasons.Count;
        foreach (var factor in policy.DeadLoadFactors)
        {
            if (factor.Required && !States(effect, factor.Component))
            {
                reasons.Add(new Reason(
                    ReasonCode.DataMissing,
                    $"No {Name(factor.Component)} dead load for {effect.Description} ({effect.PlaneId}); give its amount, or state that there is none with the reason.",
                    $"{effect.Path}.rated.dead_loads"));
            }
        }

        var terms = ImmutableArray.CreateBuilder<DeadLoadArithmetic>(effect.DeadLoads.Length);
        foreach (var load in effect.DeadLoads)
        {
            if (policy.FactorOf(load.Component) is not { } factor)
            {
                reasons.Add(new Reason(ReasonCode.DataMissing, $"The policy has no load factor for {Name(load.Component)}.", "policy.dead_load_factors"));
                continue;
            }

            var inSense = sense.Sign() * load.AmountKn;
            terms.Add(new DeadLoadArithmetic(load.Component, inSense, inSense > 0 ? factor.Adverse : factor.Relieving));
        }

        return reasons.Count > before ? null : terms.ToImmutable();
    }

    /// <summary>Sum of factored terms, kN.</summary>
    /// <param name="terms">Terms.</param>
    public static double Sum(ImmutableArray<DeadLoadArithmetic> terms)
    {
        var sum = 0.0;
        foreach (var term in terms)
        {
            sum += term.FactoredKn;
        }

        return sum;
    }

    /// <summary>DC is stated as such, or by both its stages.</summary>
    private static bool States(RatedEffect effect, DeadLoadComponent component) =>
        effect.Has(component)
        || (component == DeadLoadComponent.Dc && effect.Has(DeadLoadComponent.Dc1) && effect.Has(DeadLoadComponent.Dc2));

    private static bool Has(this RatedEffect effect, DeadLoadComponent component) => effect.DeadLoads.Any(d => d.Component == component);

    private static string Name(DeadLoadComponent component) => component.ToString().ToUpperInvariant();
}

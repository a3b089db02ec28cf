using System.Collections.Immutable;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Ladder;

/// <summary>Rates one effect in one sense on one rung: RF = (C − Σγ·D) / (factored live load), pass on Σγ·load ≤ C (rules B6, B7).</summary>
public static class EffectCheck
{
    /// <summary>Distance of RF from 1 within which the plain path decides (rule B8).</summary>
    private const double DecidedByPlainPath = 1e-9;

    /// <summary>The result, or null where the sense needs no rating or could not be rated (then with reasons).</summary>
    /// <param name="load">What loads the unit.</param>
    /// <param name="effect">Effect.</param>
    /// <param name="sense">Sense.</param>
    /// <param name="extremes">Extremes found so far.</param>
    /// <param name="reasons">Takes what keeps it from being rated.</param>
    public static EffectResult? Of(RungLoad load, RatedEffect effect, EffectSense sense, LineExtremes extremes, List<Reason> reasons)
    {
        if (DeadLoads.Of(effect, sense, load.Policy, reasons) is not { } deadLoads)
        {
            return null;
        }

        var deadKn = DeadLoads.Sum(deadLoads);
        var arranged = load.Arrangements.Select(a => new ArrangedLoad(load, effect, sense, a, extremes)).ToList();
        var (factor, factorNote) = load.Factors.At(1);
        var worst = arranged.MaxBy(a => a.FactoredKn(factor, 1))!;
        var liveKn = worst.FactoredKn(factor, 1);
        var lineActs = sense.Sign() > 0 ? effect.Line.HasPositive : effect.Line.HasNegative;
        if (!lineActs && liveKn <= 0 && deadKn <= 0)
        {
            return null;
        }

        if (LeastCapacity(effect, sense, load.Policy, WhyNeeded(lineActs, liveKn, deadKn), reasons) is not var (capacity, element))
        {
            return null;
        }

        var numerator = capacity.CapacityKn - deadKn;
        var passes = numerator >= 0 && liveKn <= numerator;
        var state = numerator < 0 ? RatingFactorState.DeadLoadExceeds : liveKn > 0 ? RatingFactorState.Number : RatingFactorState.NoLiveLoad;
        double? ratingFactor = state == RatingFactorState.Number ? numerator / liveKn : null;
        if (ratingFactor is { } rf && Math.Abs(rf - 1) <= DecidedByPlainPath)
        {
            var plain = new LineExtremes(plain: true);
            var plainKn = load.Arrangements.Max(a => new ArrangedLoad(load, effect, sense, a, plain).FactoredKn(factor, 1));
            passes = numerator >= 0 && plainKn <= numerator;
        }

        return new EffectResult
        {
            Effect = effect,
            Sense = sense,
            Element = element,
            ConfigurationId = load.ConfigurationId,
            Passes = passes,
            State = state,
            RatingFactor = ratingFactor,
            LargestAxleFactor = state == RatingFactorState.DeadLoadExceeds ? 0 : LargestAxleFactor.Of(arranged, load.Factors, numerator, passes),
            Capacity = capacity,
            DeadLoads = deadLoads,
            NumeratorKn = numerator,
            LiveLoads = worst.Terms(factor, factorNote),
            DenominatorKn = liveKn,
        };
    }

    /// <summary>What keeps an effect from being rated under a policy, whatever the vehicle.</summary>
    /// <param name="effect">Effect.</param>
    /// <param name="policy">Policy.</param>
    public static IReadOnlyList<Reason> Gaps(RatedEffect effect, Policy policy)
    {
        var reasons = new List<Reason>();
        foreach (var sense in new[] { effect.Kind.PositiveSense(), effect.Kind.NegativeSense() })
        {
            var lineActs = sense.Sign() > 0 ? effect.Line.HasPositive : effect.Line.HasNegative;
            if (DeadLoads.Of(effect, sense, policy, reasons) is { } deadLoads && (lineActs || DeadLoads.Sum(deadLoads) > 0))
            {
                LeastCapacity(effect, sense, policy, WhyNeeded(lineActs, 0, DeadLoads.Sum(deadLoads)), reasons);
            }
        }

        return [.. reasons.Distinct()];
    }

    /// <summary>Several resistances per sense are allowed; the least governs and its element is named (rule D1).</summary>
    private static (CapacityArithmetic Capacity, string Element)? LeastCapacity(RatedEffect effect, EffectSense sense, Policy policy, string whyNeeded, List<Reason> reasons)
    {
        if (effect.NoHoldDown && sense == EffectSense.Uplift)
        {
            return (Capacities.NoHoldDown, "bearing");
        }

        var before = reasons.Count;
        (CapacityArithmetic Capacity, string Element)? least = null;
        var ofSense = effect.Resistances.Where(r => r.Sense == sense).ToImmutableArray();
        foreach (var resistance in ofSense.Where(r => Capacities.Fits(r, policy)))
        {
            if (Capacities.Of(effect, resistance, policy, reasons) is { } capacity
                && (least is not { } known || capacity.CapacityKn < known.Capacity.CapacityKn))
            {
                least = (capacity, resistance.Element);
            }
        }

        if (reasons.Count > before)
        {
            return null;
        }

        if (least is null)
        {
            reasons.Add(ofSense.IsEmpty
                ? new Reason(ReasonCode.DataMissing, $"No resistance in {Words(sense)} for {effect.Description} ({effect.PlaneId}), {whyNeeded}.", $"{effect.Path}.rated.resistances")
                : new Reason(ReasonCode.MethodMismatch, $"No resistance of the policy's method, limit state and level in {Words(sense)} for {effect.Description} ({effect.PlaneId}).", $"{effect.Path}.rated.resistances"));
        }

        return least;
    }

    private static string WhyNeeded(bool lineActs, double liveKn, double deadKn) =>
        lineActs || liveKn > 0
            ? "which its influence line can bring"
            : FormattableString.Invariant($"into which its factored dead load of {deadKn:0.0} kN puts it; check the sign of the dead load (tension +, compression -, reaction up +)");

    private static string Words(EffectSense sense) => sense.ToString().ToLowerInvariant();
}

using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Rating.Ladder;

/// <summary>Climbs a policy's ladder of travel conditions on one structure.</summary>
public static class LadderScreening
{
    /// <summary>Rates every effect on every rung.</summary>
    /// <param name="structure">Structure.</param>
    /// <param name="configurations">States in which the load travels over it; at least one. All must pass.</param>
    /// <param name="permitKind">Kind of permit.</param>
    /// <param name="directions">Directions of travel over the structure.</param>
    /// <param name="policy">Policy.</param>
    /// <param name="cancellation">Cancels between effects.</param>
    public static LadderResult Of(
        RatedStructure structure,
        ImmutableArray<PermitConfiguration> configurations,
        PermitKind permitKind,
        TravelDirections directions,
        Policy policy,
        CancellationToken cancellation)
    {
        var extremes = new LineExtremes();
        var rungs = policy.Rungs
            .Select(rung => new RungScreening(structure, permitKind, directions, policy, rung, extremes).Of(configurations, cancellation))
            .ToImmutableArray();
        var passing = rungs.FirstOrDefault(r => r.Outcome == RungOutcome.Passes);
        var verdict = passing is null
            ? rungs.Any(r => r.Outcome == RungOutcome.NotAssessed) ? Verdict.NotAssessed : Verdict.Fail
            : ReferenceEquals(passing, rungs[0]) && passing.Rung.Unrestricted ? Verdict.Pass : Verdict.PassWithConditions;
        return new LadderResult(verdict, rungs, passing ?? rungs.LastOrDefault(r => r.Outcome != RungOutcome.Unavailable));
    }

    private sealed class RungScreening(
        RatedStructure structure, PermitKind permitKind, TravelDirections directions, Policy policy, Rung rung, LineExtremes extremes)
    {
        private readonly List<Reason> _missing = [];
        private readonly List<Reason> _blocked = [];
        private readonly Dictionary<(RatedEffect Effect, EffectSense Sense), EffectResult> _worst = [];

        public RungResult Of(ImmutableArray<PermitConfiguration> configurations, CancellationToken cancellation)
        {
            if (policy.LiveLoadRows.FirstOrDefault(r => rung.LiveLoadRowIds.Contains(r.RowId) && r.PermitKind == permitKind) is not { } row)
            {
                var reason = new Reason(ReasonCode.NoFactorForPermitKind, "The policy has no live-load factor for this kind of permit under these conditions.", "policy.live_load_rows");
                return new RungResult(rung, RungOutcome.Unavailable, [reason], []);
            }

            _missing.AddRange(structure.Gaps);
            foreach (var unit in structure.Units)
            {
                _missing.AddRange(unit.Gaps);
            }

            foreach (var configuration in configurations)
            {
                _missing.AddRange(configuration.Gaps);
                if (configuration.Vehicle is { } vehicle)
                {
                    Rate(configuration.ConfigurationId, vehicle, row, cancellation);
                }
            }

            if (_worst.Count == 0 && _missing.Count == 0 && _blocked.Count == 0)
            {
                _missing.Add(new Reason(ReasonCode.DataMissing, "No effect of the structure is rated.", "units"));
            }

            var effects = _worst.Values.OrderBy(e => e, GoverningFirst.Order).ToImmutableArray();
            return new RungResult(rung, Outcome(effects), Reasons(effects), effects);
        }

        private void Rate(string configurationId, PermitVehicle vehicle, LiveLoadRow row, CancellationToken cancellation)
        {
            var arrangements = Arrangements.Of(structure.Roadway, vehicle.WidthOverTyresM, rung, policy, out var blocked);
            if (blocked is null && structure.Units.IsEmpty)
            {
                return;
            }

            if (blocked is not null)
            {
                (blocked.Code == ReasonCode.DataMissing ? _missing : _blocked).Add(blocked);
                return;
            }

            var lengthM = structure.Units.Max(u => u.DeckEndM) - structure.Units.Min(u => u.DeckStartM);
            var factors = new LiveLoadFactors(row, structure.Roadway.AdttOneDirection, vehicle.Train, lengthM);
            foreach (var unit in structure.Units)
            {
                RequireNoUnratedUplift(unit, arrangements);
                var load = new RungLoad(policy, rung, unit, configurationId, vehicle, directions, arrangements, factors);
                foreach (var effect in unit.Effects)
                {
                    cancellation.ThrowIfCancellationRequested();
                    Keep(EffectCheck.Of(load, effect, effect.Kind.PositiveSense(), extremes, _missing));
                    Keep(EffectCheck.Of(load, effect, effect.Kind.NegativeSense(), extremes, _missing));
                }
            }
        }

        /// <summary>A vehicle beyond one plane lifts the other one, though its line has no negative part.</summary>
        private void RequireNoUnratedUplift(RatedUnit unit, ImmutableArray<Arrangement> arrangements)
        {
            foreach (var bearing in unit.UnratedBearings.Where(b => b.Line.HasPositive))
            {
                var lowest = arrangements.SelectMany(a => a.OtherCentresM.Append(a.PermitCentreM)).Min(y => Shares.Of(unit, bearing.PlaneId, y));
                if (lowest < 0)
                {
                    _missing.Add(new Reason(ReasonCode.DataMissing, $"A vehicle can stand beyond the other plane and lift the {bearing.Description} ({bearing.PlaneId}); it must be rated in uplift.", bearing.Path));
                }
            }
        }

        private void Keep(EffectResult? result)
        {
            if (result is null)
            {
                return;
            }

            var key = (result.Effect, result.Sense);
            if (!_worst.TryGetValue(key, out var known) || GoverningFirst.Order.Compare(result, known) < 0)
            {
                _worst[key] = result;
            }
        }

        private RungOutcome Outcome(ImmutableArray<EffectResult> effects) =>
            effects.Any(e => !e.Passes) || _blocked.Any(r => r.Code == ReasonCode.NoRoomOnRoadway) ? RungOutcome.Fails
            : _blocked.Count > 0 ? RungOutcome.Unavailable
            : _missing.Count > 0 ? RungOutcome.NotAssessed
            : RungOutcome.Passes;

        private ImmutableArray<Reason> Reasons(ImmutableArray<EffectResult> effects)
        {
            var reasons = new List<Reason>();
            if (effects.FirstOrDefault(e => !e.Passes) is { } failing)
            {
                reasons.Add(failing.State == RatingFactorState.DeadLoadExceeds
                    ? new Reason(ReasonCode.DeadLoadExceedsCapacity, $"Dead load alone exceeds the capacity of {failing.Effect.Description} ({failing.Effect.PlaneId}): suspect data, or a structure that should not be open.", failing.Effect.Path)
                    : new Reason(ReasonCode.Overloaded, $"{effects.Count(e => !e.Passes)} rated effects are overloaded; the worst is {failing.Effect.Description} ({failing.Effect.PlaneId})."));
            }

            reasons.AddRange(_blocked);
            reasons.AddRange(_missing);
            return [.. reasons.Distinct()];
        }
    }
}

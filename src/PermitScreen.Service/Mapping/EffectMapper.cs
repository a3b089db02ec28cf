using System.Collections.Immutable;
using PermitScreen.Catalogue.Records;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads the effects of a truss unit.</summary>
/// <param name="unit">Unit of the contract.</param>
/// <param name="path">Path of the unit, for reasons.</param>
/// <param name="structureCondition">Condition of the superstructure, where stated.</param>
internal sealed class EffectMapper(C.Unit unit, string path, int? structureCondition)
{
    private const int WorstCondition = 0;
    private const int BestCondition = 9;
    private readonly HashSet<string> _ids = new(StringComparer.Ordinal);
    private readonly Dictionary<(TrussQuantity Quantity, string PlaneId), string> _covered = [];

    /// <summary>All effects; meaningless where faults were added.</summary>
    /// <param name="unitFaults">Faults of the unit.</param>
    public ImmutableArray<EffectRecord> Map(FaultList unitFaults) =>
        !unitFaults.Within("effects", unit.Effects.Count, Limits.Effects) ? [] :
        [.. unit.Effects.Select((e, i) => Effect(e, FormattableString.Invariant($"{path}.effects[{i}]"), unitFaults.At("effects", i)))];

    private EffectRecord Effect(C.Effect effect, string effectPath, FaultList faults)
    {
        Names.Id(faults, "effect_id", effect.EffectId, "L2L3");
        if (!_ids.Add(effect.EffectId))
        {
            faults.Add("effect_id", $"\"{effect.EffectId}\" names two effects; give each an id of its own.");
        }

        if (!faults.Within("plane_ids", effect.PlaneIds.Count, Limits.Planes)
            || (effect.Rated is { } listed && !(faults.Within("rated.resistances", listed.Resistances.Count, Limits.PerEffect) && faults.Within("rated.dead_loads", listed.DeadLoads.Count, Limits.PerEffect))))
        {
            return new EffectRecord { EffectId = effect.EffectId, PlaneIds = [], Description = "", Path = effectPath };
        }

        var gaps = new List<Reason>();
        var (quantity, words) = Quantity(effect, effectPath, faults, gaps);
        Planes(effect, quantity, faults);
        var record = new EffectRecord
        {
            EffectId = effect.EffectId,
            PlaneIds = [.. effect.PlaneIds],
            Quantity = quantity,
            Description = words,
            Path = effectPath,
        };
        switch (effect.RatingCase)
        {
            case C.Effect.RatingOneofCase.NotRated:
                faults.Under("not_rated").Text("reason", effect.NotRated.Reason, "the reason; it is printed with each verdict");
                return record with { NotRatedReason = effect.NotRated.Reason, Gaps = [.. gaps] };
            case C.Effect.RatingOneofCase.Rated:
                return Rated(record, effect.Rated, faults.Under("rated"), gaps);
            default:
                gaps.Add(new Reason(ReasonCode.DataMissing, $"Effect {effect.EffectId} is neither rated nor said not to be.", effectPath));
                return record with { Gaps = [.. gaps] };
        }
    }

    private EffectRecord Rated(EffectRecord record, C.Rated rated, FaultList faults, List<Reason> gaps)
    {
        var kind = record.Quantity?.Kind ?? EffectKind.AxialForce;
        var condition = faults.Optional("condition_rating", rated.HasConditionRating, rated.ConditionRating, WorstCondition, BestCondition);
        if (rated.HasNoHoldDown && kind != EffectKind.VerticalReaction)
        {
            faults.Add("no_hold_down", "Only a vertical reaction can lack a hold-down; leave it out.");
        }

        var resistances = rated.Resistances
            .Select((r, i) => Resistance(r, kind, FormattableString.Invariant($"{record.Path}.rated.resistances[{i}]"), faults.At("resistances", i), gaps))
            .OfType<Resistance>()
            .ToImmutableArray();
        var noHoldDown = rated.HasNoHoldDown && rated.NoHoldDown;
        if (noHoldDown && resistances.Any(r => r.Sense == EffectSense.Uplift))
        {
            faults.Add("no_hold_down", "A bearing without hold-down has no resistance in uplift; leave one of them out.");
        }

        return record with
        {
            Resistances = resistances,
            DeadLoads = DeadLoads(rated, record.Path, faults, gaps),
            System = new Stated<SystemKind>(rated.System.ToDomain(), unit.Truss.System.ToDomain()),
            Condition = new Stated<int>(condition, structureCondition),
            NoHoldDown = noHoldDown,
            Gaps = [.. gaps],
        };
    }

    private static ImmutableArray<DeadLoad> DeadLoads(C.Rated rated, string effectPath, FaultList faults, List<Reason> gaps)
    {
        var loads = ImmutableArray.CreateBuilder<DeadLoad>();
        for (var i = 0; i < rated.DeadLoads.Count; i++)
        {
            var load = rated.DeadLoads[i];
            var at = faults.At("dead_loads", i);
            var field = FormattableString.Invariant($"{effectPath}.rated.dead_loads[{i}]");
            if (load.Component.ToDomain() is not { } component)
            {
                gaps.Add(new Reason(ReasonCode.DataMissing, "A dead load does not say its component.", $"{field}.component"));
                continue;
            }

            if (loads.Any(l => l.Component == component))
            {
                at.Add("component", $"{component.ToString().ToUpperInvariant()} is stated twice; give the sum once.");
            }

            switch (load.AmountCase)
            {
                case C.DeadLoadValue.AmountOneofCase.ForceKn:
                    loads.Add(new DeadLoad(component, at.Required("force_kn", has: true, load.ForceKn, Allowed.Any, "kN")));
                    break;
                case C.DeadLoadValue.AmountOneofCase.None_:
                    at.Under("none").Text("reason", load.None.Reason, "the reason why there is none");
                    loads.Add(new DeadLoad(component, 0));
                    break;
                case C.DeadLoadValue.AmountOneofCase.MomentKnm:
                    at.Add("moment_knm", "This effect is a force; give force_kn.");
                    break;
                default:
                    gaps.Add(new Reason(ReasonCode.DataMissing, $"The amount of {component.ToString().ToUpperInvariant()} dead load is not stated; give it, or state that there is none with the reason.", field));
                    break;
            }
        }

        var dcAmount = rated.DeadLoads.Any(l => l.Component == C.DeadLoadComponent.Dc && l.AmountCase == C.DeadLoadValue.AmountOneofCase.ForceKn);
        if (dcAmount && loads.Any(l => l.Component is DeadLoadComponent.Dc1 or DeadLoadComponent.Dc2))
        {
            faults.Add("dead_loads", "DC stands beside its stages DC1 or DC2 and would count twice; give one or the other.");
        }

        return loads.ToImmutable();
    }

    private static Resistance? Resistance(C.Resistance resistance, EffectKind kind, string field, FaultList faults, List<Reason> gaps)
    {
        if (resistance.Sense.ToDomain() is not { } sense)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "A resistance does not say its sense.", $"{field}.sense"));
            return null;
        }

        if (sense != kind.PositiveSense() && sense != kind.NegativeSense())
        {
            faults.Add("sense", $"Found {sense.ToString().ToUpperInvariant()}; this effect has {kind.PositiveSense().ToString().ToUpperInvariant()} and {kind.NegativeSense().ToString().ToUpperInvariant()}.");
        }

        if (resistance.Method.ToDomain() is not { } method)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "A resistance does not say its rating method.", $"{field}.method"));
            return null;
        }

        if (resistance.LimitState.ToDomain() is not { } state)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "A resistance does not say its limit state.", $"{field}.limit_state"));
            return null;
        }

        if (resistance.Level.ToDomain() is not { } level)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "A resistance does not say its level; RATING_LEVEL_NONE where its method knows none.", $"{field}.level"));
            return null;
        }

        var phi = faults.Optional("resistance_factor", resistance.HasResistanceFactor, resistance.ResistanceFactor, Allowed.Fraction, "dimensionless");
        double? amount = null;
        var nominal = false;
        switch (resistance.AmountCase)
        {
            case C.Resistance.AmountOneofCase.NominalKn:
                nominal = true;
                amount = faults.Optional("nominal_kn", has: true, resistance.NominalKn, Allowed.NotNegative, "kN");
                break;
            case C.Resistance.AmountOneofCase.FactoredKn:
                amount = faults.Optional("factored_kn", has: true, resistance.FactoredKn, Allowed.NotNegative, "kN");
                if (resistance.HasResistanceFactor)
                {
                    faults.Add("resistance_factor", "A factored amount already holds its resistance factor; give nominal_kn, or leave the factor out.");
                }

                break;
            case C.Resistance.AmountOneofCase.NominalKnm or C.Resistance.AmountOneofCase.FactoredKnm:
                faults.Add("amount", "This effect is a force; give nominal_kn or factored_kn.");
                break;
            case C.Resistance.AmountOneofCase.FromSection:
                gaps.Add(new Reason(ReasonCode.NotModelled, "Resistances from section data are not modelled yet; give nominal_kn or factored_kn.", $"{field}.from_section"));
                return null;
            default:
                gaps.Add(new Reason(ReasonCode.DataMissing, "A resistance does not state its amount.", field));
                return null;
        }

        return new Resistance(
            sense,
            method,
            state,
            level,
            amount ?? 0,
            nominal,
            phi,
            resistance.HasIncludesConditionFactor ? resistance.IncludesConditionFactor : null,
            resistance.HasIncludesSystemFactor ? resistance.IncludesSystemFactor : null,
            resistance.HasIncludesMeasuredLoss ? resistance.IncludesMeasuredLoss : null,
            resistance.Element,
            field);
    }

    private (TrussQuantity? Quantity, string Words) Quantity(C.Effect effect, string effectPath, FaultList faults, List<Reason> gaps)
    {
        switch (effect.QuantityCase)
        {
            case C.Effect.QuantityOneofCase.AxialMember:
                var member = IndexOf(unit.Truss.Members.Select(m => m.Name), effect.AxialMember);
                if (member < 0)
                {
                    faults.Add("axial_member", $"\"{effect.AxialMember}\" is no member of this truss{Near(unit.Truss.Members.Select(m => m.Name), effect.AxialMember)}.");
                    return (null, "");
                }

                return (new TrussQuantity(EffectKind.AxialForce, member), $"axial force in {effect.AxialMember}");
            case C.Effect.QuantityOneofCase.Reaction:
                return Reaction(effect.Reaction, effectPath, faults.Under("reaction"), gaps);
            case C.Effect.QuantityOneofCase.None:
                gaps.Add(new Reason(ReasonCode.DataMissing, $"It is not said what effect {effect.EffectId} is.", effectPath));
                return (null, "");
            default:
                gaps.Add(new Reason(ReasonCode.NotModelled, $"Effects of this kind ({effect.QuantityCase}) are not modelled yet on trusses.", effectPath));
                return (null, "");
        }
    }

    private (TrussQuantity? Quantity, string Words) Reaction(C.ReactionQuantity reaction, string effectPath, FaultList faults, List<Reason> gaps)
    {
        var index = IndexOf(unit.Truss.Supports.Select(s => s.Name), reaction.Support);
        if (index < 0)
        {
            faults.Add("support", $"\"{reaction.Support}\" is no support of this truss{Near(unit.Truss.Supports.Select(s => s.Name), reaction.Support)}.");
            return (null, "");
        }

        var support = unit.Truss.Supports[index];
        switch (reaction.Component)
        {
            case C.ReactionComponent.Vertical when support.HoldsVertical:
                return (new TrussQuantity(EffectKind.VerticalReaction, index), $"vertical reaction of {reaction.Support}");
            case C.ReactionComponent.Horizontal when support.HoldsHorizontal:
                return (new TrussQuantity(EffectKind.HorizontalReaction, index), $"horizontal reaction of {reaction.Support}");
            case C.ReactionComponent.Vertical or C.ReactionComponent.Horizontal:
                faults.Add("component", $"Support {reaction.Support} does not hold in that direction.");
                return (null, "");
            default:
                gaps.Add(new Reason(ReasonCode.DataMissing, "A reaction does not say its component.", $"{effectPath}.reaction.component"));
                return (null, "");
        }
    }

    private void Planes(C.Effect effect, TrussQuantity? quantity, FaultList faults)
    {
        if (effect.PlaneIds.Count == 0)
        {
            faults.Add("plane_ids", "Missing; name the planes that this effect stands for.");
        }

        for (var i = 0; i < effect.PlaneIds.Count; i++)
        {
            var plane = effect.PlaneIds[i];
            if (unit.Truss.Planes.All(p => p.PlaneId != plane))
            {
                faults.Add(FormattableString.Invariant($"plane_ids[{i}]"), $"\"{plane}\" is no plane of this unit{Near(unit.Truss.Planes.Select(p => p.PlaneId), plane)}.");
            }
            else if (quantity is { } what && !_covered.TryAdd((what, plane), effect.EffectId))
            {
                faults.Add(FormattableString.Invariant($"plane_ids[{i}]"), $"Effect {_covered[(what, plane)]} already stands for this in plane {plane}; put all its resistances into one effect.");
            }
        }
    }

    private static int IndexOf(IEnumerable<string> names, string name) => names.ToList().IndexOf(name);

    private static string Near(IEnumerable<string> names, string name) =>
        Spelling.Nearest(names, name) is { } near ? $"; did you mean \"{near}\"?" : "";
}

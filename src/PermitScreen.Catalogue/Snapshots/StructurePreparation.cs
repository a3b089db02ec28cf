using System.Collections.Immutable;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Records;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Turns a revision into what can be screened: lines, one rated effect per plane, and what is missing.</summary>
public static class StructurePreparation
{
    /// <summary>Rounding of coordinates, m.</summary>
    private const double DeckRoundingM = 1e-6;

    /// <summary>Prepares a revision; null with faults where a truss is a mechanism or cannot be solved accurately.</summary>
    /// <param name="record">Revision.</param>
    /// <param name="source">Gives the lines.</param>
    /// <param name="faults">Takes what is wrong.</param>
    public static PreparedStructure? Prepare(StructureRecord record, ILineSource source, FaultList faults)
    {
        var before = faults.Count;
        var units = ImmutableArray.CreateBuilder<RatedUnit>();
        var gaps = new List<Reason>(record.Gaps);
        var notRated = ImmutableArray.CreateBuilder<UnratedEffect>();
        var named = ImmutableArray.CreateBuilder<NamedLine>();
        var residual = 0.0;
        for (var u = 0; u < record.Units.Length; u++)
        {
            var unit = record.Units[u];
            if (unit.Truss is not { } truss)
            {
                gaps.AddRange(unit.Gaps);
                continue;
            }

            if (source.GetOrSolve(truss, faults.At("units", u).Under("truss")) is not { } lines)
            {
                continue;
            }

            residual = Math.Max(residual, lines.Quality.LargestResidual);
            var prepared = new UnitPreparation(unit, truss, lines).Of(notRated, named);
            if (unit.Planes.Length == 2)
            {
                units.Add(prepared);
            }
            else
            {
                gaps.AddRange(prepared.Gaps);
            }
        }

        if (record.Units.IsEmpty)
        {
            gaps.Add(new Reason(ReasonCode.DataMissing, "The structure has no superstructure unit.", "units"));
        }

        if (faults.Count > before)
        {
            return null;
        }

        var rated = record.Roadway is { } roadway ? new RatedStructure(roadway, units.ToImmutable(), [.. gaps]) : null;
        return new PreparedStructure(record with { Gaps = [.. gaps] }, rated, notRated.ToImmutable(), named.ToImmutable(), residual);
    }

    /// <summary>Whether every truss of a revision has lines; adds faults where one is a mechanism or cannot be solved accurately. Cheaper than to prepare it.</summary>
    /// <param name="record">Revision.</param>
    /// <param name="source">Gives the lines.</param>
    /// <param name="faults">Takes what is wrong.</param>
    public static bool HasLines(StructureRecord record, ILineSource source, FaultList faults)
    {
        var before = faults.Count;
        for (var u = 0; u < record.Units.Length; u++)
        {
            if (record.Units[u].Truss is { } truss)
            {
                source.GetOrSolve(truss, faults.At("units", u).Under("truss"));
            }
        }

        return faults.Count == before;
    }

    private sealed class UnitPreparation(UnitRecord unit, TrussModel truss, TrussLines lines)
    {
        private readonly List<Reason> _gaps = [.. unit.Gaps];
        private readonly ImmutableArray<UnratedBearing>.Builder _unratedBearings = ImmutableArray.CreateBuilder<UnratedBearing>();
        private readonly Dictionary<TrussQuantity, InfluenceLine> _shifted = [];
        private readonly HashSet<(TrussQuantity Quantity, string PlaneId)> _covered = [];

        public RatedUnit Of(ImmutableArray<UnratedEffect>.Builder notRated, ImmutableArray<NamedLine>.Builder named)
        {
            var rated = ImmutableArray.CreateBuilder<RatedEffect>();
            foreach (var effect in unit.Effects)
            {
                _gaps.AddRange(effect.Gaps);
                if (effect.Quantity is not { } quantity)
                {
                    continue;
                }

                var line = Line(quantity);
                named.Add(new NamedLine(unit.UnitId, effect.EffectId, effect.Description, line));
                foreach (var plane in effect.PlaneIds)
                {
                    _covered.Add((quantity, plane));
                    if (effect.NotRatedReason is { } reason)
                    {
                        notRated.Add(new UnratedEffect(unit.UnitId, effect.EffectId, plane, effect.Description, reason));
                        if (quantity.Kind == EffectKind.VerticalReaction)
                        {
                            _unratedBearings.Add(new UnratedBearing(plane, line, effect.Description, effect.Path));
                        }
                    }
                    else if (effect.Gaps.IsEmpty)
                    {
                        rated.Add(Rated(effect, quantity, plane, line));
                    }
                }

                if (effect.NotRatedReason is not null && quantity.Kind == EffectKind.VerticalReaction && line.HasNegative)
                {
                    _gaps.Add(new Reason(ReasonCode.DataMissing, $"The {effect.Description} can turn to uplift and must be rated in uplift; it is marked as not rated.", effect.Path));
                }
            }

            RequireEverything();
            RequireRatedEffects();
            RequireDeckOverBearings();
            var planes = unit.Planes.Length == 2 ? unit.Planes : [new Plane("", 0), new Plane("", 1)];
            return new RatedUnit(
                unit.UnitId,
                planes[0],
                planes[1],
                unit.StartChainageM + truss.DeckStartM,
                unit.StartChainageM + truss.DeckEndM,
                [.. HeldX().Select(x => unit.StartChainageM + x)],
                rated.ToImmutable(),
                _unratedBearings.ToImmutable(),
                [.. _gaps]);
        }

        private RatedEffect Rated(EffectRecord effect, TrussQuantity quantity, string plane, InfluenceLine line) => new()
        {
            UnitId = unit.UnitId,
            EffectId = effect.EffectId,
            PlaneId = plane,
            Description = effect.Description,
            Kind = quantity.Kind,
            Line = line,
            InteriorReaction = quantity.Kind == EffectKind.VerticalReaction && IsInterior(quantity.Index),
            Resistances = effect.Resistances,
            DeadLoads = effect.DeadLoads,
            System = effect.System,
            Condition = effect.Condition,
            NoHoldDown = effect.NoHoldDown,
            Path = effect.Path,
        };

        private InfluenceLine Line(TrussQuantity quantity)
        {
            if (!_shifted.TryGetValue(quantity, out var line))
            {
                line = (quantity.Kind switch
                {
                    EffectKind.AxialForce => lines.Axial(quantity.Index),
                    EffectKind.VerticalReaction => lines.ReactionY(quantity.Index),
                    _ => lines.ReactionX(quantity.Index),
                } ?? throw new InvalidOperationException("A record names held reactions only.")).ShiftedBy(unit.StartChainageM);
                _shifted.Add(quantity, line);
            }

            return line;
        }

        /// <summary>Every member and every held reaction of every plane is rated, or said not to be with the reason (rule D6).</summary>
        private void RequireEverything()
        {
            foreach (var plane in unit.Planes)
            {
                for (var m = 0; m < truss.Members.Length; m++)
                {
                    Require(new TrussQuantity(EffectKind.AxialForce, m), plane.PlaneId, $"member {truss.Members[m].Name}");
                }

                for (var s = 0; s < truss.Supports.Length; s++)
                {
                    if (truss.Supports[s].HoldsY)
                    {
                        Require(new TrussQuantity(EffectKind.VerticalReaction, s), plane.PlaneId, $"vertical reaction of {truss.Supports[s].Name}");
                    }

                    if (truss.Supports[s].HoldsX)
                    {
                        Require(new TrussQuantity(EffectKind.HorizontalReaction, s), plane.PlaneId, $"horizontal reaction of {truss.Supports[s].Name}");
                    }
                }
            }
        }

        /// <summary>Short of a bearing there is nothing to drive on: a panel point is missing, and with it the load of the end panel.</summary>
        private void RequireDeckOverBearings()
        {
            var held = HeldX();
            if (held.Count > 0 && (truss.DeckStartM > held[0] + DeckRoundingM || truss.DeckEndM < held[^1] - DeckRoundingM))
            {
                _gaps.Add(new Reason(
                    ReasonCode.DataMissing,
                    FormattableString.Invariant($"The deck reaches from {truss.DeckStartM:0.###} m to {truss.DeckEndM:0.###} m, the bearings from {held[0]:0.###} m to {held[^1]:0.###} m; give the panel points or seats up to the outer bearings."),
                    $"{unit.Path}.truss.deck"));
            }
        }

        /// <summary>A plane of which no effect is rated has not been checked, whatever the reasons stated one by one.</summary>
        private void RequireRatedEffects()
        {
            foreach (var plane in unit.Planes)
            {
                if (!unit.Effects.Any(e => e.NotRatedReason is null && e.PlaneIds.Contains(plane.PlaneId)))
                {
                    _gaps.Add(new Reason(ReasonCode.DataMissing, $"No effect of plane {plane.PlaneId} is rated.", $"{unit.Path}.effects"));
                }
            }
        }

        private void Require(TrussQuantity quantity, string planeId, string what)
        {
            if (!_covered.Contains((quantity, planeId)))
            {
                _gaps.Add(new Reason(ReasonCode.DataMissing, $"Plane {planeId} has no effect for {what}; list it as rated, or as not rated with the reason.", $"{unit.Path}.effects"));
            }
        }

        private bool IsInterior(int support)
        {
            var x = HeldX();
            var own = NodeX(truss.Supports[support].Node);
            return own > x[0] && own < x[^1];
        }

        private List<double> HeldX() => [.. truss.Supports.Where(s => s.HoldsY).Select(s => NodeX(s.Node)).Distinct().Order()];

        private double NodeX(string name) => truss.Nodes.First(n => n.Name == name).XM;
    }
}

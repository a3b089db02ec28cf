using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads the geometry of a truss unit and its planes.</summary>
internal static class TrussMapper
{
    private const double KnPerMn = 1000.0;

    /// <summary>Distance from the deck's line, as a part of the panel, up to which a joint counts as on it (cambered and sloping decks).</summary>
    private const double NearDeck = 0.1;

    /// <summary>The truss, or null: with faults where it is malformed, with a gap where it is given by its outline alone.</summary>
    public static TrussModel? Model(C.TrussUnit truss, string path, FaultList faults, List<Reason> gaps)
    {
        if (truss.Outline is not null)
        {
            NotModelled(gaps, "A truss given by its general arrangement is not modelled yet; give nodes, members and supports.", $"{path}.truss.outline");
            if (truss.Nodes.Count == 0 && truss.Members.Count == 0)
            {
                return null;
            }
        }

        if (truss.HasSkewDeg && truss.SkewDeg != 0)
        {
            NotModelled(gaps, "Skewed trusses are not modelled yet.", $"{path}.truss.skew_deg");
        }

        if (truss.Floor is not null)
        {
            NotModelled(gaps, "Floor systems as members are not modelled yet.", $"{path}.truss.floor");
        }

        var before = faults.Count;
        if (!faults.Within("nodes", truss.Nodes.Count, Limits.Nodes) || !faults.Within("members", truss.Members.Count, Limits.Members)
            || !faults.Within("supports", truss.Supports.Count, Limits.Supports) || !faults.Within("planes", truss.Planes.Count, Limits.Planes))
        {
            return null;
        }

        var nodes = truss.Nodes.Select((n, i) => Node(n, faults.At("nodes", i))).ToList();
        var members = truss.Members.Select((m, i) => Member(m, i, path, faults.At("members", i), gaps)).ToList();
        var supports = truss.Supports.Select(s => new TrussSupport(s.Name, s.Node, s.HoldsHorizontal, s.HoldsVertical)).ToList();
        if (truss.Deck is null)
        {
            faults.Add("deck", "Missing; give the panel points that carry floor beams, and how the deck ends.");
            return null;
        }

        var start = End(truss.Deck.Start, faults.Under("deck").Under("start"));
        var end = End(truss.Deck.End, faults.Under("deck").Under("end"));
        if (faults.Count > before || TrussModel.TryCreate(nodes, members, supports, truss.Deck.PanelPoints, start, end, faults) is not { } model)
        {
            return null;
        }

        RequirePanelPoints(truss.Deck, model, path, gaps);
        return model;
    }

    /// <summary>Planes from left to right.</summary>
    public static ImmutableArray<Plane> Planes(C.TrussUnit truss, string path, FaultList faults, List<Reason> gaps)
    {
        var planes = new List<Plane>();
        for (var i = 0; i < truss.Planes.Count; i++)
        {
            var plane = truss.Planes[i];
            var at = faults.At("planes", i);
            Names.Id(at, "plane_id", plane.PlaneId, "north");
            if (planes.Any(p => p.PlaneId == plane.PlaneId))
            {
                at.Add("plane_id", $"\"{plane.PlaneId}\" names two planes; give each an id of its own.");
            }

            var lateral = at.Within("lateral_m", plane.HasLateralM, plane.LateralM, Limits.LateralM);
            if (!plane.HasLateralM)
            {
                gaps.Add(new Reason(ReasonCode.DataMissing, $"The lateral position of plane {plane.PlaneId} is not in the catalogue.", FormattableString.Invariant($"{path}.truss.planes[{i}].lateral_m")));
            }

            if (lateral is { } found && planes.Exists(p => p.LateralM == found))
            {
                at.Add("lateral_m", $"Found {Fields.Text(found)}; another plane stands at the same lateral position.");
            }

            if (at.Optional("chainage_shift_m", plane.HasChainageShiftM, plane.ChainageShiftM, Allowed.Any, "m") is { } shift && shift != 0)
            {
                NotModelled(gaps, "Planes shifted along the structure (skew) are not modelled yet.", FormattableString.Invariant($"{path}.truss.planes[{i}].chainage_shift_m"));
            }

            planes.Add(new Plane(plane.PlaneId, lateral ?? double.NaN));
        }

        if (planes.Count != 2)
        {
            gaps.Add(planes.Count < 2
                ? new Reason(ReasonCode.DataMissing, "A truss unit needs its two planes.", $"{path}.truss.planes")
                : new Reason(ReasonCode.NotModelled, "More than two planes are not modelled yet.", $"{path}.truss.planes"));
        }

        // Without its place a plane has no share; the gap above keeps the unit from being passed, and an empty list from being rated.
        return planes.Exists(p => double.IsNaN(p.LateralM)) ? [] : [.. planes.OrderBy(p => p.LateralM)];
    }

    /// <summary>
    /// A panel point left out of the deck would halve its panel's line without a trace: a joint near the deck's line between its ends is one, or is said not to be.
    /// </summary>
    private static void RequirePanelPoints(C.TrussDeck deck, TrussModel model, string path, List<Reason> gaps)
    {
        var joints = model.Nodes.ToDictionary(n => n.Name, StringComparer.Ordinal);
        for (var i = 1; i < deck.PanelPoints.Count; i++)
        {
            var (a, b) = (joints[deck.PanelPoints[i - 1]], joints[deck.PanelPoints[i]]);
            foreach (var node in model.Nodes.Where(n => n.XM > a.XM && n.XM < b.XM && !deck.JointsWithoutFloorBeam.Contains(n.Name)))
            {
                var lineM = a.YM + (b.YM - a.YM) * (node.XM - a.XM) / (b.XM - a.XM);
                if (Math.Abs(node.YM - lineM) <= NearDeck * (b.XM - a.XM))
                {
                    gaps.Add(new Reason(
                        ReasonCode.DataMissing,
                        $"Joint {node.Name} lies on the deck's line between {a.Name} and {b.Name} and is no panel point; add it to panel_points, or to joints_without_floor_beam.",
                        $"{path}.truss.deck.panel_points"));
                }
            }
        }
    }

    private static TrussNode Node(C.TrussNode node, FaultList faults) => new(
        node.Name,
        faults.Required("x_m", node.HasXM, node.XM, Limits.ChainageM),
        faults.Required("y_m", node.HasYM, node.YM, Limits.LateralM));

    private static TrussMember Member(C.TrussMember member, int index, string path, FaultList faults, List<Reason> gaps)
    {
        if (member.HasTensionOnly && member.TensionOnly)
        {
            NotModelled(gaps, $"Tension-only members ({member.Name}) are not modelled yet.", FormattableString.Invariant($"{path}.truss.members[{index}].tension_only"));
        }

        if (member.Eyebars is not null)
        {
            NotModelled(gaps, $"Eyebars ({member.Name}) are not modelled yet.", FormattableString.Invariant($"{path}.truss.members[{index}].eyebars"));
        }

        var area = faults.Required("area_m2", member.HasAreaM2, member.AreaM2, Allowed.Positive, "m2");
        var modulus = faults.Required("elastic_modulus_mpa", member.HasElasticModulusMpa, member.ElasticModulusMpa, Allowed.Positive, "MPa");
        return new TrussMember(member.Name, member.StartNode, member.EndNode, area * modulus * KnPerMn);
    }

    private static DeckEnd End(C.DeckEnd? end, FaultList faults)
    {
        switch (end?.Kind ?? C.DeckEndKind.Unspecified)
        {
            case C.DeckEndKind.EndFloorBeam:
                if (end!.HasTipM)
                {
                    faults.Add("tip_m", "An end floor beam has no tip; leave it out.");
                }

                return new DeckEnd(DeckEndKind.EndFloorBeam, 0);
            case C.DeckEndKind.SeatedOnAbutment:
                return new DeckEnd(DeckEndKind.SeatedOnAbutment, faults.Required("tip_m", end!.HasTipM, end.TipM, Limits.ChainageM));
            case C.DeckEndKind.OverhangingStringers:
                return new DeckEnd(DeckEndKind.OverhangingStringers, faults.Required("tip_m", end!.HasTipM, end.TipM, Limits.ChainageM));
            default:
                faults.Add("kind", "Missing; say end floor beam, seated on the abutment, or overhanging stringers.");
                return default;
        }
    }

    private static void NotModelled(List<Reason> gaps, string message, string field) =>
        gaps.Add(new Reason(ReasonCode.NotModelled, message, field));
}

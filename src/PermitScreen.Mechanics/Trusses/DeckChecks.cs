using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>Checks the path of the deck over a truss.</summary>
internal static class DeckChecks
{
    internal static void Run(JointChecks joints, IReadOnlyList<string> panelPoints, DeckEnd start, DeckEnd end, FaultList faults)
    {
        var deck = faults.Under("deck");
        if (panelPoints.Count < 2)
        {
            deck.Add("panel_points", string.Create(CultureInfo.InvariantCulture, $"found {panelPoints.Count}; a deck needs two panel points or more"));
        }

        var chainagesM = new double?[panelPoints.Count];
        for (var i = 0; i < panelPoints.Count; i++)
        {
            var field = string.Create(CultureInfo.InvariantCulture, $"panel_points[{i}]");
            var node = joints.Find(panelPoints[i], field, deck);
            chainagesM[i] = node >= 0 && JointChecks.IsUsable(joints.Nodes[node]) ? joints.Nodes[node].XM : null;
            if (i > 0 && chainagesM[i] - chainagesM[i - 1] <= JointChecks.SamePlace * joints.SizeM)
            {
                deck.Add(field, $"joint '{panelPoints[i]}' does not stand beyond joint '{panelPoints[i - 1]}'; panel points must go by increasing chainage");
            }
        }

        CheckEnd(start, chainagesM.Length > 0 ? chainagesM[0] : null, -1, joints.SizeM, deck.Under("start"));
        CheckEnd(end, chainagesM.Length > 0 ? chainagesM[^1] : null, 1, joints.SizeM, deck.Under("end"));
    }

    private static void CheckEnd(DeckEnd end, double? panelPointM, int outwards, double sizeM, FaultList faults)
    {
        if (!Enum.IsDefined(end.Kind))
        {
            faults.Add("kind", "is not one of the ways in which a deck can end");
            return;
        }

        if (end.Kind == DeckEndKind.EndFloorBeam)
        {
            return;
        }

        if (!(Math.Abs(end.TipM) <= JointChecks.LargestCoordinateM))
        {
            faults.Add("tip_m", string.Create(CultureInfo.InvariantCulture, $"found {end.TipM}; must be finite and within ±{JointChecks.LargestCoordinateM:0} m"));
        }
        else if ((end.TipM - panelPointM) * outwards <= JointChecks.SamePlace * sizeM)
        {
            faults.Add("tip_m", string.Create(CultureInfo.InvariantCulture, $"found {end.TipM}; must lie beyond the end panel point at {panelPointM} m"));
        }
    }
}

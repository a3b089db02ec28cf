using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>Checks the joints of a truss and keeps what the other checks need to know of them.</summary>
internal sealed class JointChecks
{
    /// <summary>Largest coordinate, m: no bridge is longer, and every product of coordinates stays far from overflow.</summary>
    internal const double LargestCoordinateM = 1e6;

    /// <summary>Share of the truss' size within which two joints stand at one place.</summary>
    internal const double SamePlace = 1e-9;

    private readonly Dictionary<string, int> _index = new(StringComparer.Ordinal);

    private JointChecks(IReadOnlyList<TrussNode> nodes) => Nodes = nodes;

    internal IReadOnlyList<TrussNode> Nodes { get; }

    /// <summary>Larger of the truss' extents along x and y, m, over its usable joints.</summary>
    internal double SizeM { get; private set; }

    internal static JointChecks Run(IReadOnlyList<TrussNode> nodes, FaultList faults)
    {
        var joints = new JointChecks(nodes);
        if (nodes.Count == 0)
        {
            faults.Add("nodes", "a truss needs joints; found none");
        }

        for (var i = 0; i < nodes.Count; i++)
        {
            joints.CheckName(i, faults.At("nodes", i));
            CheckCoordinate("x_m", nodes[i].XM, faults.At("nodes", i));
            CheckCoordinate("y_m", nodes[i].YM, faults.At("nodes", i));
        }

        joints.SizeM = joints.Size();
        joints.CheckPlaces(faults);
        return joints;
    }

    internal static bool IsUsable(TrussNode node) => IsUsable(node.XM) && IsUsable(node.YM);

    /// <summary>Index of a named joint; −1 and a fault where the name is empty or unknown.</summary>
    internal int Find(string? name, string field, FaultList faults)
    {
        if (string.IsNullOrWhiteSpace(name))
        {
            faults.Add(field, "is empty; the name of a joint is needed");
            return -1;
        }

        if (_index.TryGetValue(name, out var index))
        {
            return index;
        }

        faults.Add(field, $"no joint is named '{name}'");
        return -1;
    }

    internal bool AtOnePlace(int a, int b) =>
        Math.Abs(Nodes[a].XM - Nodes[b].XM) <= SamePlace * SizeM && Math.Abs(Nodes[a].YM - Nodes[b].YM) <= SamePlace * SizeM;

    private static bool IsUsable(double coordinateM) => Math.Abs(coordinateM) <= LargestCoordinateM;

    private static void CheckCoordinate(string field, double coordinateM, FaultList faults)
    {
        if (!IsUsable(coordinateM))
        {
            faults.Add(field, string.Create(CultureInfo.InvariantCulture, $"found {coordinateM}; must be finite and within ±{LargestCoordinateM:0} m"));
        }
    }

    private void CheckName(int i, FaultList faults)
    {
        var name = Nodes[i].Name;
        if (string.IsNullOrWhiteSpace(name))
        {
            faults.Add("name", "is empty; every joint needs a name");
        }
        else if (!_index.TryAdd(name, i))
        {
            faults.Add("name", string.Create(CultureInfo.InvariantCulture, $"'{name}' is also the name of nodes[{_index[name]}]; names must be unique"));
        }
    }

    private double Size()
    {
        var usable = Nodes.Where(IsUsable).ToArray();
        return usable.Length == 0
            ? 0
            : Math.Max(usable.Max(node => node.XM) - usable.Min(node => node.XM), usable.Max(node => node.YM) - usable.Min(node => node.YM));
    }

    private void CheckPlaces(FaultList faults)
    {
        // Sorted by x, only joints within the tolerance along x need a look.
        var order = Enumerable.Range(0, Nodes.Count).Where(i => IsUsable(Nodes[i])).OrderBy(i => Nodes[i].XM).ThenBy(i => i).ToArray();
        for (var a = 0; a < order.Length; a++)
        {
            for (var b = a + 1; b < order.Length && Nodes[order[b]].XM - Nodes[order[a]].XM <= SamePlace * SizeM; b++)
            {
                if (AtOnePlace(order[a], order[b]))
                {
                    var (first, second) = (Math.Min(order[a], order[b]), Math.Max(order[a], order[b]));
                    faults.At("nodes", second).Add("x_m", $"joint '{Nodes[second].Name}' stands where joint '{Nodes[first].Name}' stands");
                }
            }
        }
    }
}

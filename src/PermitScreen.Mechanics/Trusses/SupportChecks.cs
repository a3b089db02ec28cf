using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>Checks the supports of a truss.</summary>
internal static class SupportChecks
{
    internal static void Run(JointChecks joints, IReadOnlyList<TrussSupport> supports, FaultList faults)
    {
        if (supports.Count == 0)
        {
            faults.Add("supports", "a truss needs supports; found none");
        }

        var names = new Dictionary<string, int>(StringComparer.Ordinal);
        var heldX = new Dictionary<int, int>();
        var heldY = new Dictionary<int, int>();
        for (var i = 0; i < supports.Count; i++)
        {
            var support = supports[i];
            var here = faults.At("supports", i);
            if (string.IsNullOrWhiteSpace(support.Name))
            {
                here.Add("name", "is empty; every support needs a name");
            }
            else if (!names.TryAdd(support.Name, i))
            {
                here.Add("name", string.Create(CultureInfo.InvariantCulture, $"'{support.Name}' is also the name of supports[{names[support.Name]}]; names must be unique"));
            }

            if (!support.HoldsX && !support.HoldsY)
            {
                here.Add("holds_vertical", $"support '{support.Name}' holds nothing; it must hold its joint horizontally, vertically or both");
            }

            var node = joints.Find(support.Node, "node", here);
            if (node >= 0)
            {
                CheckHeldOnce(support.HoldsX, "horizontally", node, i, heldX, supports, here);
                CheckHeldOnce(support.HoldsY, "vertically", node, i, heldY, supports, here);
            }
        }
    }

    private static void CheckHeldOnce(
        bool holds, string how, int node, int i, Dictionary<int, int> held, IReadOnlyList<TrussSupport> supports, FaultList faults)
    {
        if (holds && !held.TryAdd(node, i))
        {
            // Two unyielding supports would share the reaction in a way that statics cannot tell.
            faults.Add("node", $"joint '{supports[i].Node}' is held {how} by support '{supports[held[node]].Name}' already");
        }
    }
}

using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>Checks the members of a truss and that they connect all of its joints.</summary>
internal static class MemberChecks
{
    internal static void Run(JointChecks joints, IReadOnlyList<TrussMember> members, FaultList faults)
    {
        if (members.Count == 0)
        {
            faults.Add("members", "a truss needs members; found none");
            return;
        }

        var names = new Dictionary<string, int>(StringComparer.Ordinal);
        var pairs = new Dictionary<(int, int), int>();
        var parts = new Parts(joints.Nodes.Count);
        var whole = true;
        for (var i = 0; i < members.Count; i++)
        {
            var here = faults.At("members", i);
            CheckName(members[i].Name, i, names, here);
            CheckStiffness(members[i].AxialStiffnessKn, here);
            var start = joints.Find(members[i].StartNode, "start_node", here);
            var end = joints.Find(members[i].EndNode, "end_node", here);
            if (start < 0 || end < 0)
            {
                whole = false;
                continue;
            }

            parts.Connect(start, end);
            CheckEnds(joints, members, i, start, end, pairs, here);
        }

        // With an unknown joint somewhere, "not connected" would be that same fault told twice.
        if (whole)
        {
            CheckConnected(joints, parts, faults);
        }
    }

    private static void CheckName(string? name, int i, Dictionary<string, int> names, FaultList faults)
    {
        if (string.IsNullOrWhiteSpace(name))
        {
            faults.Add("name", "is empty; every member needs a name");
        }
        else if (!names.TryAdd(name, i))
        {
            faults.Add("name", string.Create(CultureInfo.InvariantCulture, $"'{name}' is also the name of members[{names[name]}]; names must be unique"));
        }
    }

    private static void CheckStiffness(double axialStiffnessKn, FaultList faults)
    {
        if (!(axialStiffnessKn > 0 && double.IsFinite(axialStiffnessKn)))
        {
            faults.Add("area_m2", string.Create(CultureInfo.InvariantCulture, $"gives an axial stiffness E·A of {axialStiffnessKn} kN; must be finite and above 0"));
        }
    }

    private static void CheckEnds(
        JointChecks joints, IReadOnlyList<TrussMember> members, int i, int start, int end, Dictionary<(int, int), int> pairs, FaultList faults)
    {
        if (start == end)
        {
            faults.Add("end_node", $"member '{members[i].Name}' starts and ends at joint '{members[i].EndNode}'");
            return;
        }

        if (JointChecks.IsUsable(joints.Nodes[start]) && JointChecks.IsUsable(joints.Nodes[end]) && joints.AtOnePlace(start, end))
        {
            faults.Add("end_node", $"member '{members[i].Name}' has no length: its joints stand at one place");
        }

        if (!pairs.TryAdd((Math.Min(start, end), Math.Max(start, end)), i))
        {
            var first = pairs[(Math.Min(start, end), Math.Max(start, end))];
            faults.Add("end_node", $"member '{members[i].Name}' joins the joints that member '{members[first].Name}' joins; give them as one member");
        }
    }

    private static void CheckConnected(JointChecks joints, Parts parts, FaultList faults)
    {
        for (var i = 0; i < joints.Nodes.Count; i++)
        {
            if (parts.IsAlone(i))
            {
                faults.At("nodes", i).Add("name", $"joint '{joints.Nodes[i].Name}' has no member");
            }
        }

        var groups = parts.Groups();
        if (groups.Count > 1)
        {
            var named = groups.Select(group => "{" + string.Join(", ", group.Select(i => joints.Nodes[i].Name)) + "}");
            faults.Add("members", string.Create(
                CultureInfo.InvariantCulture, $"the truss falls into {groups.Count} parts that no member connects: {string.Join(" and ", named)}"));
        }
    }

    /// <summary>Joints that members connect, by union and find.</summary>
    private sealed class Parts(int count)
    {
        private readonly int[] _parent = [.. Enumerable.Range(0, count)];
        private readonly bool[] _touched = new bool[count];

        internal void Connect(int a, int b)
        {
            (_touched[a], _touched[b]) = (true, true);
            var (rootA, rootB) = (Root(a), Root(b));
            _parent[Math.Max(rootA, rootB)] = Math.Min(rootA, rootB);
        }

        internal bool IsAlone(int i) => !_touched[i];

        internal IReadOnlyList<IGrouping<int, int>> Groups() => [.. Enumerable.Range(0, count).Where(i => _touched[i]).GroupBy(Root)];

        private int Root(int i)
        {
            while (_parent[i] != i)
            {
                _parent[i] = _parent[_parent[i]];
                i = _parent[i];
            }

            return i;
        }
    }
}

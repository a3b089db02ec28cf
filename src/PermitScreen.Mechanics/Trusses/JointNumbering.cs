namespace PermitScreen.Mechanics.Trusses;

/// <summary>Numbers the joints of a truss so that the stiffness matrix has a narrow skyline.</summary>
/// <remarks>Reverse Cuthill–McKee (Cuthill and McKee 1969; George 1971). Ties fall to the joint given first: the same order every time.</remarks>
internal static class JointNumbering
{
    /// <summary>The joints in the order in which they are to be numbered; length = number of joints.</summary>
    internal static int[] ReverseCuthillMcKee(int joints, ReadOnlySpan<int> starts, ReadOnlySpan<int> ends)
    {
        var neighbours = Neighbours(joints, starts, ends);
        var order = new List<int>(joints);
        var placed = new bool[joints];
        while (order.Count < joints)
        {
            var root = FarFrom(LeastConnected(neighbours, placed), neighbours, placed);
            var head = order.Count;
            order.Add(root);
            placed[root] = true;
            for (; head < order.Count; head++)
            {
                foreach (var next in neighbours[order[head]].Where(j => !placed[j]).OrderBy(j => neighbours[j].Count).ThenBy(j => j).ToArray())
                {
                    order.Add(next);
                    placed[next] = true;
                }
            }
        }

        order.Reverse();
        return [.. order];
    }

    private static List<int>[] Neighbours(int joints, ReadOnlySpan<int> starts, ReadOnlySpan<int> ends)
    {
        var neighbours = new List<int>[joints];
        for (var j = 0; j < joints; j++)
        {
            neighbours[j] = [];
        }

        for (var m = 0; m < starts.Length; m++)
        {
            neighbours[starts[m]].Add(ends[m]);
            neighbours[ends[m]].Add(starts[m]);
        }

        return neighbours;
    }

    private static int LeastConnected(List<int>[] neighbours, bool[] placed) =>
        Enumerable.Range(0, placed.Length).Where(j => !placed[j]).MinBy(j => neighbours[j].Count);

    /// <summary>A joint at the far end of the part, by the levels of a breadth-first walk: a start from there gives short columns.</summary>
    private static int FarFrom(int start, List<int>[] neighbours, bool[] placed)
    {
        var (root, depth) = (start, -1);
        while (true)
        {
            var (last, levels) = Walk(root, neighbours, placed);
            if (levels <= depth)
            {
                return root;
            }

            (root, depth) = (last, levels);
        }
    }

    private static (int Last, int Levels) Walk(int start, List<int>[] neighbours, bool[] placed)
    {
        var seen = (bool[])placed.Clone();
        seen[start] = true;
        List<int> level = [start];
        for (var levels = 0; ; levels++)
        {
            List<int> next = [];
            foreach (var j in level.SelectMany(j => neighbours[j]).Where(j => !seen[j]))
            {
                if (!seen[j])
                {
                    seen[j] = true;
                    next.Add(j);
                }
            }

            if (next.Count == 0)
            {
                return (level.MinBy(j => neighbours[j].Count), levels);
            }

            level = next;
        }
    }
}

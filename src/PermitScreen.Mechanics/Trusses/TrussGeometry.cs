namespace PermitScreen.Mechanics.Trusses;

/// <summary>Directions and stiffnesses of a truss' members, and which directions of its joints are free.</summary>
internal sealed class TrussGeometry
{
    internal TrussGeometry(TrussModel model)
    {
        Model = model;
        var count = model.Members.Length;
        (CosX, CosY, Stiffness) = (new double[count], new double[count], new double[count]);
        var largest = 0.0;
        for (var m = 0; m < count; m++)
        {
            var (a, b) = (model.Nodes[model.StartNodes[m]], model.Nodes[model.EndNodes[m]]);
            var (dx, dy) = (b.XM - a.XM, b.YM - a.YM);
            var lengthM = Math.Sqrt((dx * dx) + (dy * dy));
            (CosX[m], CosY[m]) = (dx / lengthM, dy / lengthM);
            Stiffness[m] = model.Members[m].AxialStiffnessKn / lengthM;
            largest = Math.Max(largest, Stiffness[m]);
        }

        // Forces do not depend on a common factor of all stiffnesses; without it nothing overflows.
        for (var m = 0; m < count; m++)
        {
            Stiffness[m] /= largest;
        }

        Held = new bool[2 * model.Nodes.Length];
        for (var s = 0; s < model.Supports.Length; s++)
        {
            Held[2 * model.SupportNodes[s]] |= model.Supports[s].HoldsX;
            Held[(2 * model.SupportNodes[s]) + 1] |= model.Supports[s].HoldsY;
        }
    }

    internal TrussModel Model { get; }

    /// <summary>x part of each member's unit vector from its start to its end.</summary>
    internal double[] CosX { get; }

    /// <summary>y part of each member's unit vector from its start to its end.</summary>
    internal double[] CosY { get; }

    /// <summary>E·A/L of each member over the largest of all.</summary>
    internal double[] Stiffness { get; }

    /// <summary>Whether direction 2·joint (x) or 2·joint + 1 (y) is held.</summary>
    internal bool[] Held { get; }

    /// <summary>Adds to each joint the forces that its members put on it.</summary>
    /// <param name="tensions">Axial force of each member, tension positive.</param>
    /// <param name="forces">Force on each joint direction; length 2 × joints.</param>
    internal void AddMemberForces(ReadOnlySpan<double> tensions, Span<double> forces)
    {
        for (var m = 0; m < tensions.Length; m++)
        {
            var (start, end) = (Model.StartNodes[m], Model.EndNodes[m]);
            var (x, y) = (tensions[m] * CosX[m], tensions[m] * CosY[m]);
            forces[2 * start] += x;
            forces[(2 * start) + 1] += y;
            forces[2 * end] -= x;
            forces[(2 * end) + 1] -= y;
        }
    }

    /// <summary>Lengthening of a member times its stiffness.</summary>
    internal double TensionOf(int m, ReadOnlySpan<double> displacements)
    {
        var (start, end) = (Model.StartNodes[m], Model.EndNodes[m]);
        return Stiffness[m] * ((CosX[m] * (displacements[2 * end] - displacements[2 * start]))
            + (CosY[m] * (displacements[(2 * end) + 1] - displacements[(2 * start) + 1])));
    }
}

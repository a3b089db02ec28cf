using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Balance of every joint under a unit load at each deck panel point, from the lines handed out and the geometry given; the tests' own.</summary>
internal static class JointBalance
{
    /// <summary>Largest unbalanced force on a joint, kN per kN; NaN where an ordinate is not a number.</summary>
    internal static double Worst(TrussModel model, TrussLines lines)
    {
        var joints = model.Nodes.ToDictionary(node => node.Name, StringComparer.Ordinal);
        var worst = 0.0;
        foreach (var loaded in model.DeckPanelPoints)
        {
            var loadM = joints[loaded].XM;
            var x = model.Nodes.ToDictionary(node => node.Name, _ => 0.0, StringComparer.Ordinal);
            var y = model.Nodes.ToDictionary(node => node.Name, node => node.Name == loaded ? -1.0 : 0, StringComparer.Ordinal);
            for (var m = 0; m < model.Members.Length; m++)
            {
                var (start, end) = (joints[model.Members[m].StartNode], joints[model.Members[m].EndNode]);
                var angle = Math.Atan2(end.YM - start.YM, end.XM - start.XM);
                var (pullX, pullY) = (On(lines.Axial(m)) * Math.Cos(angle), On(lines.Axial(m)) * Math.Sin(angle));
                x[start.Name] += pullX;
                y[start.Name] += pullY;
                x[end.Name] -= pullX;
                y[end.Name] -= pullY;
            }

            for (var s = 0; s < model.Supports.Length; s++)
            {
                x[model.Supports[s].Node] += On(lines.ReactionX(s));
                y[model.Supports[s].Node] += On(lines.ReactionY(s));
            }

            foreach (var force in x.Values.Concat(y.Values))
            {
                worst = Math.Max(worst, Math.Abs(force));
            }

            double On(InfluenceLine? line) => line?.At(loadM, loadM <= line.StartM ? Side.After : Side.Before) ?? 0;
        }

        return worst;
    }
}

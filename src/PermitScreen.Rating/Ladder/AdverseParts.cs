using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Rating.Ladder;

/// <summary>The part of a line that loads a sense.</summary>
public static class AdverseParts
{
    /// <summary>Area under the adverse part, kN per kN/m, ≥ 0.</summary>
    /// <param name="line">Line.</param>
    /// <param name="sense">Which sign loads.</param>
    public static double Area(InfluenceLine line, Sense sense) => sense == Sense.Max ? line.PositiveArea : -line.NegativeArea;

    /// <summary>Length over which the line has the adverse sign, m; zero crossings are breakpoints, so each stretch has one sign.</summary>
    /// <param name="line">Line.</param>
    /// <param name="sense">Which sign loads.</param>
    public static double LengthM(InfluenceLine line, Sense sense)
    {
        var sign = sense == Sense.Max ? 1.0 : -1.0;
        var length = 0.0;
        for (var i = 1; i < line.Count; i++)
        {
            if (sign * (line.RightOrdinates[i - 1] + line.LeftOrdinates[i]) > 0)
            {
                length += line.XM[i] - line.XM[i - 1];
            }
        }

        return length;
    }
}

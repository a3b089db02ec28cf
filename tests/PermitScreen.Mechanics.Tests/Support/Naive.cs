using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>The response at one position by a walk over all stretches; the tests' own, slow and simple.</summary>
internal static class Naive
{
    internal static double Response(InfluenceLine line, AxleTrain train, TrainPosition p)
    {
        var sum = 0.0;
        for (var i = 0; i < train.Count; i++)
        {
            var xM = p.Direction == TravelDirection.Forward ? p.LeadM - train.OffsetsM[i] : p.LeadM + train.OffsetsM[i];
            sum += train.LoadsKn[i] * Ordinate(line, xM, p.Side);
        }

        return sum;
    }

    private static double Ordinate(InfluenceLine line, double xM, Side side)
    {
        for (var k = 0; k < line.Count; k++)
        {
            if (Math.Abs(xM - line.XM[k]) <= 1e-9)
            {
                return side == Side.Before ? line.LeftOrdinates[k] : line.RightOrdinates[k];
            }
        }

        for (var k = 0; k + 1 < line.Count; k++)
        {
            if (xM > line.XM[k] && xM < line.XM[k + 1])
            {
                var share = (xM - line.XM[k]) / (line.XM[k + 1] - line.XM[k]);
                return ((1 - share) * line.RightOrdinates[k]) + (share * line.LeftOrdinates[k + 1]);
            }
        }

        return 0;
    }
}

using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>The effect of a vehicle at one position.</summary>
public static class Response
{
    /// <summary>Sum of weight × ordinate over the axles, in their order, each weight taken at its worse under the rule.</summary>
    /// <param name="line">Influence line, effect per kN.</param>
    /// <param name="train">Axles, kN and m.</param>
    /// <param name="p">Where the vehicle stands; its side holds for every axle.</param>
    /// <param name="sense">Which way the rule's worse weight is taken; without effect under <see cref="WeighingRule.None"/>.</param>
    /// <param name="rule">Weighing tolerance and relieving axles.</param>
    /// <returns>Effect, kN or kN·m. Scalar sum in a fixed order: the same bits on every machine.</returns>
    public static double At(InfluenceLine line, AxleTrain train, TrainPosition p, Sense sense, WeighingRule rule)
    {
        var loadsKn = train.LoadsKn;
        var offsetsM = train.OffsetsM;
        var plain = rule is { Tolerance: 0, RelievingAxlesCount: true };
        var sum = 0.0;
        for (var i = 0; i < loadsKn.Length; i++)
        {
            var xM = p.Direction == TravelDirection.Forward ? p.LeadM - offsetsM[i] : p.LeadM + offsetsM[i];
            var ordinate = line.At(xM, p.Side);
            sum += plain ? loadsKn[i] * ordinate : Weighed(loadsKn[i], ordinate, sense, rule);
        }

        return sum;
    }

    private static double Weighed(double loadKn, double ordinate, Sense sense, WeighingRule rule)
    {
        var light = loadKn * (1 - rule.Tolerance) * ordinate;
        var heavy = loadKn * (1 + rule.Tolerance) * ordinate;
        var worse = sense == Sense.Max ? Math.Max(light, heavy) : Math.Min(light, heavy);
        if (rule.RelievingAxlesCount)
        {
            return worse;
        }

        return sense == Sense.Max ? Math.Max(worse, 0) : Math.Min(worse, 0);
    }
}

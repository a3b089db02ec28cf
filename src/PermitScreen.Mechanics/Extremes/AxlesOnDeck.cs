using System.Collections.Immutable;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Which axles stand on a deck.</summary>
public static class AxlesOnDeck
{
    /// <summary>Numbers of the axles that stand on the closed deck, at its ends by the side of the position.</summary>
    /// <param name="train">Axles.</param>
    /// <param name="p">Where the vehicle stands.</param>
    /// <param name="deckStartM">Lower end of the deck, m.</param>
    /// <param name="deckEndM">Upper end of the deck, m; ≥ <paramref name="deckStartM"/>.</param>
    /// <returns>Numbers counted from 1 at the lead axle, increasing. An axle within <see cref="InfluenceLine.SnapM"/> of an end stands at it:
    /// on the deck just above its start and just below its end.</returns>
    public static ImmutableArray<int> Of(AxleTrain train, TrainPosition p, double deckStartM, double deckEndM)
    {
        var numbers = ImmutableArray.CreateBuilder<int>();
        for (var i = 0; i < train.Count; i++)
        {
            var xM = p.Direction == TravelDirection.Forward ? p.LeadM - train.OffsetsM[i] : p.LeadM + train.OffsetsM[i];
            var pastStart = p.Side == Side.After ? xM >= deckStartM - InfluenceLine.SnapM : xM > deckStartM + InfluenceLine.SnapM;
            var beforeEnd = p.Side == Side.Before ? xM <= deckEndM + InfluenceLine.SnapM : xM < deckEndM - InfluenceLine.SnapM;
            if (pastStart && beforeEnd)
            {
                numbers.Add(i + 1);
            }
        }

        return numbers.ToImmutable();
    }
}

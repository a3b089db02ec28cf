using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Which of several equally bad positions is reported: one rule for every path, so that all report the same one.</summary>
internal static class TieRule
{
    /// <summary>Values within this share of Σ|w|·max|η| of the best are ties: what differs only by rounding must not choose the position.</summary>
    internal const double RelativeTolerance = 1e-12;

    /// <summary>Width, kN or kN·m, within which two values are a tie.</summary>
    internal static double WidthOf(InfluenceLine line, AxleTrain train) => RelativeTolerance * (train.SumAbsLoadsKn * line.MaxAbs);

    /// <summary>Forward before reverse, then the smaller lead chainage, then below before above.</summary>
    internal static bool Precedes(TrainPosition a, TrainPosition b)
    {
        if (a.Direction != b.Direction)
        {
            return a.Direction == TravelDirection.Forward;
        }

        return a.LeadM != b.LeadM ? a.LeadM < b.LeadM : a.Side == Side.Before && b.Side == Side.After;
    }
}

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

    /// <summary>Length of the governing lobe, m: the shortest adverse lobe that an axle stands on, and of all where none does (rule B4).</summary>
    /// <param name="line">Line.</param>
    /// <param name="sense">Which sign loads.</param>
    /// <param name="train">Vehicle.</param>
    /// <param name="position">Where it stands; null where nothing of it acts.</param>
    public static double LobeLengthM(InfluenceLine line, Sense sense, AxleTrain train, TrainPosition? position)
    {
        var lobes = Lobes(line, sense);
        if (lobes.Count == 0)
        {
            return 0;
        }

        var underAxles = position is not { } place
            ? []
            : lobes.Where(l => Enumerable.Range(0, train.Count).Any(i => Within(l, AxleM(train, place, i)))).ToList();
        return (underAxles.Count > 0 ? underAxles : lobes).Min(l => l.EndM - l.StartM);
    }

    /// <summary>Whether the adverse part lies in two spans beside each other, as that of a hogging moment or an interior reaction does.</summary>
    /// <param name="line">Line.</param>
    /// <param name="sense">Which sign loads.</param>
    /// <param name="bearingsM">Chainages of the vertically held joints, ascending, m.</param>
    public static bool InAdjacentSpans(InfluenceLine line, Sense sense, IReadOnlyList<double> bearingsM)
    {
        var lobes = Lobes(line, sense);
        var loaded = Enumerable.Range(1, Math.Max(0, bearingsM.Count - 1))
            .Select(s => lobes.Any(l => Math.Min(l.EndM, bearingsM[s]) - Math.Max(l.StartM, bearingsM[s - 1]) > 0))
            .ToList();
        return loaded.Zip(loaded.Skip(1), (a, b) => a && b).Any(both => both);
    }

    private static double AxleM(AxleTrain train, TrainPosition place, int axle) =>
        place.Direction == TravelDirection.Forward ? place.LeadM - train.OffsetsM[axle] : place.LeadM + train.OffsetsM[axle];

    private static bool Within((double StartM, double EndM) lobe, double x) => x >= lobe.StartM && x <= lobe.EndM;

    /// <summary>The stretches of adverse sign; zero crossings are breakpoints, so each piece of the line has one sign.</summary>
    private static List<(double StartM, double EndM)> Lobes(InfluenceLine line, Sense sense)
    {
        var sign = sense == Sense.Max ? 1.0 : -1.0;
        var lobes = new List<(double StartM, double EndM)>();
        for (var i = 1; i < line.Count; i++)
        {
            if (sign * (line.RightOrdinates[i - 1] + line.LeftOrdinates[i]) <= 0)
            {
                continue;
            }

            if (lobes.Count > 0 && lobes[^1].EndM == line.XM[i - 1])
            {
                lobes[^1] = (lobes[^1].StartM, line.XM[i]);
            }
            else
            {
                lobes.Add((line.XM[i - 1], line.XM[i]));
            }
        }

        return lobes;
    }
}

using PermitScreen.Mechanics.Extremes;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Vehicles of 1 to 20 axles from a seeded generator; half of them with round spacings, so that axles meet panel points together.</summary>
internal static class RandomTrain
{
    private static readonly double[] RoundSpacingsM = [0, 1.2, 1.5, 1.5, 1.5, 3, 4.5, 6, 12];

    internal static AxleTrain Of(Random random)
    {
        var axles = random.Next(1, 21);
        var round = random.Next(2) == 0;
        var equal = random.Next(2) == 0;
        return Vehicles.Of(
            Enumerable.Range(0, axles).Select(_ => equal ? 120.0 : 20 + (200 * random.NextDouble())).ToArray(),
            Enumerable.Range(0, axles - 1).Select(_ => round ? RoundSpacingsM[random.Next(RoundSpacingsM.Length)] : 0.9 + (5 * random.NextDouble())).ToArray());
    }

    /// <summary>Weights of any sign, as the shares of one plane may be.</summary>
    internal static AxleTrain WithMixedSigns(Random random, AxleTrain train) =>
        train.WithLoads([.. train.LoadsKn.ToArray().Select(load => random.Next(4) == 0 ? -0.3 * load : load)]);
}

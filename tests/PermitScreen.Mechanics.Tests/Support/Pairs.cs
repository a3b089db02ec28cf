using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Random pairs of a truss and a vehicle, the same for the same number every time.</summary>
internal static class Pairs
{
    internal const int EffectsPerPair = 8;

    /// <summary>PERMITSCREEN_PAIRS, or 300.</summary>
    internal static int Count =>
        int.TryParse(Environment.GetEnvironmentVariable("PERMITSCREEN_PAIRS"), System.Globalization.CultureInfo.InvariantCulture, out var pairs) ? pairs : 300;

    internal static (AxleTrain Train, IReadOnlyList<InfluenceLine> Effects) Of(int number)
    {
        var random = new Random(1_000_003 * (number + 1));
        var (model, lines) = RandomTruss.Solved(random);
        var all = AllEffects(model, lines);
        var effects = Enumerable.Range(0, EffectsPerPair - 1).Select(_ => all[random.Next(all.Count)]).ToList();

        // A combination of two effects, as a gusset or a pin has one.
        effects.Add(InfluenceLine.Combine([1, -0.7], [all[random.Next(all.Count)], all[random.Next(all.Count)]]));
        return (RandomTrain.Of(random), effects);
    }

    internal static IReadOnlyList<InfluenceLine> AllEffects(TrussModel model, TrussLines lines) =>
    [
        .. Enumerable.Range(0, model.Members.Length).Select(lines.Axial),
        .. Enumerable.Range(0, model.Supports.Length).Select(lines.ReactionY).OfType<InfluenceLine>(),
        .. Enumerable.Range(0, model.Supports.Length).Select(lines.ReactionX).OfType<InfluenceLine>(),
    ];
}

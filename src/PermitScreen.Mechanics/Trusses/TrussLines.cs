using System.Globalization;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>The influence lines of all axial forces and reactions of a truss, for a unit load moving along its deck.</summary>
/// <remarks>Tension positive; reactions positive upwards and towards higher chainage. Stiffness method; see the project's README for method and bounds.</remarks>
public sealed class TrussLines
{
    /// <summary>Largest unbalanced force on a joint, per unit load, with which lines are handed out: half of the 1e-9 promised, so that another
    /// order of summation stays within the promise.</summary>
    private const double EquilibriumLimit = 5e-10;

    /// <summary>Largest relative uncertainty of a force with which lines are handed out.</summary>
    private const double AccuracyLimit = 1e-9;

    /// <summary>Ordinates below this share of the largest are rounding, and 0.</summary>
    private const double NothingShare = 1e-11;

    /// <summary>The largest ordinate taken for <see cref="NothingShare"/>: with larger ones (nearly a mechanism) zeroing would disturb equilibrium.</summary>
    private const double LargestForNothing = 10;

    private readonly InfluenceLine[] _axial;
    private readonly InfluenceLine?[] _reactionX;
    private readonly InfluenceLine?[] _reactionY;

    private TrussLines(InfluenceLine[] axial, InfluenceLine?[] reactionX, InfluenceLine?[] reactionY, SolveQuality quality) =>
        (_axial, _reactionX, _reactionY, Quality) = (axial, reactionX, reactionY, quality);

    /// <summary>How well the equations were solved, worst over all panel points.</summary>
    public SolveQuality Quality { get; }

    /// <summary>Line of a member's axial force, kN per kN, tension positive.</summary>
    /// <param name="memberIndex">Index into <see cref="TrussModel.Members"/>.</param>
    public InfluenceLine Axial(int memberIndex) => _axial[memberIndex];

    /// <summary>Line of a horizontal reaction, kN per kN, positive where it pushes the truss towards higher chainage.</summary>
    /// <param name="supportIndex">Index into <see cref="TrussModel.Supports"/>.</param>
    /// <returns>The line; <see langword="null"/> where the support does not hold horizontally.</returns>
    public InfluenceLine? ReactionX(int supportIndex) => _reactionX[supportIndex];

    /// <summary>Line of a vertical reaction, kN per kN, positive where it pushes the truss upwards.</summary>
    /// <param name="supportIndex">Index into <see cref="TrussModel.Supports"/>.</param>
    /// <returns>The line; <see langword="null"/> where the support does not hold vertically.</returns>
    public InfluenceLine? ReactionY(int supportIndex) => _reactionY[supportIndex];

    /// <summary>Number of members.</summary>
    public int MemberCount => _axial.Length;

    /// <summary>Number of supports.</summary>
    public int SupportCount => _reactionX.Length;

    /// <summary>Lines that were made by <see cref="TrySolve"/> before and kept; the caller vouches that they are those of its truss.</summary>
    /// <param name="axial">Line of each member.</param>
    /// <param name="reactionX">Line of each support's horizontal reaction; null where it does not hold so.</param>
    /// <param name="reactionY">Line of each support's vertical reaction; null where it does not hold so. Length as <paramref name="reactionX"/>.</param>
    /// <param name="quality">How well the equations were solved.</param>
    /// <exception cref="ArgumentException">The lengths of the reactions differ.</exception>
    public static TrussLines Restore(
        IReadOnlyList<InfluenceLine> axial, IReadOnlyList<InfluenceLine?> reactionX, IReadOnlyList<InfluenceLine?> reactionY, SolveQuality quality)
    {
        if (reactionX.Count != reactionY.Count)
        {
            throw new ArgumentException(
                string.Create(CultureInfo.InvariantCulture, $"each support has both components; found {reactionX.Count} and {reactionY.Count}"), nameof(reactionY));
        }

        return new TrussLines([.. axial], [.. reactionX], [.. reactionY], quality);
    }

    /// <summary>The same lines for a truss whose members and supports stand in another order.</summary>
    /// <param name="memberOrder">For each member of that truss, its index here.</param>
    /// <param name="supportOrder">For each support of that truss, its index here.</param>
    public TrussLines Reordered(ReadOnlySpan<int> memberOrder, ReadOnlySpan<int> supportOrder)
    {
        var axial = new InfluenceLine[memberOrder.Length];
        for (var m = 0; m < axial.Length; m++)
        {
            axial[m] = _axial[memberOrder[m]];
        }

        var (reactionX, reactionY) = (new InfluenceLine?[supportOrder.Length], new InfluenceLine?[supportOrder.Length]);
        for (var s = 0; s < supportOrder.Length; s++)
        {
            (reactionX[s], reactionY[s]) = (_reactionX[supportOrder[s]], _reactionY[supportOrder[s]]);
        }

        return new TrussLines(axial, reactionX, reactionY, Quality);
    }

    /// <summary>Solves a truss for 1 kN downwards at each deck panel point and makes the lines of all its effects.</summary>
    /// <param name="model">The truss.</param>
    /// <param name="faults">Gets one fault where the truss is a mechanism (naming the joints that move) or cannot be solved to the accuracy promised.</param>
    /// <returns>The lines; <see langword="null"/> if a fault was added. The same bytes on every machine.</returns>
    public static TrussLines? TrySolve(TrussModel model, FaultList faults)
    {
        var truss = new TrussGeometry(model);
        var system = StiffnessSystem.TryFactor(truss);
        if (system is null)
        {
            faults.Add("", MechanismFinder.Describe(truss));
            return null;
        }

        var solution = UnitLoads.Solve(truss, system, NothingShare, LargestForNothing);
        var quality = solution.Quality;
        var redundant = model.Members.Length > truss.Held.Count(held => !held);
        if (!(quality.LargestEquilibriumError <= EquilibriumLimit
            && quality.LargestResidual <= AccuracyLimit
            && quality.LargestCorrection <= AccuracyLimit
            && (!redundant || solution.ElasticRounding <= AccuracyLimit)))
        {
            var how = quality.LargestEquilibriumError <= EquilibriumLimit
                ? string.Create(CultureInfo.InvariantCulture, $"forces are uncertain by {Math.Max(quality.LargestCorrection, solution.ElasticRounding):E1} of the largest")
                : string.Create(CultureInfo.InvariantCulture, $"joint '{model.Nodes[solution.WorstJoint].Name}' lacks {quality.LargestEquilibriumError:E1} of the unit load");
            faults.Add("", $"{MechanismFinder.Describe(truss)} ({how})");
            return null;
        }

        return new TrussLines(
            [.. solution.Axial.Select(Line)],
            [.. solution.ReactionX.Select(LineIfHeld)],
            [.. solution.ReactionY.Select(LineIfHeld)],
            quality);

        InfluenceLine Line(double[] ordinates) => DeckLine.Of(model, ordinates, solution.Nothing);
        InfluenceLine? LineIfHeld(double[]? ordinates) => ordinates is null ? null : Line(ordinates);
    }
}

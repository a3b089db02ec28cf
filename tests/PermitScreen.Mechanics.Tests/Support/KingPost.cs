using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>
/// A simple span as the smallest truss: one panel point at a chosen section, a post above it. Its lower chord carries M/h, M the span's moment at the
/// section, and the loads' stringers are straight from end to section: so h times the chord's line is the simple span's moment line, exactly.
/// </summary>
internal sealed class KingPost
{
    private const double HeightM = 4;

    private readonly TrussModel _model;
    private readonly TrussLines _lines;

    internal KingPost(double spanM, double sectionM) => (_model, _lines) = new TrussSketch()
        .Joint("L0", 0, 0).Joint("L1", sectionM, 0).Joint("L2", spanM, 0).Joint("U1", sectionM, HeightM)
        .Bar("L0", "L1").Bar("L1", "L2").Bar("L0", "U1").Bar("U1", "L2").Bar("U1", "L1")
        .Pin("L0").Roller("L2").Deck("L0", "L1", "L2").Solve();

    /// <summary>Moment at the section, kN·m per kN.</summary>
    internal InfluenceLine Moment => InfluenceLine.Combine([HeightM], [Axial("L0L1")]);

    /// <summary>Reaction at the start; the end floor beam stands on the bearing, so it jumps to 1 there, as the end shear does.</summary>
    internal InfluenceLine EndReaction => _lines.ReactionY(0)!;

    /// <summary>Tension of the post: the reaction of a pier between two simple spans.</summary>
    internal InfluenceLine PierReaction => Axial("U1L1");

    private InfluenceLine Axial(string member) => _lines.Axial(_model.Members.ToList().FindIndex(m => m.Name == member));
}

namespace PermitScreen.Rating.Structures;

/// <summary>Kind of member and structure for the system factor.</summary>
public enum SystemKind
{
    /// <summary>Welded members in two-girder, truss or arch bridges.</summary>
    WeldedTwoPlane = 1,

    /// <summary>Riveted members in two-girder, truss or arch bridges.</summary>
    RivetedTwoPlane,

    /// <summary>Multiple eyebar members in truss bridges.</summary>
    MultipleEyebars,

    /// <summary>Three-girder bridges.</summary>
    ThreeGirder,

    /// <summary>Four-girder bridges, closely spaced.</summary>
    FourGirderClose,

    /// <summary>All other girder and slab bridges.</summary>
    OtherGirderOrSlab,

    /// <summary>Floor beams spaced widely.</summary>
    FloorBeamsWide,

    /// <summary>Redundant stringer subsystems.</summary>
    RedundantStringers,
}

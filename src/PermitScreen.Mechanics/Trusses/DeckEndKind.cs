namespace PermitScreen.Mechanics.Trusses;

/// <summary>How a deck ends.</summary>
public enum DeckEndKind
{
    /// <summary>A floor beam stands at the end panel point; nothing beyond it loads the truss.</summary>
    EndFloorBeam,

    /// <summary>End stringers span from the end panel point to a seat on the abutment: the line goes straight to zero at the seat.</summary>
    SeatedOnAbutment,

    /// <summary>The end stringers go on as a cantilever: the end panel's line goes on straight to the tip, then drops to zero.</summary>
    OverhangingStringers,
}

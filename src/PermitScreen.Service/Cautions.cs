namespace PermitScreen.Service;

/// <summary>What stands wherever a verdict is shown.</summary>
public static class Cautions
{
    /// <summary>The caution.</summary>
    public const string Caution =
        "Screening aid only: this rests on the catalogue's data and the chosen policy, is no load rating and no permit, " +
        "and is to be reviewed by a licensed engineer under the codes of the place.";

    /// <summary>What a member check of trusses leaves out unless the catalogue rates it.</summary>
    public const string NotChecked =
        "Floor beams, stringers, deck, connections, gussets, bearings and substructure are not checked unless they are listed as rated.";

    /// <summary>Notice under a policy that nobody confirmed.</summary>
    public const string UnconfirmedPolicy = "Factors not confirmed by the authority.";

    /// <summary>Notice under the demo's policy.</summary>
    public const string DemonstrationPolicy = "Demonstration policy: factors not confirmed by any authority; for demo data only.";

    /// <summary>Notice under a draft.</summary>
    public const string DraftPolicy = "The policy is a draft.";
}

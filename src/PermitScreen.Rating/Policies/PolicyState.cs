namespace PermitScreen.Rating.Policies;

/// <summary>State of a policy (rule B9).</summary>
public enum PolicyState
{
    /// <summary>Draft: for trying out.</summary>
    Draft = 1,

    /// <summary>In force between its dates.</summary>
    InForce,

    /// <summary>Withdrawn.</summary>
    Withdrawn,
}

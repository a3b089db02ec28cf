namespace PermitScreen.Catalogue.Storage;

/// <summary>What kind of resource a revision is of.</summary>
public enum ResourceKind
{
    /// <summary>A structure, structures/{structure}.</summary>
    Structure = 1,

    /// <summary>A policy document, policies/{policy}@{version}.</summary>
    Policy,
}

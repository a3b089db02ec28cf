namespace PermitScreen.Catalogue.Storage;

/// <summary>Stages of a verification whose counts are part of its result.</summary>
public static class VerificationStages
{
    /// <summary>Entries of the audit log.</summary>
    public const string Audit = "audit entries";

    /// <summary>Revisions.</summary>
    public const string Revisions = "revisions";
}

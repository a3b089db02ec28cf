namespace PermitScreen.Catalogue.Storage;

/// <summary>How far a verification is, or what it found.</summary>
/// <param name="Stage">What is being read.</param>
/// <param name="Done">Records read in this stage.</param>
/// <param name="Total">Records in this stage; null where not known.</param>
/// <param name="Problem">What was found wrong; null where this tells of progress only.</param>
public sealed record VerificationStep(string Stage, long Done, long? Total, string? Problem);

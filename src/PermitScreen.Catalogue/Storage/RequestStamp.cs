namespace PermitScreen.Catalogue.Storage;

/// <summary>Makes a retry harmless.</summary>
/// <param name="RequestId">Id that the caller chose.</param>
/// <param name="Fingerprint">Digest of the whole request, so that another request under the same id is noticed.</param>
public sealed record RequestStamp(string RequestId, Digest Fingerprint);

using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Printing;

/// <summary>Words about policy documents.</summary>
internal static class PolicyWords
{
    /// <summary>Days in force: "from 2026-01-01 to 2026-12-31", "from 2026-01-01", or a dash.</summary>
    public static string InForce(Policy policy) => (policy.InForceFrom, policy.InForceTo) switch
    {
        (null, null) => "-",
        ({ } from, null) => $"from {Numbers.Date(from)}",
        (null, { } to) => $"to {Numbers.Date(to)}",
        ({ } from, { } to) => $"from {Numbers.Date(from)} to {Numbers.Date(to)}",
    };

    /// <summary>What a document is now, in one line.</summary>
    public static string State(Policy policy)
    {
        var confirmed = policy.Confirmation is { } confirmation
            ? $"confirmed by {confirmation.Person}{(confirmation.ConfirmedOn is { } day ? $" on {Numbers.Date(day)}" : "")}"
            : "not confirmed";
        var days = policy.InForceFrom is null && policy.InForceTo is null ? "" : $" {InForce(policy)}";
        return FormattableString.Invariant($"{ResourceNames.Of(policy)}: {Numbers.Words(policy.State)}{days}, {confirmed}; catalogue version {policy.CatalogueVersion}, etag {policy.Etag}");
    }
}

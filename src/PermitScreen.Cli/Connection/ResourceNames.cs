using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Connection;

/// <summary>Resource names as people write them: the part before the slash may be left out.</summary>
internal static class ResourceNames
{
    private const string Structures = "structures/";
    private const string PolicyPrefix = "policies/";

    /// <summary>A structure: structures/P14-0032 or P14-0032.</summary>
    public static string Structure(string text) => text.Contains('/', StringComparison.Ordinal) ? text : Structures + text;

    /// <summary>A structure or a policy document: P14-0032, or lrfr-permit-2013@1.</summary>
    public static string Any(string text) =>
        text.Contains('/', StringComparison.Ordinal) ? text : (text.Contains('@', StringComparison.Ordinal) ? PolicyPrefix : Structures) + text;

    /// <summary>One document of a policy: policies/lrfr-permit-2013@1 or lrfr-permit-2013@1.</summary>
    /// <exception cref="BadInputException">The document's version is not named.</exception>
    public static string Document(string text) => text.Contains('@', StringComparison.Ordinal)
        ? Any(text)
        : throw new BadInputException($"Name the document with its version, for instance {text}@1; `list` shows them.");

    /// <summary>Name of a document: policies/{policy}@{version}.</summary>
    public static string Of(Policy policy) =>
        policy.Name.Contains('@', StringComparison.Ordinal) ? policy.Name : FormattableString.Invariant($"{policy.Name}@{policy.DocumentVersion}");

    /// <summary>Name of the policy that a document belongs to.</summary>
    public static string PolicyOf(Policy policy) => policy.Name.Split('@')[0];
}

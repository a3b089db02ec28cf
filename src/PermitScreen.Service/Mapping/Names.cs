using System.Text.RegularExpressions;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Mapping;

/// <summary>Resource names and ids.</summary>
internal static partial class Names
{
    /// <summary>Checks a structure's resource name.</summary>
    public static string Structure(FaultList faults, string field, string name) =>
        Check(faults, field, name, StructureName(), "structures/ and an id of letters, digits, hyphens and dots, for instance structures/B-104");

    /// <summary>Checks a policy's resource name.</summary>
    public static string Policy(FaultList faults, string field, string name) =>
        Check(faults, field, name, PolicyName(), "policies/ and an id of lower-case letters, digits and hyphens, for instance policies/permit-2026");

    /// <summary>Checks the resource name of a policy, or of one of its documents.</summary>
    public static string PolicyReference(FaultList faults, string field, string name) =>
        Check(faults, field, name, PolicyReference(), "policies/ and an id of lower-case letters, digits and hyphens, with or without @ and the version of a document, for instance policies/permit-2026 or policies/permit-2026@2");

    /// <summary>Checks the resource name of a policy document.</summary>
    public static string PolicyDocument(FaultList faults, string field, string name) =>
        Check(faults, field, name, PolicyDocument(), "the name of a policy with @ and the version of its document, for instance policies/permit-2026@2");

    /// <summary>Checks the resource name of an import.</summary>
    public static string Import(FaultList faults, string field, string name) =>
        Check(faults, field, name, ImportName(), "imports/ and an id of letters, digits and hyphens");

    /// <summary>Checks an id of ours (unit, plane, configuration, rung, effect).</summary>
    public static string Id(FaultList faults, string field, string id, string example) =>
        Check(faults, field, id, AnyId(), $"an id of letters, digits, hyphens, underscores and dots, for instance {example}");

    private static string Check(FaultList faults, string field, string value, Regex allowed, string words)
    {
        if (!allowed.IsMatch(value))
        {
            faults.Add(field, value.Length == 0 ? $"Missing; give {words}." : $"Found \"{value}\"; allowed is {words}.");
        }

        return value;
    }

    [GeneratedRegex(@"\Astructures/[A-Za-z0-9][A-Za-z0-9.\-]{0,62}\z", RegexOptions.None, 1000)]
    private static partial Regex StructureName();

    [GeneratedRegex(@"\Apolicies/[a-z0-9][a-z0-9\-]{0,62}\z", RegexOptions.None, 1000)]
    private static partial Regex PolicyName();

    [GeneratedRegex(@"\Apolicies/[a-z0-9][a-z0-9\-]{0,62}(@[1-9][0-9]{0,5})?\z", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex PolicyReference();

    [GeneratedRegex(@"\Apolicies/[a-z0-9][a-z0-9\-]{0,62}@[1-9][0-9]{0,5}\z", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex PolicyDocument();

    [GeneratedRegex(@"\Aimports/[A-Za-z0-9][A-Za-z0-9\-]{0,62}\z", RegexOptions.None, 1000)]
    private static partial Regex ImportName();

    [GeneratedRegex(@"\A[A-Za-z0-9][A-Za-z0-9._\-]{0,62}\z", RegexOptions.None, 1000)]
    private static partial Regex AnyId();
}

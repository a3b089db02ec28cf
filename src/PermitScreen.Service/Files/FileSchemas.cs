using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Files;

/// <summary>The three kinds of file.</summary>
public static class FileSchemas
{
    /// <summary>Schema of catalogue files.</summary>
    public const string Catalogue = "permitscreen/catalogue/1";

    /// <summary>Schema of policy files.</summary>
    public const string Policy = "permitscreen/policy/1";

    /// <summary>Schema of application files.</summary>
    public const string Application = "permitscreen/application/1";

    /// <summary>Words for each kind of file.</summary>
    public static IReadOnlyDictionary<string, string> Kinds { get; } = new Dictionary<string, string>(StringComparer.Ordinal)
    {
        [Catalogue] = "a catalogue file",
        [Policy] = "a policy file",
        [Application] = "an application file",
    };

    /// <summary>Reads a catalogue file.</summary>
    /// <param name="json">Text.</param>
    /// <param name="faults">Takes every fault.</param>
    public static CatalogueFile? ReadCatalogue(string json, FaultList faults) => ContractFile.Parse<CatalogueFile>(json, Catalogue, f => f.Schema, faults);

    /// <summary>Reads a policy file.</summary>
    /// <param name="json">Text.</param>
    /// <param name="faults">Takes every fault.</param>
    public static PolicyFile? ReadPolicy(string json, FaultList faults) => ContractFile.Parse<PolicyFile>(json, Policy, f => f.Schema, faults);

    /// <summary>Reads an application file.</summary>
    /// <param name="json">Text.</param>
    /// <param name="faults">Takes every fault.</param>
    public static ApplicationFile? ReadApplication(string json, FaultList faults) => ContractFile.Parse<ApplicationFile>(json, Application, f => f.Schema, faults);
}

using Google.Protobuf;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Service.Tests.Support;

/// <summary>Reads the contract's messages from the repository's files, by the same reader as the product.</summary>
public static class ContractFiles
{
    public static readonly DateOnly HandWorkedDay = new(2026, 9, 1);

    public static readonly DateOnly DemoDay = new(2026, 12, 1);

    public static Application Application(params string[] path) =>
        Read(path, FileSchemas.ReadApplication).Application;

    public static Policy Policy(params string[] path) =>
        Read(path, FileSchemas.ReadPolicy).Policy;

    public static IReadOnlyList<Structure> Structures(params string[] path) =>
        [.. FolderFiles.Of(Repository.Path(path)).SelectMany(f => Read([f], FileSchemas.ReadCatalogue).Structures)];

    /// <summary>A hand-worked case: application, structures, policy.</summary>
    public static (Application Application, IReadOnlyList<Structure> Structures, Policy Policy) HandWorked(string name)
    {
        var variant = Repository.Path("tests", "hand-worked", name, "policy.json");
        return (
            Application("tests", "hand-worked", name, "application.json"),
            Structures("tests", "hand-worked", name, "catalogue.json"),
            File.Exists(variant) ? Policy(variant) : Policy("deploy", "policies", "lrfr-permit-2013.json"));
    }

    /// <summary>A demo application, the whole demo catalogue, the demo policy.</summary>
    public static (Application Application, IReadOnlyList<Structure> Structures, Policy Policy) Demo(string file) => (
        Application("deploy", "demo", "applications", file),
        Structures("deploy", "demo", "catalogue"),
        Policy("deploy", "demo", "policies", "ossel-demo.json"));

    private static T Read<T>(string[] path, Func<string, FaultList, T?> reader)
        where T : class, IMessage<T>
    {
        var faults = new FaultList();
        var message = reader(File.ReadAllText(Repository.Path(path)), faults);
        return message ?? throw new InvalidOperationException($"{string.Join('/', path)}: {string.Join(' ', faults.All)}");
    }
}

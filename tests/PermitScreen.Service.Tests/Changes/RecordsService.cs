using Grpc.Core;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Changes;

/// <summary>A service on records of its own, with the demo's structures and policy published as its first version.</summary>
public sealed class RecordsService : IAsyncLifetime
{
    public const string Bridge = "structures/P14-0087";
    private RunningService? _service;

    public string Folder { get; } = Directory.CreateTempSubdirectory("permitscreen-tests-").FullName;

    public RunningService Running => _service ?? throw new InvalidOperationException("Not started.");

    public CatalogueService.CatalogueServiceClient Catalogue => Running.Catalogue;

    public static Metadata Actor => RunningService.Actor;

    public async Task InitializeAsync()
    {
        _service = await RunningService.StartAsync(Folder);
        await Running.ImportAsync(ContractFiles.Structures("deploy", "demo", "catalogue"), [ContractFiles.Policy("deploy", "demo", "policies", "ossel-demo.json")]);
    }

    public async Task DisposeAsync()
    {
        await Running.DisposeAsync();
        Directory.Delete(Folder, recursive: true);
    }

    /// <summary>Stops the service and starts it on the same records.</summary>
    public async Task RestartAsync()
    {
        await Running.DisposeAsync();
        _service = await RunningService.StartAsync(Folder);
    }

    public async Task<Structure> GetAsync(string name = Bridge, long? asOf = null)
    {
        var request = new GetStructureRequest { Name = name };
        if (asOf is { } version)
        {
            request.AsOfVersion = version;
        }

        return (await Catalogue.GetStructureAsync(request)).Structure;
    }

    public async Task<long> VersionAsync() => (await Catalogue.ListStructuresAsync(new ListStructuresRequest { PageSize = 1 })).CatalogueVersion;

    public async Task<Structure> UpdateAsync(Structure structure, string? requestId = null) =>
        (await Catalogue.UpdateStructureAsync(new UpdateStructureRequest { Structure = structure, ChangeReason = "test", RequestId = requestId ?? "" }, Actor)).Structure;
}

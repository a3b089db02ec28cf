using Grpc.Core;
using Grpc.Net.Client;
using Microsoft.AspNetCore.Builder;
using Microsoft.Extensions.DependencyInjection;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Host;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service.Tests.Support;

/// <summary>The real service on a port of its own, over real HTTP/2, with files as its catalogue.</summary>
public sealed class RunningService : IAsyncDisposable
{
    private readonly WebApplication _app;

    private RunningService(WebApplication app)
    {
        _app = app;
        Channel = GrpcChannel.ForAddress(ServiceHost.AddressOf(app), new GrpcChannelOptions { MaxReceiveMessageSize = null });
    }

    public GrpcChannel Channel { get; }

    public ScreeningService.ScreeningServiceClient Screening => new(Channel);

    public CatalogueService.CatalogueServiceClient Catalogue => new(Channel);

    public PolicyService.PolicyServiceClient Policies => new(Channel);

    public ImportService.ImportServiceClient Imports => new(Channel);

    public HistoryService.HistoryServiceClient History => new(Channel);

    public MaintenanceService.MaintenanceServiceClient Maintenance => new(Channel);

    /// <summary>Metadata of calls that write.</summary>
    public static Metadata Actor => new() { { "x-permitscreen-actor", "test" } };

    /// <summary>The service on files, its records in a temporary folder.</summary>
    public static Task<RunningService> StartAsync(IReadOnlyList<string> catalogue, IReadOnlyList<string> policies) =>
        StartAsync(new HostSettings { Source = new CatalogueSource(catalogue, policies), Quiet = true });

    /// <summary>The service on the records of a folder.</summary>
    public static Task<RunningService> StartAsync(string folder) => StartAsync(new HostSettings { DataFolder = folder, Quiet = true });

    /// <summary>Publishes structures and policies as one import; returns the version.</summary>
    public async Task<long> ImportAsync(IEnumerable<Structure> structures, IEnumerable<Policy> policies)
    {
        var import = (await Imports.CreateImportAsync(new CreateImportRequest { ChangeReason = "test" }, Actor)).Import;
        var piece = new StageImportPieceRequest { Name = import.Name, PieceIndex = 0 };
        piece.Structures.AddRange(structures);
        piece.Policies.AddRange(policies);
        var staged = await Imports.StageImportPieceAsync(piece, Actor);
        Assert.Empty(staged.Refusals);
        return (await Imports.PublishImportAsync(new PublishImportRequest { Name = import.Name, PieceCount = 1 }, Actor)).Import.PublishedVersion;
    }

    private static async Task<RunningService> StartAsync(HostSettings settings)
    {
        var app = ServiceHost.Build(settings);
        await app.StartAsync();
        // A test that waits for ever says nothing: a refused catalogue is told at once.
        await app.Services.GetRequiredService<ICatalogue>().CurrentAsync(null, new CancellationTokenSource(TimeSpan.FromSeconds(60)).Token);
        return new RunningService(app);
    }

    public async ValueTask DisposeAsync()
    {
        Channel.Dispose();
        await _app.DisposeAsync();
    }
}

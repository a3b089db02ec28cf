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

    public static async Task<RunningService> StartAsync(IReadOnlyList<string> catalogue, IReadOnlyList<string> policies)
    {
        var app = ServiceHost.Build(new HostSettings { Source = new CatalogueSource(catalogue, policies), Quiet = true });
        await app.StartAsync();
        // A test that waits for ever says nothing: a refused catalogue is told at once.
        await app.Services.GetRequiredService<ICatalogue>().CurrentAsync(new CancellationTokenSource(TimeSpan.FromSeconds(60)).Token);
        return new RunningService(app);
    }

    public async ValueTask DisposeAsync()
    {
        Channel.Dispose();
        await _app.DisposeAsync();
    }
}

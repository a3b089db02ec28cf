using System.Net.Sockets;
using Microsoft.AspNetCore.Builder;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Host;
using PermitScreen.Service.Workers;

namespace PermitScreen.Cli.Connection;

/// <summary>A service of this process, for one command.</summary>
internal sealed class OwnService : IAsyncDisposable
{
    private readonly WebApplication _app;

    private OwnService(WebApplication app) => _app = app;

    public Uri Address => ServiceHost.AddressOf(_app);

    /// <summary>Starts a service and waits until its catalogue is ready.</summary>
    /// <param name="settings">Settings.</param>
    /// <param name="cancellation">Ends the wait.</param>
    /// <exception cref="Catalogue.Storage.StoreException">The records cannot be opened.</exception>
    /// <exception cref="Service.Files.FileFaultsException">A file is at fault.</exception>
    public static async Task<OwnService> StartAsync(HostSettings settings, CancellationToken cancellation)
    {
        var app = ServiceHost.Build(settings);
        try
        {
            await app.StartAsync(cancellation);
            await app.Services.GetRequiredService<ICatalogue>().CurrentAsync(null, cancellation);
            return new OwnService(app);
        }
        catch (Exception error) when (error is CatalogueUnavailableException or OperationCanceledException && app.Services.GetRequiredService<StartFailure>().Reason is not null)
        {
            // The worker may stop the host while it is still starting; then the start is cancelled, and the reason is the worker's.
            var reason = app.Services.GetRequiredService<StartFailure>().Reason!;
            await app.DisposeAsync();
            throw reason;
        }
        catch (IOException error) when (error.InnerException is Microsoft.AspNetCore.Connections.AddressInUseException or SocketException)
        {
            await app.DisposeAsync();
            throw new BadInputException(FormattableString.Invariant($"Port {settings.Port} is in use; give another one with --port."));
        }
    }

    /// <summary>Waits until the service is stopped.</summary>
    public Task WaitAsync(CancellationToken cancellation) =>
        Task.WhenAny(_app.WaitForShutdownAsync(cancellation), Task.Delay(Timeout.Infinite, cancellation));

    public async ValueTask DisposeAsync()
    {
        await _app.StopAsync();
        await _app.DisposeAsync();
    }
}

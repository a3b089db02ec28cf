using System.CommandLine;
using System.Net.Sockets;
using Grpc.Core;
using Grpc.Net.Client;
using Microsoft.AspNetCore.Builder;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Host;
using PermitScreen.Service.Workers;

namespace PermitScreen.Cli.Connection;

/// <summary>A connection to a service that runs already, or to one that this command starts for itself.</summary>
internal sealed class ServiceConnection : IAsyncDisposable
{
    private const int LargestMessageBytes = 256 * 1024 * 1024;
    private readonly WebApplication? _own;
    private readonly GrpcChannel _channel;
    private readonly TimeSpan _timeout;

    private ServiceConnection(WebApplication? own, Uri address, TimeSpan timeout)
    {
        _own = own;
        _timeout = timeout;
        Address = address;
        _channel = GrpcChannel.ForAddress(address, new GrpcChannelOptions { MaxReceiveMessageSize = LargestMessageBytes });
    }

    public Uri Address { get; }

    public ScreeningService.ScreeningServiceClient Screening => new(_channel);

    public CatalogueService.CatalogueServiceClient Catalogue => new(_channel);

    public PolicyService.PolicyServiceClient Policies => new(_channel);

    /// <summary>Opens what the options ask for.</summary>
    /// <param name="options">Options.</param>
    /// <param name="parsed">What the user wrote.</param>
    /// <param name="needsCatalogue">Whether the command asks for structures; checking files does not.</param>
    /// <param name="cancellation">Ends the wait.</param>
    public static async Task<ServiceConnection> OpenAsync(ServiceOptions options, ParseResult parsed, bool needsCatalogue, CancellationToken cancellation)
    {
        var timeout = parsed.GetValue(options.Timeout);
        if (timeout is not (> 0 and < 86400))
        {
            throw new BadInputException("--timeout is a number of seconds greater than 0 and below 86400.");
        }

        var server = parsed.GetValue(options.Server);
        var catalogue = parsed.GetValue(options.Catalogue) ?? [];
        var policies = parsed.GetValue(options.Policies) ?? [];
        if (server is not null)
        {
            if (catalogue.Length > 0 || policies.Length > 0)
            {
                throw new BadInputException("--server names a running service, which has its own catalogue and policies; leave out --catalogue and --policies.");
            }

            return Uri.TryCreate(server, UriKind.Absolute, out var address) && address.Scheme is "http" or "https"
                ? new ServiceConnection(null, address, TimeSpan.FromSeconds(timeout))
                : throw new BadInputException($"--server is an address such as http://127.0.0.1:5080; found \"{server}\".");
        }

        var source = needsCatalogue || catalogue.Length > 0
            ? SourceOf(catalogue, policies)
            : new CatalogueSource([], policies.Length > 0 ? policies : [Path.Combine(DemoFolder.Find(), "policies")]);
        return await StartAsync(source, 0, TimeSpan.FromSeconds(timeout), cancellation);
    }

    /// <summary>Starts a service of this process and waits until its catalogue is ready.</summary>
    public static async Task<ServiceConnection> StartAsync(CatalogueSource source, int port, TimeSpan timeout, CancellationToken cancellation)
    {
        var app = ServiceHost.Build(new HostSettings { Source = source, Port = port, Quiet = true });
        try
        {
            await app.StartAsync(cancellation);
            await app.Services.GetRequiredService<ICatalogue>().CurrentAsync(cancellation);
            return new ServiceConnection(app, ServiceHost.AddressOf(app), timeout);
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
            throw new BadInputException(FormattableString.Invariant($"Port {port} is in use; give another one with --port."));
        }
    }

    /// <summary>What a command reads where the user names nothing: the demo.</summary>
    public static CatalogueSource SourceOf(string[] catalogue, string[] policies)
    {
        if (catalogue.Length == 0 && policies.Length == 0)
        {
            return new CatalogueSource([Path.Combine(DemoFolder.Find(), "catalogue")], [Path.Combine(DemoFolder.Find(), "policies")]);
        }

        // The demo's policy must not judge somebody's own bridges, nor somebody's policy the demo's, without being asked for.
        return (catalogue.Length, policies.Length) switch
        {
            ( > 0, 0) => throw new BadInputException("Name the policies too, for instance --policies deploy/policies; the demo's policy is for demo data only."),
            (0, > 0) => throw new BadInputException("Name the catalogue too, for instance --catalogue deploy/demo/catalogue."),
            _ => new CatalogueSource(catalogue, policies),
        };
    }

    /// <summary>Deadline and cancellation of a call.</summary>
    public CallOptions Call(CancellationToken cancellation) =>
        new(deadline: TimeProvider.System.GetUtcNow().UtcDateTime + _timeout, cancellationToken: cancellation);

    /// <summary>Waits until the service of this process is stopped.</summary>
    public Task WaitAsync(CancellationToken cancellation) =>
        _own is null ? Task.CompletedTask : Task.WhenAny(_own.WaitForShutdownAsync(cancellation), Task.Delay(Timeout.Infinite, cancellation));

    public async ValueTask DisposeAsync()
    {
        _channel.Dispose();
        if (_own is not null)
        {
            await _own.DisposeAsync();
        }
    }
}

using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting;
using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using Microsoft.AspNetCore.Server.Kestrel.Core;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using Microsoft.Extensions.Logging.Console;
using PermitScreen.Service;
using PermitScreen.Service.Workers;

namespace PermitScreen.Host;

/// <summary>The composition root: builds one process of the service.</summary>
public static class ServiceHost
{
    /// <summary>How long calls may go on once the service is told to stop; then they are cut off. Container runtimes kill after 10 s.</summary>
    public static readonly TimeSpan TimeToStop = TimeSpan.FromSeconds(5);

    /// <summary>Builds the service; it listens once it is started.</summary>
    /// <param name="settings">Settings.</param>
    /// <exception cref="Service.Files.FileFaultsException">A policy is at fault.</exception>
    /// <exception cref="FileNotFoundException">A path does not exist.</exception>
    /// <exception cref="Catalogue.Storage.StoreException">The records cannot be opened; the message says why and how to mend it.</exception>
    public static WebApplication Build(HostSettings settings)
    {
        var source = settings.Source.WithPoliciesRead();
        var builder = WebApplication.CreateSlimBuilder();
        builder.Logging.ClearProviders();
        builder.Logging.AddSimpleConsole(o =>
        {
            o.SingleLine = true;
            o.TimestampFormat = "yyyy-MM-ddTHH:mm:ss.fffZ ";
            o.UseUtcTimestamp = true;
        });
        builder.Services.Configure<ConsoleLoggerOptions>(o => o.LogToStandardErrorThreshold = LogLevel.Trace);
        builder.Logging.SetMinimumLevel(settings.Quiet ? LogLevel.Error : LogLevel.Information);
        if (settings.Quiet)
        {
            // Why a start failed is told by the command itself, once.
            builder.Logging.AddFilter(typeof(CatalogueSource).Namespace, LogLevel.None);
            builder.Logging.AddFilter("Microsoft.Extensions.Hosting", LogLevel.None);
        }

        builder.Logging.AddFilter("Microsoft.AspNetCore", settings.Quiet ? LogLevel.None : LogLevel.Warning);
        builder.Logging.AddFilter("Grpc", LogLevel.Warning);

        // Each question for readiness would log an error until the lines are ready; the worker logs its progress itself.
        builder.Logging.AddFilter("Microsoft.Extensions.Diagnostics.HealthChecks", LogLevel.None);
        builder.Services.Configure<HostOptions>(o => o.ShutdownTimeout = TimeToStop);
        builder.WebHost.ConfigureKestrel(o => o.Listen(settings.Address, settings.Port, l => l.Protocols = HttpProtocols.Http2));
        var place = RecordsFolder.Register(builder.Services, RecordsFolder.Open(settings), settings);
        builder.Services.AddPermitScreen(place, source, settings.Zone);
        var app = builder.Build();
        app.MapPermitScreen();
        return app;
    }

    /// <summary>The address that a started service listens on.</summary>
    /// <param name="app">Started service.</param>
    public static Uri AddressOf(WebApplication app) =>
        new(app.Services.GetRequiredService<IServer>().Features.Get<IServerAddressesFeature>()!.Addresses.First());
}

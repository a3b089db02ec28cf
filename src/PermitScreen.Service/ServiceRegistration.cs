using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Service.Endpoints;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Revisions;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service;

/// <summary>Registers what the service is made of. The interfaces to the records are the host's to register.</summary>
public static partial class ServiceRegistration
{
    private const int LargestMessageBytes = 16 * 1024 * 1024;

    /// <summary>Adds endpoints, workers, health and reflection.</summary>
    /// <param name="services">Services of the host.</param>
    /// <param name="place">Where the records are.</param>
    /// <param name="source">Files to be taken in when the service starts.</param>
    /// <param name="zone">Zone of the authority.</param>
    public static IServiceCollection AddPermitScreen(this IServiceCollection services, RecordsPlace place, CatalogueSource source, TimeZoneInfo zone)
    {
        services.AddSingleton(place);
        services.AddSingleton(source);
        services.AddSingleton(TimeProvider.System);
        services.AddSingleton<StartFailure>();
        services.AddSingleton(s => new AuthorityDate(s.GetRequiredService<TimeProvider>(), zone));
        AddCatalogue(services);
        AddChanges(services);
        services.AddSingleton<SourceImport>();
        services.AddSingleton<CatalogueWorker>();
        services.AddHostedService(s => s.GetRequiredService<CatalogueWorker>());
        services.AddSingleton<LineWorker>();
        services.AddHostedService(s => s.GetRequiredService<LineWorker>());
        services.AddGrpc(o =>
        {
            o.Interceptors.Add<ErrorInterceptor>();
            o.MaxReceiveMessageSize = LargestMessageBytes;
            o.MaxSendMessageSize = LargestMessageBytes;
        });
        services.AddGrpcReflection();
        services.AddGrpcHealthChecks(o => o.UseHealthChecksCache = false).AddCheck<CatalogueWorker>("catalogue");
        return services;
    }

    /// <summary>Maps the endpoints.</summary>
    /// <param name="routes">Routes of the host.</param>
    public static void MapPermitScreen(this IEndpointRouteBuilder routes)
    {
        routes.MapGrpcService<ScreeningEndpoint>();
        routes.MapGrpcService<CatalogueEndpoint>();
        routes.MapGrpcService<PolicyEndpoint>();
        routes.MapGrpcService<ImportEndpoint>();
        routes.MapGrpcService<HistoryEndpoint>();
        routes.MapGrpcService<MaintenanceEndpoint>();
        routes.MapGrpcHealthChecksService();
        routes.MapGrpcReflectionService();
    }

    private static void AddCatalogue(IServiceCollection services)
    {
        services.AddSingleton(s => new LineLibrary(s.GetRequiredService<ILineStore>()));
        services.AddSingleton<ILineSource>(s => s.GetRequiredService<LineLibrary>());
        services.AddSingleton<IRevisionReader, RevisionReader>();
        services.AddSingleton(s => Loaded(s));
        services.AddSingleton<CatalogueGate>();
        services.AddSingleton<ICatalogue>(s => s.GetRequiredService<CatalogueGate>());
        services.AddSingleton<BacklogBell>();
        services.AddSingleton<BacklogRenewal>();
    }

    private static CurrentCatalogue Loaded(IServiceProvider services)
    {
        var logger = services.GetRequiredService<ILogger<CurrentCatalogue>>();
        return new CurrentCatalogue(
            services.GetRequiredService<ICatalogueStore>(),
            services.GetRequiredService<IRevisionReader>(),
            services.GetRequiredService<RecordsPlace>().SegmentPath,
            told => LogTold(logger, told));
    }

    [LoggerMessage(EventId = 30, Level = LogLevel.Information, Message = "{Told}")]
    private static partial void LogTold(ILogger logger, string told);

    /// <summary>Endpoints are public, as the framework asks for; what they are made of is not, so that they are put together here.</summary>
    private static void AddChanges(IServiceCollection services)
    {
        services.AddSingleton<ChangeCaller>();
        services.AddSingleton<Door>();
        services.AddSingleton<ImportChecks>();
        services.AddSingleton<ChangeDesk>();
        services.AddSingleton<RecordsVerification>();
        services.AddSingleton<Restoring>();
        services.AddSingleton(s => new StructureChanges(s.GetRequiredService<ICatalogue>(), s.GetRequiredService<ChangeDesk>(), s.GetRequiredService<Door>(), s.GetRequiredService<ChangeCaller>()));
        services.AddSingleton(s => new PolicyChanges(s.GetRequiredService<ICatalogue>(), s.GetRequiredService<ChangeDesk>(), s.GetRequiredService<ChangeCaller>()));
        services.AddSingleton(s => new ImportEndpoint(
            s.GetRequiredService<IImportStore>(), s.GetRequiredService<ICatalogueStore>(), s.GetRequiredService<ICatalogue>(), s.GetRequiredService<ImportChecks>(), s.GetRequiredService<ChangeDesk>(), s.GetRequiredService<ChangeCaller>()));
        services.AddSingleton(s => new HistoryEndpoint(s.GetRequiredService<ICatalogueStore>(), s.GetRequiredService<RecordsVerification>()));
        services.AddSingleton(s => new MaintenanceEndpoint(
            s.GetRequiredService<RecordsPlace>(),
            s.GetRequiredService<IRecordKeeping>(),
            s.GetRequiredService<IBacklogStore>(),
            s.GetRequiredService<ILineStore>(),
            s.GetRequiredService<ICatalogueStore>(),
            s.GetRequiredService<ICatalogue>(),
            s.GetRequiredService<LineLibrary>(),
            s.GetRequiredService<LineWorker>(),
            s.GetRequiredService<Restoring>(),
            s.GetRequiredService<ChangeCaller>()));
    }
}

using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Service.Endpoints;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service;

/// <summary>Registers what the service is made of.</summary>
public static class ServiceRegistration
{
    private const int LargestMessageBytes = 16 * 1024 * 1024;

    /// <summary>Adds endpoints, worker, health and reflection.</summary>
    /// <param name="services">Services of the host.</param>
    /// <param name="source">Where catalogue and policies are.</param>
    /// <param name="policies">Policies, read before the service starts.</param>
    /// <param name="zone">Zone of the authority.</param>
    public static IServiceCollection AddPermitScreen(
        this IServiceCollection services, CatalogueSource source, IReadOnlyList<ShelvedPolicy> policies, TimeZoneInfo zone)
    {
        var shelf = new PolicyShelf();
        shelf.Fill(policies);
        services.AddSingleton(shelf);
        services.AddSingleton(source);
        services.AddSingleton<LineCache>();
        services.AddSingleton<StructureShelf>();
        services.AddSingleton<CatalogueHolder>();
        services.AddSingleton<ICatalogue>(s => s.GetRequiredService<CatalogueHolder>());
        services.AddSingleton<StartFailure>();
        services.AddSingleton(TimeProvider.System);
        services.AddSingleton(s => new AuthorityDate(s.GetRequiredService<TimeProvider>(), zone));
        services.AddSingleton<CatalogueWorker>();
        services.AddHostedService(s => s.GetRequiredService<CatalogueWorker>());
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
        routes.MapGrpcHealthChecksService();
        routes.MapGrpcReflectionService();
    }
}

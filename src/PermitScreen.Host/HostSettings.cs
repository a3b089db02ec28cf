using System.Net;
using PermitScreen.Service.Workers;

namespace PermitScreen.Host;

/// <summary>What one process of the service is started with.</summary>
public sealed record HostSettings
{
    /// <summary>Where the catalogue and the policies are.</summary>
    public required CatalogueSource Source { get; init; }

    /// <summary>Address to listen on; the loopback address by default: anything wider needs a proxy with TLS before it.</summary>
    public IPAddress Address { get; init; } = IPAddress.Loopback;

    /// <summary>Port for gRPC (HTTP/2 without TLS); 0 lets the system choose.</summary>
    public int Port { get; init; }

    /// <summary>Zone of the authority; its civil date is the as-of date where a caller states none.</summary>
    public TimeZoneInfo Zone { get; init; } = TimeZoneInfo.Utc;

    /// <summary>Whether only warnings are logged.</summary>
    public bool Quiet { get; init; }
}

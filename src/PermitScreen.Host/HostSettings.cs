using System.Net;
using PermitScreen.Service.Workers;

namespace PermitScreen.Host;

/// <summary>What one process of the service is started with.</summary>
public sealed record HostSettings
{
    /// <summary>Folder of the records, made where it does not exist; null for a temporary one that is removed at the end.</summary>
    public string? DataFolder { get; init; }

    /// <summary>Files that are taken into fresh records when the service starts; none where the records have a folder of their own.</summary>
    public CatalogueSource Source { get; init; } = CatalogueSource.None;

    /// <summary>Address to listen on; the loopback address by default: anything wider needs a proxy with TLS before it.</summary>
    public IPAddress Address { get; init; } = IPAddress.Loopback;

    /// <summary>Port for gRPC (HTTP/2 without TLS); 0 lets the system choose.</summary>
    public int Port { get; init; }

    /// <summary>Zone of the authority; its civil date is the as-of date where a caller states none.</summary>
    public TimeZoneInfo Zone { get; init; } = TimeZoneInfo.Utc;

    /// <summary>Whether only warnings are logged.</summary>
    public bool Quiet { get; init; }
}

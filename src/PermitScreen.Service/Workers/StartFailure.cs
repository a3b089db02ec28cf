namespace PermitScreen.Service.Workers;

/// <summary>Why a service stopped by itself while starting.</summary>
public sealed class StartFailure
{
    /// <summary>The reason; null where it did not.</summary>
    public Exception? Reason { get; set; }
}

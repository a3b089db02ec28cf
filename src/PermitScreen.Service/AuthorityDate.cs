namespace PermitScreen.Service;

/// <summary>The civil date in the authority's zone. The only place of the service that reads a clock for a verdict, and only where the caller states no date.</summary>
/// <param name="time">Clock.</param>
/// <param name="zone">Zone of the authority.</param>
public sealed class AuthorityDate(TimeProvider time, TimeZoneInfo zone)
{
    /// <summary>Today, where the authority sits.</summary>
    public DateOnly Today() => DateOnly.FromDateTime(TimeZoneInfo.ConvertTime(time.GetUtcNow(), zone).DateTime);
}

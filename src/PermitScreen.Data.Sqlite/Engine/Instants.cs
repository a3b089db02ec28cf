namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>Instants as whole milliseconds since 1970, UTC.</summary>
internal static class Instants
{
    private static readonly long First = DateTimeOffset.MinValue.ToUnixTimeMilliseconds();
    private static readonly long Last = DateTimeOffset.MaxValue.ToUnixTimeMilliseconds();

    /// <summary>The instant; null where the number is none.</summary>
    /// <param name="milliseconds">Milliseconds since 1970, UTC.</param>
    public static DateTimeOffset? Read(long milliseconds) =>
        milliseconds >= First && milliseconds <= Last ? DateTimeOffset.FromUnixTimeMilliseconds(milliseconds) : null;

    /// <summary>The number of an instant.</summary>
    /// <param name="instant">Instant.</param>
    public static long Write(DateTimeOffset instant) => instant.ToUnixTimeMilliseconds();

    /// <summary>An instant as it will be read again: UTC, to the millisecond.</summary>
    /// <param name="instant">Instant.</param>
    public static DateTimeOffset Kept(DateTimeOffset instant) => DateTimeOffset.FromUnixTimeMilliseconds(Write(instant));
}

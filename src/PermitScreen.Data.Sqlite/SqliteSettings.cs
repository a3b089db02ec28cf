namespace PermitScreen.Data.Sqlite;

/// <summary>Where the records are and how they are kept.</summary>
public sealed record SqliteSettings
{
    /// <summary>Folder of the records; made where there is none.</summary>
    public required string Folder { get; init; }

    /// <summary>Records that need not outlive the process: nothing is forced to the device, and the folder is deleted at the end.</summary>
    public bool Temporary { get; init; }

    /// <summary>Told of each moment at which a process may end; null in normal use.</summary>
    public IStoreProbe? Probe { get; init; }

    /// <summary>How long to wait for another connection that holds a file.</summary>
    public TimeSpan BusyTimeout { get; init; } = TimeSpan.FromSeconds(5);

    /// <summary>Files up to this size are checked page by page when they are opened; larger ones would delay the start, and every row is checked when it is read.</summary>
    internal long CheckPagesUpToBytes { get; init; } = 64L << 20;

    /// <summary>Largest number of pages of the records; lets a test fill them up. Null for no limit.</summary>
    internal long? MostPages { get; init; }
}

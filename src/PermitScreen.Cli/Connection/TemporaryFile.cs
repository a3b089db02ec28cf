namespace PermitScreen.Cli.Connection;

/// <summary>A file that is written beside its place and takes it only once it is whole.</summary>
internal sealed class TemporaryFile : IAsyncDisposable
{
    private readonly string _path;
    private readonly string _part;

    /// <summary>Begins a file.</summary>
    /// <param name="path">Its place; the folder exists.</param>
    public TemporaryFile(string path)
    {
        _path = path;
        _part = FormattableString.Invariant($"{path}.{Environment.ProcessId}.part");
        Stream = new FileStream(_part, FileMode.Create, FileAccess.Write, FileShare.None);
    }

    public FileStream Stream { get; }

    /// <summary>Brings the file to its place.</summary>
    /// <param name="overwrite">Whether a file that stands there is replaced.</param>
    /// <param name="toDisk">Whether it must be on the disk first, and not only with the operating system.</param>
    /// <exception cref="IOException">One stands there, and is not to be replaced.</exception>
    public void Keep(bool overwrite, bool toDisk)
    {
        Stream.Flush(toDisk);
        Stream.Dispose();
        File.Move(_part, _path, overwrite);
    }

    /// <summary>Removes what was not kept.</summary>
    public async ValueTask DisposeAsync()
    {
        await Stream.DisposeAsync();
        File.Delete(_part);
    }
}

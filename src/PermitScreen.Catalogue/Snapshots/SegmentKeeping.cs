using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Keeps the segment file near the newest version. A file that cannot be written is told and costs nothing but time at the next start. Thread-safe.</summary>
/// <param name="path">File; null where none is wanted.</param>
/// <param name="tell">Takes what an operator should know.</param>
internal sealed class SegmentKeeping(string? path, Action<string> tell) : IDisposable
{
    private readonly SemaphoreSlim _writing = new(1);
    private VersionStamp? _kept;

    /// <summary>File; null where none is wanted.</summary>
    public string? Path => path;

    /// <summary>Notes what the file was found to hold.</summary>
    public void Found(VersionStamp stamp) => _kept = stamp;

    /// <summary>Writes a snapshot unless the file holds its version.</summary>
    public async Task WriteAsync(CatalogueSnapshot snapshot, CancellationToken cancellation)
    {
        if (path is null)
        {
            return;
        }

        await _writing.WaitAsync(cancellation);
        try
        {
            if (snapshot.Stamp != _kept)
            {
                SegmentFile.Write(path, snapshot, cancellation);
                _kept = snapshot.Stamp;
            }
        }
        catch (Exception trouble) when (trouble is IOException or UnauthorizedAccessException)
        {
            tell($"The segment file {path} cannot be written: {trouble.Message} The next start reads the whole catalogue from the records.");
        }
        finally
        {
            _writing.Release();
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _writing.Dispose();
}

namespace PermitScreen.Service;

/// <summary>Where the records of this service are.</summary>
/// <param name="Folder">Folder.</param>
/// <param name="SegmentPath">File of the disposable copy that a start reads first; null for none.</param>
/// <param name="LinesId">Identity of the kept lines; another one where they were lost and made anew, also while the service runs; empty while there are none.</param>
/// <param name="Temporary">Whether the records are removed when the service ends.</param>
public sealed record RecordsPlace(string Folder, string? SegmentPath, Func<string> LinesId, bool Temporary)
{
    /// <summary>Path of a file in the folder.</summary>
    /// <param name="name">Name of the file.</param>
    public string FileOf(string name) => Path.Combine(Folder, name);
}

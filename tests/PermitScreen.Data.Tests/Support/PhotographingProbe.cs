using PermitScreen.Data.Sqlite;

namespace PermitScreen.Data.Tests.Support;

/// <summary>
/// Copies the files at each moment. Whoever opens the copy finds what a process finds that starts after the other one was killed at that moment:
/// everything that was written to the files, and nothing that was only in memory.
/// </summary>
internal sealed class PhotographingProbe(string folder, string photographs) : IStoreProbe
{
    private readonly List<(StoreMoment Moment, string What, string Folder)> _taken = [];

    public IReadOnlyList<(StoreMoment Moment, string What, string Folder)> Taken => _taken;

    public void Reached(StoreMoment moment, string what)
    {
        var target = Path.Combine(photographs, FormattableString.Invariant($"{_taken.Count:D3}"));
        Directory.CreateDirectory(target);
        foreach (var file in Directory.GetFiles(folder).Where(f => Path.GetFileName(f) is not ("lock" or "catalogue.db-shm" or "lines.db-shm")))
        {
            File.Copy(file, Path.Combine(target, Path.GetFileName(file)));
        }

        _taken.Add((moment, what, target));
    }
}

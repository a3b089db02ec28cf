namespace PermitScreen.Data.Tests.Support;

/// <summary>A folder of its own for a test, deleted afterwards.</summary>
public sealed class TestFolder : IDisposable
{
    public TestFolder() => Path = Directory.CreateTempSubdirectory("permitscreen-data-").FullName;

    public string Path { get; }

    public string File(string name) => System.IO.Path.Combine(Path, name);

    public void Dispose() => Directory.Delete(Path, recursive: true);
}

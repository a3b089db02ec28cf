namespace PermitScreen.Service.Files;

/// <summary>Finds files.</summary>
public static class FolderFiles
{
    /// <summary>The JSON files of a path: the file itself, or those of a folder and the folders below it, in order of name.</summary>
    /// <param name="path">File or folder.</param>
    /// <exception cref="FileNotFoundException">There is neither.</exception>
    public static IReadOnlyList<string> Of(string path)
    {
        if (File.Exists(path))
        {
            return [path];
        }

        if (Directory.Exists(path))
        {
            return [.. Directory.EnumerateFiles(path, "*.json", SearchOption.AllDirectories).Order(StringComparer.Ordinal)];
        }

        throw new FileNotFoundException($"There is no file or folder {path}.", path);
    }
}

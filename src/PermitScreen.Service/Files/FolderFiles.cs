namespace PermitScreen.Service.Files;

/// <summary>Finds files.</summary>
public static class FolderFiles
{
    /// <summary>The JSON files of a path: the file itself, or those of a folder and the folders below it, in order of name.</summary>
    /// <param name="path">File or folder.</param>
    /// <exception cref="FileNotFoundException">There is neither.</exception>
    public static IReadOnlyList<string> Of(string path)
    {
        if (path.StartsWith("--", StringComparison.Ordinal))
        {
            throw new FileNotFoundException($"{path} is no option of this command, and no file or folder.", path);
        }

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

    /// <summary>The JSON files of a path that are of a kind: in a folder those of another kind are passed over, a file named by itself never is.</summary>
    /// <param name="path">File or folder.</param>
    /// <param name="schema">Schema of the kind.</param>
    /// <exception cref="FileNotFoundException">There is neither.</exception>
    public static IEnumerable<string> Of(string path, string schema) =>
        Of(path).Where(file => file == path || ContractFile.SchemaOf(File.ReadAllText(file)) is var found && (found == schema || !FileSchemas.Kinds.ContainsKey(found)));
}

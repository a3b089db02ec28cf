namespace PermitScreen.Cli.Connection;

/// <summary>Names of files for resources.</summary>
internal static class FileNames
{
    /// <summary>The last part of a resource name with .json after it.</summary>
    /// <param name="resource">Resource name, as a service gave it.</param>
    /// <exception cref="BadInputException">It could lead out of the folder; no service of this contract has such a name.</exception>
    public static string Of(string resource)
    {
        var id = resource[(resource.IndexOf('/', StringComparison.Ordinal) + 1)..];
        return id.Length > 0 && id.All(c => char.IsAsciiLetterOrDigit(c) || c is '-' or '.' or '@' or '_')
            ? id + ".json"
            : throw new BadInputException($"\"{resource}\" cannot be the name of a file.");
    }
}

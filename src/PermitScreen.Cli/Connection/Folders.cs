namespace PermitScreen.Cli.Connection;

/// <summary>Checks folders that the user gives.</summary>
internal static class Folders
{
    /// <summary>The folder, where the text can be one.</summary>
    /// <param name="option">Option that it was given with.</param>
    /// <param name="folder">Folder; it need not exist.</param>
    /// <exception cref="BadInputException">It is empty, or a file stands there.</exception>
    public static string Checked(string option, string folder)
    {
        if (string.IsNullOrWhiteSpace(folder))
        {
            throw new BadInputException($"{option} needs the name of a folder.");
        }

        return File.Exists(folder) ? throw new BadInputException($"{option} is a folder; {folder} is a file.") : folder;
    }
}

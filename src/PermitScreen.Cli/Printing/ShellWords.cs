namespace PermitScreen.Cli.Printing;

/// <summary>The command that the user gave, as a line for a shell.</summary>
internal static class ShellWords
{
    private const string Plain = "-_./:=@%+,";

    /// <summary>The command of this process.</summary>
    public static string OfThisCommand() => "permitscreen " + string.Join(' ', Environment.GetCommandLineArgs().Skip(1).Select(Quoted));

    private static string Quoted(string word) => word.Length > 0 && word.All(c => char.IsAsciiLetterOrDigit(c) || Plain.Contains(c, StringComparison.Ordinal))
        ? word
        : $"'{word.Replace("'", "'\\''", StringComparison.Ordinal)}'";
}

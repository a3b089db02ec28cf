namespace PermitScreen.Cli;

/// <summary>What the exit code tells a script.</summary>
internal static class ExitCodes
{
    /// <summary>Passed, or done.</summary>
    public const int Passed = 0;

    /// <summary>Screened, and not passed: some crossing fails or was not assessed. Or records that are not sound, or a change that somebody else's came before.</summary>
    public const int NotPassed = 1;

    /// <summary>Bad input: a file, an option or a name; or records that are damaged or cannot be opened.</summary>
    public const int BadInput = 2;

    /// <summary>No answer: the service could not be reached, or not in time. No verdict was given.</summary>
    public const int NoAnswer = 3;
}

namespace PermitScreen.Cli.Connection;

/// <summary>Checks ports that the user gives.</summary>
internal static class Ports
{
    private const int Highest = 65535;

    /// <summary>The port, where it is one.</summary>
    /// <exception cref="BadInputException">It is none.</exception>
    public static int Checked(int port) =>
        port is >= 0 and <= Highest ? port : throw new BadInputException(FormattableString.Invariant($"--port is a number from 0 to {Highest}; found {port}."));
}

using System.CommandLine;

namespace PermitScreen.Cli.Commands;

/// <summary>The option that says how many of the newest are shown.</summary>
internal static class MostOption
{
    private const int Default = 20;

    public static Option<int> Create() => new("--most") { Description = "How many at most, newest first.", DefaultValueFactory = _ => Default };

    /// <summary>The number.</summary>
    /// <exception cref="BadInputException">It is less than 1.</exception>
    public static int Checked(Option<int> option, ParseResult parsed) => parsed.GetValue(option) is var most and >= 1
        ? most
        : throw new BadInputException(FormattableString.Invariant($"--most is a number from 1; found {parsed.GetValue(option)}."));
}

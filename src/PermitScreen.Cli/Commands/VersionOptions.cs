using System.CommandLine;

namespace PermitScreen.Cli.Commands;

/// <summary>Options that name a catalogue version.</summary>
internal static class VersionOptions
{
    public static Option<long?> AsOf() => new("--as-of-version") { Description = "Catalogue version to read; the newest where left out. `changes` lists them." };

    /// <summary>The version; null where none is given.</summary>
    /// <exception cref="BadInputException">It is less than 1.</exception>
    public static long? Checked(Option<long?> option, ParseResult parsed) => parsed.GetValue(option) is { } version and < 1
        ? throw new BadInputException(FormattableString.Invariant($"{option.Name} is a number from 1; found {version}."))
        : parsed.GetValue(option);
}

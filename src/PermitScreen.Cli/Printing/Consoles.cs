using Spectre.Console;

namespace PermitScreen.Cli.Printing;

/// <summary>The console that tables are printed to.</summary>
internal static class Consoles
{
    private const int WidthOfFiles = 160;
    private const int LeastWidth = 100;

    /// <summary>A console of the terminal's width; of a fixed one where the output goes into a file.</summary>
    public static IAnsiConsole Create()
    {
        var console = AnsiConsole.Create(new AnsiConsoleSettings { Out = new AnsiConsoleOutput(Console.Out) });
        console.Profile.Width = Console.IsOutputRedirected ? WidthOfFiles : Math.Max(LeastWidth, console.Profile.Width);
        return console;
    }
}

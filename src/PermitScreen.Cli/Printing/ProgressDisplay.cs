using Spectre.Console;

namespace PermitScreen.Cli.Printing;

/// <summary>Shows how far work is, beside the results: a bar where the error output is a terminal, or else a line every two seconds.</summary>
internal static class ProgressDisplay
{
    private static readonly TimeSpan BetweenLines = TimeSpan.FromSeconds(2);

    /// <summary>Works, and shows how far it is.</summary>
    /// <param name="what">What is done, for instance "Importing".</param>
    /// <param name="unit">What is counted, in the plural.</param>
    /// <param name="total">How many there are; null where not known.</param>
    /// <param name="work">The work.</param>
    public static Task<T> RunAsync<T>(string what, string unit, long? total, Func<ProgressReport, Task<T>> work)
    {
        var report = new ProgressReport(unit, total, TimeProvider.System);
        return Console.IsErrorRedirected ? work(WithLines(report)) : RunBarAsync(what, report, work);
    }

    private static ProgressReport WithLines(ProgressReport report)
    {
        var last = TimeProvider.System.GetTimestamp();
        report.Changed = r =>
        {
            if (TimeProvider.System.GetElapsedTime(last) >= BetweenLines)
            {
                last = TimeProvider.System.GetTimestamp();
                Console.Error.WriteLine($"  {r.Words}");
            }
        };
        return report;
    }

    private static Task<T> RunBarAsync<T>(string what, ProgressReport report, Func<ProgressReport, Task<T>> work)
    {
        // A terminal, as was seen above; by itself the console would ask the output, which may be a file.
        var console = AnsiConsole.Create(new AnsiConsoleSettings { Out = new AnsiConsoleOutput(Console.Error), Interactive = InteractionSupport.Yes });
        report.Tell = console.WriteLine;
        return console.Progress()
            .Columns(new TaskDescriptionColumn(), new ProgressBarColumn(), new ProgressWordsColumn(report))
            .StartAsync(context =>
            {
                var bar = context.AddTask(Markup.Escape(what), maxValue: Math.Max(1, report.Total ?? 1));
                bar.IsIndeterminate = report.Total is null;
                report.Changed = r => bar.Value = r.Done;
                return work(report);
            });
    }
}

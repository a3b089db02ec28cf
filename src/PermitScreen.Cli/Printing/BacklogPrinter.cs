using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Printing;

/// <summary>Prints the backlog, and how it shrinks.</summary>
/// <param name="json">Whether for scripts.</param>
internal sealed class BacklogPrinter(bool json)
{
    private readonly long _start = TimeProvider.System.GetTimestamp();
    private long _computedBefore;

    /// <summary>The whole.</summary>
    public void Print(Backlog backlog)
    {
        _computedBefore = backlog.ComputedCount;
        if (json)
        {
            JsonLines.Write(backlog);
            return;
        }

        var since = backlog.OldestPendingAt is { } oldest ? $", the oldest asked for at {Numbers.Instant(oldest)} UTC" : "";
        Console.Out.WriteLine($"Influence lines of different trusses, at catalogue version {Numbers.Version(backlog.HasCatalogueVersion, backlog.CatalogueVersion)}:");
        Console.Out.WriteLine($"  {Numbers.Count(backlog.PendingCount),9} pending{since}");
        Console.Out.WriteLine($"  {Numbers.Count(backlog.KeptCount),9} kept");
        Console.Out.WriteLine($"  {Numbers.Count(backlog.ComputedCount),9} computed since the service started");
        Console.Out.WriteLine($"  {Numbers.Count(backlog.DamagedCount),9} found damaged since then, and computed anew");
    }

    /// <summary>One line: pending, kept, rate, time left.</summary>
    public void PrintNext(Backlog backlog)
    {
        if (json)
        {
            JsonLines.Write(backlog);
            return;
        }

        var seconds = TimeProvider.System.GetElapsedTime(_start).TotalSeconds;
        var perSecond = (backlog.ComputedCount - _computedBefore) / seconds;
        var pace = perSecond > 0 && backlog.PendingCount > 0
            ? $", {Numbers.Count((long)Math.Round(perSecond))}/s, {Numbers.Duration(TimeSpan.FromSeconds(Math.Ceiling(backlog.PendingCount / perSecond)))} left"
            : "";
        Console.Out.WriteLine($"  {Numbers.Count(backlog.PendingCount)} pending, {Numbers.Count(backlog.KeptCount)} kept{pace}");
    }

    /// <summary>What cannot be computed.</summary>
    public void PrintFailures(Backlog backlog)
    {
        foreach (var failure in json ? [] : backlog.Failures.AsEnumerable())
        {
            Console.Out.WriteLine($"cannot be computed: {failure.Structure}: {failure.Reason}");
        }
    }
}

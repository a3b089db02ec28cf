namespace PermitScreen.Cli.Printing;

/// <summary>How far a piece of work is: rate and time left, counted from where it began.</summary>
/// <param name="unit">What is counted, in the plural.</param>
/// <param name="total">How many there are; null where not known.</param>
/// <param name="time">Clock.</param>
internal sealed class ProgressReport(string unit, long? total, TimeProvider time)
{
    private long _from;
    private long _since = time.GetTimestamp();

    /// <summary>Called after each report.</summary>
    public Action<ProgressReport>? Changed { get; set; }

    /// <summary>Takes words for people while the work goes on.</summary>
    public Action<string> Tell { get; set; } = Console.Error.WriteLine;

    public long Done { get; private set; }

    public long? Total => total;

    /// <summary>How many were done in a second; 0 before the first.</summary>
    public double PerSecond => Done > _from && time.GetElapsedTime(_since) is { TotalSeconds: > 0 } elapsed ? (Done - _from) / elapsed.TotalSeconds : 0;

    /// <summary>Time left at that rate; null where it cannot be told.</summary>
    public TimeSpan? Left => total is { } all && PerSecond > 0 ? TimeSpan.FromSeconds(Math.Min((all - Done) / PerSecond, TimeSpan.MaxValue.TotalSeconds / 2)) : null;

    /// <summary>For instance "41,200 of 100,000 items, 1,930/s, 31 s left".</summary>
    public string Words => string.Concat(
        Numbers.Count(Done),
        total is { } all ? $" of {Numbers.Count(all)} {unit}" : $" {unit}",
        PerSecond > 0 ? $", {Numbers.Count((long)Math.Round(PerSecond))}/s" : "",
        Left is { } left && Done < total ? $", {Numbers.Duration(TimeSpan.FromSeconds(Math.Ceiling(left.TotalSeconds)))} left" : "");

    /// <summary>This much was done before; it does not count for the rate.</summary>
    public void StartAt(long done)
    {
        (_from, _since, Done) = (done, time.GetTimestamp(), done);
        Changed?.Invoke(this);
    }

    /// <summary>This much is done now.</summary>
    public void Report(long done)
    {
        Done = done;
        Changed?.Invoke(this);
    }
}

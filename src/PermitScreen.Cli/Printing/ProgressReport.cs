namespace PermitScreen.Cli.Printing;

/// <summary>How far a piece of work is: rate of the last while, and the time left at that rate.</summary>
/// <param name="unit">What is counted, in the plural.</param>
/// <param name="total">How many there are; null where not known.</param>
/// <param name="time">Clock.</param>
internal sealed class ProgressReport(string unit, long? total, TimeProvider time)
{
    // Long enough to be steady, short enough to forget a slow beginning.
    private static readonly TimeSpan Window = TimeSpan.FromSeconds(20);
    // A progress bar is drawn by a timer, beside the work.
    private readonly Lock _lock = new();
    private readonly Queue<(long Stamp, long Done)> _recent = new([(time.GetTimestamp(), 0)]);

    /// <summary>Called after each report.</summary>
    public Action<ProgressReport>? Changed { get; set; }

    /// <summary>Takes words for people while the work goes on.</summary>
    public Action<string> Tell { get; set; } = Console.Error.WriteLine;

    public long Done { get; private set; }

    public long? Total => total;

    /// <summary>For instance "41,200 of 100,000 items, 1,930/s, 31 s left".</summary>
    public string Words
    {
        get
        {
            long stamp, done;
            lock (_lock)
            {
                (stamp, done) = _recent.Peek();
            }

            var seconds = time.GetElapsedTime(stamp).TotalSeconds;
            var perSecond = seconds > 0 ? (Done - done) / seconds : 0;
            var left = total is { } all && all > Done && perSecond >= 1 ? $", {Numbers.Duration(TimeSpan.FromSeconds(Math.Ceiling((all - Done) / perSecond)))} left" : "";
            return string.Concat(
                Numbers.Count(Done),
                total is { } most ? $" of {Numbers.Count(most)} {unit}" : $" {unit}",
                perSecond >= 1 ? $", {Numbers.Count((long)Math.Round(perSecond))}/s" : "",
                left);
        }
    }

    /// <summary>This much was done before; it does not count for the rate.</summary>
    public void StartAt(long done) => Note(done, forget: true);

    /// <summary>This much is done now.</summary>
    public void Report(long done) => Note(done, forget: false);

    private void Note(long done, bool forget)
    {
        lock (_lock)
        {
            Done = done;
            _recent.Enqueue((time.GetTimestamp(), done));
            while (_recent.Count > (forget ? 1 : 2) && (forget || time.GetElapsedTime(_recent.Peek().Stamp) > Window))
            {
                _recent.Dequeue();
            }
        }

        Changed?.Invoke(this);
    }
}

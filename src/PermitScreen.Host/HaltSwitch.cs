using System.Collections.Concurrent;
using System.Globalization;
using PermitScreen.Data.Sqlite;

namespace PermitScreen.Host;

/// <summary>
/// Stops the process dead at a chosen instant of its work with the records, so that tests can kill it there: PERMITSCREEN_HALT_AT=InsideTransaction:17
/// halts before the 17th commit. Not set in normal use; the process then passes every instant without a look.
/// </summary>
internal sealed class HaltSwitch : IStoreProbe
{
    private const string Variable = "PERMITSCREEN_HALT_AT";
    private readonly StoreMoment _moment;
    private readonly int _count;
    private readonly ConcurrentDictionary<StoreMoment, int> _passed = new();

    private HaltSwitch(StoreMoment moment, int count) => (_moment, _count) = (moment, count);

    /// <summary>The switch that the environment asks for; null where it asks for none.</summary>
    /// <exception cref="InvalidOperationException">It cannot be read.</exception>
    public static HaltSwitch? FromEnvironment()
    {
        if (Environment.GetEnvironmentVariable(Variable) is not { Length: > 0 } text)
        {
            return null;
        }

        return text.Split(':') is [var moment, var count]
            && Enum.TryParse<StoreMoment>(moment, out var parsed)
            && int.TryParse(count, NumberStyles.None, CultureInfo.InvariantCulture, out var number)
                ? new HaltSwitch(parsed, number)
                : throw new InvalidOperationException($"{Variable} is one of {string.Join(", ", Enum.GetNames<StoreMoment>())}, a colon and a number; found \"{text}\".");
    }

    /// <inheritdoc/>
    public void Reached(StoreMoment moment, string what)
    {
        if (_passed.AddOrUpdate(moment, 1, (_, passed) => passed + 1) == _count && moment == _moment)
        {
            Console.Error.WriteLine(string.Create(CultureInfo.InvariantCulture, $"halted at {moment}:{_count} ({what})"));
            Console.Error.Flush();
            new ManualResetEventSlim().Wait();
        }
    }
}

using Grpc.Core;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Printing;

/// <summary>Prints a verification as it goes on, and its result.</summary>
/// <param name="json">Whether for scripts.</param>
internal sealed class VerificationPrinter(bool json)
{
    private static readonly TimeSpan BetweenLines = TimeSpan.FromSeconds(2);
    private string _stage = "";
    private long _last;
    private VerifyResult? _result;

    /// <summary>One message.</summary>
    public void Print(VerifyRecordsResponse message)
    {
        _result = message.Result ?? _result;
        if (json)
        {
            JsonLines.Write(message);
            return;
        }

        if (message.Result is null && message.Stage != _stage)
        {
            (_stage, _last) = (message.Stage, TimeProvider.System.GetTimestamp());
            Console.Error.WriteLine($"  {message.Stage}{(message.HasTotal ? $" ({Numbers.Count(message.Total)})" : "")}");
        }
        else if (message.Result is null && TimeProvider.System.GetElapsedTime(_last) >= BetweenLines)
        {
            _last = TimeProvider.System.GetTimestamp();
            Console.Error.WriteLine($"  {message.Stage}: {Numbers.Count(message.Done)}{(message.HasTotal ? $" of {Numbers.Count(message.Total)}" : "")}");
        }

        foreach (var problem in message.Problems)
        {
            Console.Out.WriteLine($"problem: {problem}");
        }
    }

    /// <summary>The result.</summary>
    /// <returns>Whether the records are sound.</returns>
    /// <exception cref="RpcException">The service ended without a result.</exception>
    public bool Finish()
    {
        if (_result is not { } result)
        {
            throw new RpcException(new Status(StatusCode.Unavailable, "The service ended the verification without a result."));
        }

        if (!json)
        {
            var read = $"{Numbers.Count(result.AuditEntryCount)} audit entries, {Numbers.Count(result.RevisionCount)} revisions and {Numbers.Count(result.LineCount)} kept lines read; catalogue version {Numbers.Version(result.HasCatalogueVersion, result.CatalogueVersion)}";
            Console.Out.WriteLine(result.Sound ? $"Sound: {read}" : $"NOT SOUND: {Numbers.Counted(result.ProblemCount, "problem", "problems")}; {read}");
            if (result.Sound && result.NewestHash.Length > 0)
            {
                Console.Out.WriteLine($"Newest hash: {result.NewestHash}");
                Console.Out.WriteLine("Note it down outside these records; `verify --known-hash` with it finds later whether the log was cut off or made anew.");
            }
        }

        return result.Sound;
    }
}

using Grpc.Core;
using PermitScreen.Cli.Printing;

namespace PermitScreen.Cli.Connection;

/// <summary>Tries calls again that were cut off. Only for calls that are harmless to repeat.</summary>
internal static class Retries
{
    private static readonly TimeSpan First = TimeSpan.FromSeconds(0.5);
    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(8);

    /// <summary>Calls, and calls again while the service cannot be reached.</summary>
    /// <param name="call">The call.</param>
    /// <param name="patience">How long after the first failure it is still tried.</param>
    /// <param name="tell">Told of each new try.</param>
    /// <param name="cancellation">Ends the wait.</param>
    /// <exception cref="RpcException">The last failure.</exception>
    public static async Task<T> CallAsync<T>(Func<Task<T>> call, TimeSpan patience, Action<string> tell, CancellationToken cancellation)
    {
        long? failing = null;
        var wait = First;
        while (true)
        {
            try
            {
                return await call();
            }
            catch (RpcException error) when (IsCutOff(error) && !cancellation.IsCancellationRequested && Left(ref failing, patience) > wait)
            {
                tell($"The service cannot be reached ({error.Status.Detail}); trying again in {Numbers.Duration(wait)}.");
                await Task.Delay(wait, cancellation);
                wait = wait * 2 < Longest ? wait * 2 : Longest;
            }
        }
    }

    /// <summary>Whether a call did not reach the service, or was cut off on its way; what became of it is not known then.</summary>
    public static bool IsCutOff(RpcException error) =>
        error.StatusCode == StatusCode.Unavailable
        || (error.StatusCode is StatusCode.Internal or StatusCode.Unknown or StatusCode.Cancelled && error.Status.DebugException is IOException or HttpRequestException);

    private static TimeSpan Left(ref long? failing, TimeSpan patience)
    {
        failing ??= TimeProvider.System.GetTimestamp();
        return patience - TimeProvider.System.GetElapsedTime(failing.Value);
    }
}

using System.Runtime.CompilerServices;
using Grpc.Core;

namespace PermitScreen.Cli.Connection;

/// <summary>Reads streams whose whole length nobody knows: there is no deadline for all of it, but one for each message.</summary>
internal static class Streams
{
    /// <summary>Every message of a stream.</summary>
    /// <param name="open">Makes the call, under the token given.</param>
    /// <param name="patience">Longest time to wait for the next message.</param>
    /// <param name="cancellation">Ends the reading.</param>
    /// <exception cref="RpcException">DEADLINE_EXCEEDED where no message came in time.</exception>
    public static async IAsyncEnumerable<T> ReadAsync<T>(
        Func<CancellationToken, AsyncServerStreamingCall<T>> open, TimeSpan patience, [EnumeratorCancellation] CancellationToken cancellation)
    {
        using var watch = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        watch.CancelAfter(patience);
        using var call = open(watch.Token);
        while (await MoveNextAsync(call, watch.Token, cancellation))
        {
            yield return call.ResponseStream.Current;
            watch.CancelAfter(patience);
        }
    }

    private static async Task<bool> MoveNextAsync<T>(AsyncServerStreamingCall<T> call, CancellationToken watch, CancellationToken cancellation)
    {
        try
        {
            return await call.ResponseStream.MoveNext(watch);
        }
        catch (Exception error) when (error is OperationCanceledException or RpcException { StatusCode: StatusCode.Cancelled } && watch.IsCancellationRequested && !cancellation.IsCancellationRequested)
        {
            throw new RpcException(new Status(StatusCode.DeadlineExceeded, "No message came in time."));
        }
    }
}

using Grpc.Core;
using Grpc.Core.Interceptors;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Service.Errors;

/// <summary>Turns what escapes an endpoint into a status: cancellation and deadlines as such, trouble with the records by its kind, anything else as INTERNAL with an id that the log has too.</summary>
/// <param name="logger">Log.</param>
public sealed partial class ErrorInterceptor(ILogger<ErrorInterceptor> logger) : Interceptor
{
    /// <inheritdoc/>
    public override Task<TResponse> UnaryServerHandler<TRequest, TResponse>(
        TRequest request, ServerCallContext context, UnaryServerMethod<TRequest, TResponse> continuation) =>
        GuardAsync(() => continuation(request, context), context);

    /// <inheritdoc/>
    public override Task ServerStreamingServerHandler<TRequest, TResponse>(
        TRequest request, IServerStreamWriter<TResponse> responseStream, ServerCallContext context, ServerStreamingServerMethod<TRequest, TResponse> continuation) =>
        GuardAsync(
            async () =>
            {
                await continuation(request, responseStream, context);
                return true;
            },
            context);

    /// <inheritdoc/>
    public override Task<TResponse> ClientStreamingServerHandler<TRequest, TResponse>(
        IAsyncStreamReader<TRequest> requestStream, ServerCallContext context, ClientStreamingServerMethod<TRequest, TResponse> continuation) =>
        GuardAsync(() => continuation(requestStream, context), context);

    private async Task<T> GuardAsync<T>(Func<Task<T>> call, ServerCallContext context)
    {
        try
        {
            return await call();
        }
        catch (RpcException)
        {
            throw;
        }
        catch (OperationCanceledException) when (context.CancellationToken.IsCancellationRequested)
        {
            throw context.Deadline <= TimeProvider.System.GetUtcNow().UtcDateTime
                ? new RpcException(new Status(StatusCode.DeadlineExceeded, "The deadline passed before the answer was complete; no verdict was given."))
                : new RpcException(new Status(StatusCode.Cancelled, "The call was cancelled; no verdict was given."));
        }
        catch (CatalogueUnavailableException error)
        {
            LogUnavailable(logger, context.Method, error.Message);
            throw new RpcException(new Status(StatusCode.Unavailable, $"{error.Message} No verdict was given; the service's log says why."));
        }
        catch (StoreException error)
        {
            LogRecords(logger, context.Method, error.Trouble, error.Message);
            throw new RpcException(new Status(CodeOf(error.Trouble), $"{error.Message} Nothing was changed, and no verdict was given."));
        }
#pragma warning disable CA1031 // The last line of defence: nothing of the inside may leak, and every failure must be found again in the log.
        catch (Exception error)
#pragma warning restore CA1031
        {
            var id = Guid.NewGuid().ToString("N");
            LogInternal(logger, error, context.Method, id);
            throw new RpcException(new Status(StatusCode.Internal, $"Internal error {id}; no verdict was given. The service's log has the details under this id."));
        }
    }

    private static StatusCode CodeOf(StoreTrouble trouble) => trouble switch
    {
        StoreTrouble.Damaged => StatusCode.DataLoss,
        StoreTrouble.Full => StatusCode.ResourceExhausted,
        StoreTrouble.NewerSchema or StoreTrouble.NotAllowed => StatusCode.FailedPrecondition,
        _ => StatusCode.Unavailable,
    };

    [LoggerMessage(EventId = 500, Level = LogLevel.Error, Message = "{Method} failed; error id {Id}")]
    private static partial void LogInternal(ILogger logger, Exception error, string method, string id);

    [LoggerMessage(EventId = 501, Level = LogLevel.Error, Message = "{Method}: trouble with the records ({Trouble}). {Reason}")]
    private static partial void LogRecords(ILogger logger, string method, StoreTrouble trouble, string reason);

    [LoggerMessage(EventId = 502, Level = LogLevel.Warning, Message = "{Method} was not answered. {Reason}")]
    private static partial void LogUnavailable(ILogger logger, string method, string reason);
}

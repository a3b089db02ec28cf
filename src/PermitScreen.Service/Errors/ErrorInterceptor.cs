using Grpc.Core;
using Grpc.Core.Interceptors;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Service.Errors;

/// <summary>Turns what escapes an endpoint into a status: cancellation and deadlines as such, anything else as INTERNAL with an id that the log has too.</summary>
/// <param name="logger">Log.</param>
public sealed partial class ErrorInterceptor(ILogger<ErrorInterceptor> logger) : Interceptor
{
    /// <inheritdoc/>
    public override async Task<TResponse> UnaryServerHandler<TRequest, TResponse>(
        TRequest request, ServerCallContext context, UnaryServerMethod<TRequest, TResponse> continuation)
    {
        try
        {
            return await continuation(request, context);
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
            throw new RpcException(new Status(StatusCode.Unavailable, $"{error.Message} No verdict was given; the service's log says why."));
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

    [LoggerMessage(EventId = 500, Level = LogLevel.Error, Message = "{Method} failed; error id {Id}")]
    private static partial void LogInternal(ILogger logger, Exception error, string method, string id);
}

using Google.Rpc;
using Grpc.Core;

namespace PermitScreen.Cli.Printing;

/// <summary>Prints what a service refused, field by field.</summary>
internal static class ErrorPrinter
{
    /// <summary>Prints an error, and tells its exit code.</summary>
    /// <param name="error">Error of a call.</param>
    public static async Task<int> PrintAsync(RpcException error)
    {
        var status = error.GetRpcStatus();
        if (status?.GetDetail<BadRequest>() is { } details)
        {
            await Console.Error.WriteLineAsync(FormattableString.Invariant($"Not valid, {details.FieldViolations.Count} faults:"));
            foreach (var violation in details.FieldViolations)
            {
                await Console.Error.WriteLineAsync($"  {violation.Field}: {violation.Description}");
            }

            return ExitCodes.BadInput;
        }

        await Console.Error.WriteLineAsync(error.StatusCode switch
        {
            StatusCode.Unavailable when error.Status.DebugException is not null => $"The service cannot be reached: {error.Status.Detail}",
            StatusCode.DeadlineExceeded => "No answer came in time, so no verdict was given and no change is confirmed; --timeout says how long to wait.",
            _ when error.Status.Detail.Length == 0 => $"The call ended with {error.StatusCode}; no verdict was given.",
            _ => error.Status.Detail,
        });
        foreach (var violation in status?.GetDetail<PreconditionFailure>()?.Violations ?? [])
        {
            if (violation.Description != error.Status.Detail)
            {
                await Console.Error.WriteLineAsync($"  {violation.Subject}: {violation.Description}");
            }
        }

        return error.StatusCode switch
        {
            StatusCode.NotFound or StatusCode.FailedPrecondition or StatusCode.InvalidArgument or StatusCode.AlreadyExists or StatusCode.OutOfRange or StatusCode.DataLoss => ExitCodes.BadInput,

            // Somebody else revised it meanwhile; the message names the newer revision.
            StatusCode.Aborted => ExitCodes.NotPassed,
            _ => ExitCodes.NoAnswer,
        };
    }
}

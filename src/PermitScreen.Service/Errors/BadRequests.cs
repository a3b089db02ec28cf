using System.Globalization;
using Google.Rpc;
using Grpc.Core;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Errors;

/// <summary>Errors with <c>google.rpc</c> details: every field violation at once, value found and what is allowed.</summary>
public static class BadRequests
{
    private const int FaultsInMessage = 3;
    private const int MostViolations = 200;

    /// <summary>INVALID_ARGUMENT with one field violation per fault.</summary>
    /// <param name="what">What was wrong, for instance "The application".</param>
    /// <param name="faults">Faults; at least one.</param>
    public static RpcException From(string what, IReadOnlyList<Fault> faults)
    {
        var details = new BadRequest();
        details.FieldViolations.AddRange(faults.Take(MostViolations).Select(f => new BadRequest.Types.FieldViolation { Field = f.Path, Description = f.Message }));
        var more = faults.Count > FaultsInMessage ? FormattableString.Invariant($" (and {faults.Count - FaultsInMessage} more)") : "";
        var message = $"{what} is not valid: {string.Join(" ", faults.Take(FaultsInMessage))}{more}";
        return new Google.Rpc.Status
        {
            Code = (int)Code.InvalidArgument,
            Message = message,
            Details = { Google.Protobuf.WellKnownTypes.Any.Pack(details) },
        }.ToRpcException();
    }

    /// <summary>INVALID_ARGUMENT with one field violation.</summary>
    /// <param name="field">Field.</param>
    /// <param name="message">What was found and what is allowed.</param>
    public static RpcException Of(string field, string message) => From("The request", [new Fault(field, message)]);

    /// <summary>NOT_FOUND, naming the resource.</summary>
    /// <param name="type">Resource type, for instance permitscreen.dev/Structure.</param>
    /// <param name="name">Resource name.</param>
    /// <param name="hint">What the caller can do.</param>
    public static RpcException NotFound(string type, string name, string hint) => new Google.Rpc.Status
    {
        Code = (int)Code.NotFound,
        Message = $"There is no {name}. {hint}".TrimEnd(),
        Details = { Google.Protobuf.WellKnownTypes.Any.Pack(new ResourceInfo { ResourceType = type, ResourceName = name, Description = hint }) },
    }.ToRpcException();

    /// <summary>FAILED_PRECONDITION, naming what stands against the call.</summary>
    /// <param name="subject">Resource name.</param>
    /// <param name="message">What stands against it.</param>
    public static RpcException Precondition(string subject, string message) => new Google.Rpc.Status
    {
        Code = (int)Code.FailedPrecondition,
        Message = message,
        Details =
        {
            Google.Protobuf.WellKnownTypes.Any.Pack(new PreconditionFailure
            {
                Violations = { new PreconditionFailure.Types.Violation { Type = "STATE", Subject = subject, Description = message } },
            }),
        },
    }.ToRpcException();

    /// <summary>ALREADY_EXISTS, naming the resource.</summary>
    /// <param name="type">Resource type.</param>
    /// <param name="name">Resource name.</param>
    /// <param name="message">What is there, and what the caller can do.</param>
    public static RpcException Exists(string type, string name, string message) => new Google.Rpc.Status
    {
        Code = (int)Code.AlreadyExists,
        Message = message,
        Details = { Google.Protobuf.WellKnownTypes.Any.Pack(new ResourceInfo { ResourceType = type, ResourceName = name, Description = message }) },
    }.ToRpcException();

    /// <summary>ABORTED: the change rests on a revision that is not the newest; names the newest one.</summary>
    /// <param name="name">Resource name.</param>
    /// <param name="newest">Its newest revision.</param>
    public static RpcException Outdated(string name, RevisionHead newest) => new Google.Rpc.Status
    {
        Code = (int)Code.Aborted,
        Message = string.Create(
            CultureInfo.InvariantCulture,
            $"{name} was revised in version {newest.FromVersion} by {newest.Provenance.Actor} (\"{newest.Provenance.Reason}\"), etag {newest.Content.Etag}; read it again, compare, and send the change with that etag. Nothing was changed."),
        Details =
        {
            Google.Protobuf.WellKnownTypes.Any.Pack(new ErrorInfo
            {
                Reason = "NEWER_REVISION",
                Domain = "permitscreen.dev",
                Metadata =
                {
                    { "resource", name },
                    { "etag", newest.Content.Etag },
                    { "catalogueVersion", newest.FromVersion.ToString(CultureInfo.InvariantCulture) },
                },
            }),
        },
    }.ToRpcException();

    /// <summary>OUT_OF_RANGE: there is no such catalogue version.</summary>
    /// <param name="field">Field that names it.</param>
    /// <param name="version">Version.</param>
    /// <param name="newest">The newest one.</param>
    public static RpcException NoVersion(string field, long version, long newest) => new Google.Rpc.Status
    {
        Code = (int)Code.OutOfRange,
        Message = FormattableString.Invariant($"{field}: there is no catalogue version {version}; versions go up to {newest}."),
        Details =
        {
            Google.Protobuf.WellKnownTypes.Any.Pack(new BadRequest
            {
                FieldViolations = { new BadRequest.Types.FieldViolation { Field = field, Description = FormattableString.Invariant($"Found {version}; allowed is a version that was published, up to {newest}.") } },
            }),
        },
    }.ToRpcException();
}

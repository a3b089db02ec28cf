using System.CommandLine;
using System.Security.Cryptography;
using Google.Protobuf;
using Grpc.Core;
using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Replaces the records by those of a backup while the service goes on.</summary>
internal static class RestoreCommand
{
    private const int ChunkBytes = 256 * 1024;

    // The service verifies the whole backup before it answers; this is slow reading.
    private const double BytesPerSecond = 1_000_000;

    public static Command Create()
    {
        var file = new Argument<string>("file") { Description = "Backup, as `backup` wrote it." };
        var checkOnly = new Option<bool>("--check-only") { Description = "Verify the backup, and replace nothing." };
        var writing = new WritingOptions();
        var service = new ServiceOptions();
        var command = new Command("restore", "Replace the records by those of a backup, all or nothing, while the service goes on. What is replaced is kept.") { file, checkOnly };
        writing.AddTo(command);
        service.AddRecordsTo(command, makes: true);
        command.SetAction(async (parsed, cancellation) =>
        {
            var path = parsed.GetValue(file)!;
            if (!File.Exists(path))
            {
                throw new BadInputException($"There is no file {path}.");
            }

            var validateOnly = parsed.GetValue(checkOnly);
            var head = new RestoreHead { ChangeReason = validateOnly ? "check only" : writing.Reason(parsed), ValidateOnly = validateOnly };
            var author = writing.Author(parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            if (!validateOnly && await NewestAsync(connection, cancellation) is { } newest)
            {
                head.ReplacedVersion = newest;
            }

            var answer = await SendAsync(connection, path, head, author, cancellation);
            Console.Out.WriteLine(validateOnly
                ? FormattableString.Invariant($"{path} is sound and holds catalogue version {answer.RestoredVersion}. Nothing was replaced.")
                : FormattableString.Invariant($"Restored catalogue version {answer.RestoredVersion} as version {answer.CatalogueVersion}; version {answer.ReplacedVersion}, which it replaces, is kept beside the records as {answer.KeptAs}."));
            return ExitCodes.Passed;
        });
        return command;
    }

    /// <summary>The version that is to be replaced, so that nobody else's change goes with it; null where the records are so damaged that there is none.</summary>
    private static async Task<long?> NewestAsync(ServiceConnection connection, CancellationToken cancellation)
    {
        try
        {
            return (await connection.Maintenance.GetBacklogAsync(new GetBacklogRequest(), connection.Call(cancellation))).Backlog.CatalogueVersion;
        }
        catch (RpcException error) when (error.StatusCode is StatusCode.DataLoss or StatusCode.Unavailable)
        {
            return null;
        }
    }

    private static async Task<RestoreBackupResponse> SendAsync(ServiceConnection connection, string path, RestoreHead head, Author author, CancellationToken cancellation)
    {
        await using var file = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.Read);
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        var options = connection.Call(TimeSpan.FromSeconds(file.Length / BytesPerSecond), cancellation).WithHeaders(author.Metadata());
        using var call = connection.Maintenance.RestoreBackup(options);
        try
        {
            await call.RequestStream.WriteAsync(new RestoreBackupRequest { Head = head }, cancellation);
            var chunk = new byte[ChunkBytes];
            while (await file.ReadAsync(chunk, cancellation) is var count and > 0)
            {
                hash.AppendData(chunk, 0, count);
                await call.RequestStream.WriteAsync(new RestoreBackupRequest { Chunk = ByteString.CopyFrom(chunk, 0, count) }, cancellation);
            }

            await call.RequestStream.WriteAsync(new RestoreBackupRequest { Sha256 = Convert.ToHexStringLower(hash.GetHashAndReset()) }, cancellation);
            await call.RequestStream.CompleteAsync();
        }
        catch (Exception error) when (error is RpcException or InvalidOperationException && !cancellation.IsCancellationRequested)
        {
            // The service refused before it had read everything; its answer says why.
            return await call.ResponseAsync;
        }

        return await call.ResponseAsync;
    }
}

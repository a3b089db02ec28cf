using System.CommandLine;
using System.Security.Cryptography;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Copies the records to a file while the service goes on.</summary>
internal static class BackupCommand
{
    public static Command Create()
    {
        var file = new Argument<string>("file") { Description = "File to write; there must be none." };
        var service = new ServiceOptions();
        var command = new Command("backup", "Copy the records, as of one instant, to a file while the service goes on.") { file };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var path = parsed.GetValue(file)!;
            if (Path.Exists(path))
            {
                throw new BadInputException($"{path} is there already; a backup replaces nothing. Name another file.");
            }

            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            Directory.CreateDirectory(Path.GetDirectoryName(Path.GetFullPath(path))!);
            await using var target = new TemporaryFile(path);
            var head = await ReadAsync(connection, target.Stream, cancellation);
            target.Keep(overwrite: false, toDisk: true);
            Console.Out.WriteLine(FormattableString.Invariant($"{path}: {Numbers.Count(head.SizeBytes)} bytes, catalogue version {head.CatalogueVersion}, hash of the audit entry that made it {head.VersionHash}"));
            return ExitCodes.Passed;
        });
        return command;
    }

    private static async Task<BackupHead> ReadAsync(ServiceConnection connection, FileStream target, CancellationToken cancellation)
    {
        BackupHead? head = null;
        var sha256 = "";
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        var messages = Streams.ReadAsync(
            token => connection.Maintenance.ReadBackup(new ReadBackupRequest(), cancellationToken: token), connection.Patience, cancellation);
        await foreach (var message in messages)
        {
            switch (message.PartCase)
            {
                case ReadBackupResponse.PartOneofCase.Head:
                    head = message.Head;
                    break;
                case ReadBackupResponse.PartOneofCase.Chunk:
                    hash.AppendData(message.Chunk.Span);
                    await target.WriteAsync(message.Chunk.Memory, cancellation);
                    break;
                case ReadBackupResponse.PartOneofCase.Sha256:
                    sha256 = message.Sha256;
                    break;
                default:
                    break;
            }
        }

        var found = Convert.ToHexStringLower(hash.GetHashAndReset());
        return head is not null && target.Length == head.SizeBytes && string.Equals(sha256, found, StringComparison.OrdinalIgnoreCase)
            ? head
            : throw new BadInputException(FormattableString.Invariant($"The backup did not arrive whole: {target.Length} of {head?.SizeBytes ?? 0} bytes, SHA-256 {found}, announced {sha256}. Nothing was written; run it again."));
    }
}

using Grpc.Core;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Importing;

/// <summary>One import: begun, or gone on with where the same files were broken off; staged piece by piece; published at once.</summary>
/// <param name="connection">Connection.</param>
/// <param name="source">What is imported.</param>
/// <param name="settings">How.</param>
/// <param name="tell">Takes words for people.</param>
internal sealed class ImportRun(ServiceConnection connection, Source source, ImportSettings settings, Action<string> tell)
{
    // Publishing writes every item in one transaction: a few hundred a second on a slow disk.
    private static readonly TimeSpan PublishingOfOneItem = TimeSpan.FromMilliseconds(10);
    private readonly Refusals _refusals = new();

    /// <summary>What was refused.</summary>
    public Refusals Refused => _refusals;

    /// <summary>Stages all and publishes it.</summary>
    /// <param name="cancellation">Breaks off; what was staged stays.</param>
    /// <returns>The import in its last state: PUBLISHED, or else not published because items were refused.</returns>
    public async Task<Import> RunAsync(CancellationToken cancellation)
    {
        var import = await FindUnfinishedAsync(cancellation) ?? await BeginAsync(cancellation);
        try
        {
            var (pieces, last) = await StageAsync(import, cancellation);
            import = last;
            if (settings.AllowPartial || (_refusals.Unreadable == 0 && import.RefusedCount == 0))
            {
                import = await PublishAsync(import, pieces, cancellation);
            }
        }
        catch (Exception error) when (error is BadInputException or RpcException { StatusCode: StatusCode.FailedPrecondition })
        {
            // It can never be published.
            await GiveUpAsync(import, cancellation);
            throw;
        }

        await _refusals.AddAsync(connection, import, cancellation);
        return import.State == ImportState.Published ? import : await GiveUpAsync(import, cancellation);
    }

    // Where other pieces were cut, or what is refused counts differently, it is another import.
    private string Fingerprint => FormattableString.Invariant($"sha256:{source.Fingerprint};pieces={settings.ItemsPerPiece}");

    private async Task<Import?> FindUnfinishedAsync(CancellationToken cancellation)
    {
        var request = new ListImportsRequest { PageSize = Listings.LargestPage, State = ImportState.Staging };
        do
        {
            var page = await connection.Imports.ListImportsAsync(request, connection.Call(cancellation));
            if (page.Imports.FirstOrDefault(i => i.SourceFingerprint == Fingerprint && i.AllowPartial == settings.AllowPartial) is { } found)
            {
                tell($"Going on with {found.Name} from item {Numbers.Count(found.StagedCount + found.RefusedCount)} of {Numbers.Count(source.ItemCount)}; begun by {found.Actor} for \"{found.Reason}\".");
                return found;
            }

            request.PageToken = page.NextPageToken;
        }
        while (request.PageToken.Length > 0);
        return null;
    }

    private async Task<Import> BeginAsync(CancellationToken cancellation)
    {
        // The id is chosen here, so that a retry finds what was begun.
        var now = TimeProvider.System.GetUtcNow();
        var request = new CreateImportRequest
        {
            ImportId = FormattableString.Invariant($"{now:yyyyMMdd-HHmmss}-{Guid.NewGuid().ToString("N")[..8]}"),
            SourceFingerprint = Fingerprint,
            AllowPartial = settings.AllowPartial,
            ChangeReason = settings.Reason,
        };
        return (await connection.WriteAsync(settings.Author, o => connection.Imports.CreateImportAsync(request, o), cancellation)).Import;
    }

    private Task<(int Pieces, Import Last)> StageAsync(Import import, CancellationToken cancellation) =>
        ProgressDisplay.RunAsync("Importing", "items", source.ItemCount, async progress =>
        {
            var (pieces, last) = (0, import);
            foreach (var piece in Pieces.Of(SourceItems.Of(source), settings.ItemsPerPiece, _refusals.Add))
            {
                cancellation.ThrowIfCancellationRequested();
                pieces++;
                if (piece.Request.PieceIndex < import.NextPieceIndex)
                {
                    progress.StartAt(piece.ItemsSoFar);
                    continue;
                }

                piece.Request.Name = import.Name;
                last = (await Retries.CallAsync(() => StageAsync(piece.Request, cancellation), connection.Patience, progress.Tell, cancellation)).Import;
                progress.Report(piece.ItemsSoFar);
            }

            return (pieces, last);
        });

    private Task<StageImportPieceResponse> StageAsync(StageImportPieceRequest request, CancellationToken cancellation) =>
        connection.Imports.StageImportPieceAsync(request, connection.Call(cancellation).WithHeaders(settings.Author.Metadata())).ResponseAsync;

    private async Task<Import> PublishAsync(Import import, int pieces, CancellationToken cancellation)
    {
        var request = new PublishImportRequest { Name = import.Name, PieceCount = pieces };
        try
        {
            var answer = await Retries.CallAsync(
                () => connection.Imports.PublishImportAsync(request, connection.Call(source.ItemCount * PublishingOfOneItem, cancellation).WithHeaders(settings.Author.Metadata())).ResponseAsync,
                connection.Patience,
                Console.Error.WriteLine,
                cancellation);
            return answer.Import;
        }
        catch (RpcException error) when (error.StatusCode == StatusCode.FailedPrecondition)
        {
            // Items that stand in it twice, or that others revised meanwhile, are found only now; they are among the refusals then.
            var now = (await connection.Imports.GetImportAsync(new GetImportRequest { Name = import.Name }, connection.Call(cancellation))).Import;
            if (now.RefusedCount == 0)
            {
                throw;
            }

            tell(error.Status.Detail);
            return now;
        }
    }

    private async Task<Import> GiveUpAsync(Import import, CancellationToken cancellation) => settings.Keep
        ? import
        : (await connection.WriteAsync(settings.Author, o => connection.Imports.CancelImportAsync(new CancelImportRequest { Name = import.Name }, o), cancellation)).Import;
}

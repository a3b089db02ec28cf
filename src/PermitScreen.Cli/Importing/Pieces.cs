using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Importing;

/// <summary>
/// Cuts items into pieces, by number and by size. The same items are always cut the same way, so that an import that was broken off can go on
/// with the piece that comes next.
/// </summary>
internal static class Pieces
{
    /// <summary>Most items of a piece that the service takes.</summary>
    public const int MostItems = 2000;

    /// <summary>Most bytes of a piece: below the 4 MiB that a gRPC server takes by default, with room for what goes around it.</summary>
    private const int MostBytes = 3_500_000;

    /// <summary>Every piece, in order.</summary>
    /// <param name="items">Items.</param>
    /// <param name="itemsPerPiece">Most items of a piece.</param>
    /// <param name="refused">Told of each item that cannot be read; such an item is in no piece.</param>
    public static IEnumerable<Piece> Of(IEnumerable<SourceItem> items, int itemsPerPiece, Action<SourceItem> refused)
    {
        var piece = new List<SourceItem>();
        var (bytes, seen, index) = (0, 0, 0);
        foreach (var item in items)
        {
            if (item.Faults.Length > 0)
            {
                refused(item);
                seen += item.Counted;
                continue;
            }

            var size = item.SizeBytes;
            if (piece.Count == itemsPerPiece || (piece.Count > 0 && bytes + size > MostBytes))
            {
                yield return new Piece(RequestOf(piece, index), seen);
                piece.Clear();
                (bytes, index) = (0, index + 1);
            }

            piece.Add(item);
            bytes += size;
            seen++;
        }

        if (piece.Count > 0)
        {
            yield return new Piece(RequestOf(piece, index), seen);
        }
    }

    private static StageImportPieceRequest RequestOf(IReadOnlyList<SourceItem> items, int index)
    {
        var request = new StageImportPieceRequest { PieceIndex = index };
        var structures = items.Where(i => i.Structure is not null).ToList();
        var policies = items.Where(i => i.Policy is not null).ToList();
        request.Structures.AddRange(structures.Select(i => i.Structure));
        request.Policies.AddRange(policies.Select(i => i.Policy));
        request.Origins.AddRange(structures.Concat(policies).Select(i => i.Origin));
        return request;
    }
}

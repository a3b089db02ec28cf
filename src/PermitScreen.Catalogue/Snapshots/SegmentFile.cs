using System.Buffers.Binary;
using System.Globalization;
using System.Text;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>
/// A disposable copy of a snapshot in a file, so that a start need not read the whole database. A header, blocks of about 1 MB, an end mark, each
/// with a SHA-256; nothing of a file is used before all of it was found whole. What does not fit is refused, and the database is read instead.
/// </summary>
public static class SegmentFile
{
    private const int BlockBytes = 1 << 20;

    /// <summary>Writes a snapshot: to a file beside it first, so that there is a whole file or none.</summary>
    /// <param name="path">File.</param>
    /// <param name="snapshot">Snapshot; whole and true.</param>
    /// <param name="cancellation">Ends the writing; the file is then as it was.</param>
    /// <exception cref="IOException">It cannot be written.</exception>
    /// <exception cref="UnauthorizedAccessException">It may not be written.</exception>
    public static void Write(string path, CatalogueSnapshot snapshot, CancellationToken cancellation)
    {
        var beside = path + ".tmp";
        try
        {
            using (var file = new FileStream(beside, FileMode.Create, FileAccess.Write, FileShare.None))
            {
                Write(file, snapshot, cancellation);
                file.Flush(flushToDisk: true);
            }

            // The folder itself is not flushed: after a power cut the older file, or none, is as good.
            File.Move(beside, path, overwrite: true);
        }
        finally
        {
            File.Delete(beside);
        }
    }

    /// <summary>Reads a file.</summary>
    /// <param name="path">File.</param>
    /// <param name="progress">Takes the number of revisions read.</param>
    /// <param name="refusal">Why the file is not used; null where it is, and where there is none.</param>
    /// <param name="cancellation">Ends the reading.</param>
    /// <returns>The content; null where there is no file, or one that is refused.</returns>
    public static SegmentContent? TryRead(string path, IProgress<long>? progress, out string? refusal, CancellationToken cancellation)
    {
        refusal = null;
        if (!File.Exists(path))
        {
            return null;
        }

        try
        {
            using var file = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.Read | FileShare.Delete, BlockBytes, FileOptions.SequentialScan);
            return TryRead(file, progress, out refusal, cancellation);
        }
        catch (Exception trouble) when (trouble is IOException or UnauthorizedAccessException)
        {
            refusal = $"it cannot be read: {trouble.Message}";
            return null;
        }
    }

    private static void Write(FileStream file, CatalogueSnapshot snapshot, CancellationToken cancellation)
    {
        var header = new SegmentHeader(snapshot.Stamp, snapshot.Count, snapshot.Policies.Count).ToArray();
        var headerSum = header.AsSpan(header.Length - Digest.Length).ToArray();
        file.Write(header);
        using var block = new MemoryStream();
        using var writer = new BinaryWriter(block);
        var blocks = 0;
        foreach (var revision in snapshot.StructuresAfter().Select(s => s.Revision).Concat(snapshot.Policies.Values.Select(p => p.Revision)))
        {
            cancellation.ThrowIfCancellationRequested();
            SegmentBlock.Write(writer, revision);
            if (block.Length >= BlockBytes)
            {
                WriteBlock();
            }
        }

        if (block.Length > 0)
        {
            WriteBlock();
        }

        WriteEnd(file, headerSum, blocks, snapshot.Count + (long)snapshot.Policies.Count);

        void WriteBlock()
        {
            var payload = block.GetBuffer().AsSpan(0, (int)block.Length);
            using (var to = new BinaryWriter(file, Encoding.UTF8, leaveOpen: true))
            {
                to.Write(payload.Length);
                to.Write(SegmentBlock.SumOf(headerSum, blocks, payload).ToArray());
                to.Write(payload);
            }

            block.SetLength(0);
            blocks++;
        }
    }

    /// <summary>A block of length 0, then how much came before it.</summary>
    private static void WriteEnd(FileStream file, byte[] headerSum, int blocks, long revisions)
    {
        using var end = new BinaryWriter(file, Encoding.UTF8, leaveOpen: true);
        end.Write(0);
        end.Write(revisions);
        var total = new byte[sizeof(long)];
        BinaryPrimitives.WriteInt64LittleEndian(total, revisions);
        end.Write(SegmentBlock.SumOf(headerSum, blocks, total).ToArray());
    }

    private static SegmentContent? TryRead(FileStream file, IProgress<long>? progress, out string? refusal, CancellationToken cancellation)
    {
        var start = new byte[SegmentHeader.Length];
        if (SegmentHeader.TryRead(start.AsSpan(0, file.ReadAtLeast(start, start.Length, throwOnEndOfStream: false)), out refusal) is not { } header)
        {
            return null;
        }

        var headerSum = start.AsSpan(start.Length - Digest.Length).ToArray();
        var revisions = new List<StoredRevision>();
        var payload = Array.Empty<byte>();
        var lead = new byte[sizeof(int) + Digest.Length];
        for (var blocks = 0; ; blocks++)
        {
            cancellation.ThrowIfCancellationRequested();
            if (file.ReadAtLeast(lead.AsSpan(0, sizeof(int)), sizeof(int), throwOnEndOfStream: false) < sizeof(int))
            {
                refusal = "its end is missing";
                return null;
            }

            var length = BinaryPrimitives.ReadInt32LittleEndian(lead);
            if (length == 0)
            {
                refusal = EndRefusal(file, headerSum, blocks, revisions.Count) ?? ContentRefusal(header, revisions);
                return refusal is null ? new SegmentContent(header.Stamp, [.. revisions]) : null;
            }

            if (length < 0 || length > file.Length - file.Position - Digest.Length)
            {
                refusal = string.Create(CultureInfo.InvariantCulture, $"block {blocks} is damaged, or its end is missing");
                return null;
            }

            payload = payload.Length < length ? new byte[length] : payload;
            file.ReadExactly(lead.AsSpan(sizeof(int)));
            file.ReadExactly(payload.AsSpan(0, length));
            if (SegmentBlock.SumOf(headerSum, blocks, payload.AsSpan(0, length)) != new Digest(lead.AsSpan(sizeof(int)))
                || !SegmentBlock.TryRead(payload.AsSpan(0, length), revisions))
            {
                refusal = string.Create(CultureInfo.InvariantCulture, $"block {blocks} is damaged");
                return null;
            }

            progress?.Report(revisions.Count);
        }
    }

    private static string? EndRefusal(FileStream file, byte[] headerSum, int blocks, long revisions)
    {
        var end = new byte[sizeof(long) + Digest.Length + 1];
        var read = file.ReadAtLeast(end, end.Length, throwOnEndOfStream: false);
        return read == end.Length - 1
            && BinaryPrimitives.ReadInt64LittleEndian(end) == revisions
            && SegmentBlock.SumOf(headerSum, blocks, end.AsSpan(0, sizeof(long))) == new Digest(end.AsSpan(sizeof(long), Digest.Length))
            ? null
            : "its end is damaged";
    }

    private static string? ContentRefusal(SegmentHeader header, List<StoredRevision> revisions)
    {
        var sum = default(StateSum);
        for (var i = 0; i < revisions.Count; i++)
        {
            var head = revisions[i].Head;
            sum = sum.With(head);
            if (i > 0 && (revisions[i - 1].Head.Kind, string.CompareOrdinal(revisions[i - 1].Head.Name, head.Name)) is var (kind, order)
                && (kind > head.Kind || (kind == head.Kind && order >= 0)))
            {
                return "its revisions are out of order";
            }
        }

        return sum == header.Stamp.State
            && revisions.Count(r => r.Head.Kind == ResourceKind.Structure) == header.Structures
            && revisions.Count(r => r.Head.Kind == ResourceKind.Policy) == header.Policies
            ? null
            : "its revisions do not add up to its version";
    }
}

using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Writes and reads revisions in the blocks of a segment file.</summary>
internal static class SegmentBlock
{
    private const long NoEnd = -1;

    /// <summary>The checksum of a block: over its file's header and its place too, so that no block stands in for another.</summary>
    /// <param name="headerSum">Checksum of the header.</param>
    /// <param name="index">Index of the block.</param>
    /// <param name="payload">Bytes of the block.</param>
    public static Digest SumOf(ReadOnlySpan<byte> headerSum, int index, ReadOnlySpan<byte> payload)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hash.AppendData(headerSum);
        Span<byte> place = stackalloc byte[sizeof(int)];
        BinaryPrimitives.WriteInt32LittleEndian(place, index);
        hash.AppendData(place);
        hash.AppendData(payload);
        return new Digest(hash.GetHashAndReset());
    }

    public static void Write(BinaryWriter writer, StoredRevision revision)
    {
        var head = revision.Head;
        writer.Write((byte)head.Kind);
        Write(writer, head.Name);
        writer.Write(head.FromVersion);
        writer.Write(head.ToVersion ?? NoEnd);
        writer.Write(head.Content.ToArray());
        Write(writer, head.Provenance.Actor);
        Write(writer, head.Provenance.Reason);
        writer.Write(head.Provenance.Instant.UtcTicks);
        writer.Write(revision.Content.Length);
        writer.Write(revision.Content.Span);
    }

    /// <summary>Reads a block whose checksum fits; false where its content does not make sense all the same.</summary>
    /// <param name="payload">Bytes of the block.</param>
    /// <param name="revisions">Takes the revisions, copied.</param>
    public static bool TryRead(ReadOnlySpan<byte> payload, ICollection<StoredRevision> revisions)
    {
        var reader = new ByteReader(payload);
        while (!reader.Failed && !reader.Complete)
        {
            var kind = (ResourceKind)reader.Byte();
            var name = reader.Text();
            var (from, to, hash) = (reader.Long(), reader.Long(), reader.Digest());
            var (actor, reason, ticks) = (reader.Text(), reader.Text(), reader.Long());
            var content = reader.Bytes().ToArray();
            if (reader.Require(
                kind is ResourceKind.Structure or ResourceKind.Policy
                && ticks >= DateTime.MinValue.Ticks && ticks <= DateTime.MaxValue.Ticks
                && Digest.Of(content) == hash))
            {
                var provenance = new Provenance(actor, reason, new DateTimeOffset(ticks, TimeSpan.Zero));
                revisions.Add(new StoredRevision(new RevisionHead(kind, name, from, to == NoEnd ? null : to, hash, provenance), content));
            }
        }

        return reader.Complete;
    }

    private static void Write(BinaryWriter writer, string text)
    {
        var bytes = Encoding.UTF8.GetBytes(text);
        writer.Write(bytes.Length);
        writer.Write(bytes);
    }
}

using System.Security.Cryptography;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>First bytes of a segment file.</summary>
/// <param name="Stamp">Version that the file is a copy of.</param>
/// <param name="Structures">Number of structures.</param>
/// <param name="Policies">Number of policy documents.</param>
internal sealed record SegmentHeader(VersionStamp Stamp, long Structures, long Policies)
{
    private const int FormatVersion = 1;
    private const int GuidLength = 16;

    /// <summary>Bytes of a header, its checksum included.</summary>
    public const int Length = 8 + sizeof(int) + GuidLength + sizeof(long) + StateSum.Length + (2 * sizeof(long)) + Digest.Length;

    private static ReadOnlySpan<byte> Magic => "PSSEGMT\n"u8;

    /// <summary>The bytes; the last <see cref="Digest.Length"/> are the checksum of the others.</summary>
    public byte[] ToArray()
    {
        using var stream = new MemoryStream(Length);
        using var writer = new BinaryWriter(stream);
        writer.Write(Magic);
        writer.Write(FormatVersion);
        writer.Write(Stamp.Timeline.ToByteArray());
        writer.Write(Stamp.Version);
        writer.Write(Stamp.State.ToArray());
        writer.Write(Structures);
        writer.Write(Policies);
        writer.Write(SHA256.HashData(stream.ToArray()));
        return stream.ToArray();
    }

    /// <summary>The header of bytes; null with the reason where they are none.</summary>
    /// <param name="bytes">Bytes.</param>
    /// <param name="refusal">Why not.</param>
    public static SegmentHeader? TryRead(ReadOnlySpan<byte> bytes, out string? refusal)
    {
        refusal = null;
        if (bytes.Length < Length || !bytes.StartsWith(Magic))
        {
            refusal = "it is not a segment file";
            return null;
        }

        if (!SHA256.HashData(bytes[..(Length - Digest.Length)]).AsSpan().SequenceEqual(bytes[(Length - Digest.Length)..Length]))
        {
            refusal = "its header is damaged";
            return null;
        }

        var reader = new ByteReader(bytes[Magic.Length..]);
        if (reader.Whole() != FormatVersion)
        {
            refusal = "it was written by another version of this program";
            return null;
        }

        var timeline = new Guid(reader.Take(GuidLength));
        var version = reader.Long();
        var state = new StateSum(reader.Take(StateSum.Length));
        return new SegmentHeader(new VersionStamp(timeline, version, state), reader.Long(), reader.Long());
    }
}

using System.Security.Cryptography;
using System.Text;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>
/// The kept form of a canonical truss's lines: by position only, so that names live in the revision alone. Little-endian; numbers as IEEE 754 bits;
/// SHA-256 over everything at the end.
/// </summary>
public static class LineBlob
{
    private const int FormatVersion = 1;
    private const int HoldsX = 1;
    private const int HoldsY = 2;

    private static ReadOnlySpan<byte> Magic => "PSLINES\n"u8;

    /// <summary>The bytes to be kept.</summary>
    /// <param name="key">Address of the lines.</param>
    /// <param name="lines">Lines of the truss in canonical order.</param>
    public static byte[] Encode(Digest key, TrussLines lines)
    {
        using var stream = new MemoryStream();
        using var writer = new BinaryWriter(stream, Encoding.UTF8, leaveOpen: true);
        writer.Write(Magic);
        writer.Write(FormatVersion);
        var version = Encoding.UTF8.GetBytes(TrussKey.MechanicsVersion);
        writer.Write(version.Length);
        writer.Write(version);
        writer.Write(key.ToArray());
        writer.Write(lines.Quality.LargestResidual);
        writer.Write(lines.Quality.LargestEquilibriumError);
        writer.Write(lines.Quality.LargestCorrection);
        writer.Write(lines.MemberCount);
        writer.Write(lines.SupportCount);
        for (var m = 0; m < lines.MemberCount; m++)
        {
            Write(writer, lines.Axial(m));
        }

        for (var s = 0; s < lines.SupportCount; s++)
        {
            var (x, y) = (lines.ReactionX(s), lines.ReactionY(s));
            writer.Write((x is null ? 0 : HoldsX) + (y is null ? 0 : HoldsY));
            Write(writer, x);
            Write(writer, y);
        }

        writer.Flush();
        writer.Write(SHA256.HashData(stream.GetBuffer().AsSpan(0, (int)stream.Length)));
        writer.Flush();
        return stream.ToArray();
    }

    /// <summary>The lines, equal to the bit to those that were encoded; null where anything does not fit: another key, version, length or checksum.</summary>
    /// <param name="key">Address under which the blob was found.</param>
    /// <param name="blob">Any bytes.</param>
    public static TrussLines? Decode(Digest key, ReadOnlySpan<byte> blob)
    {
        if (blob.Length < Digest.Length || !SHA256.HashData(blob[..^Digest.Length]).AsSpan().SequenceEqual(blob[^Digest.Length..]))
        {
            return null;
        }

        var reader = new ByteReader(blob[..^Digest.Length]);
        if (!reader.Expect(Magic)
            || !reader.Require(reader.Whole() == FormatVersion)
            || !reader.Require(reader.Text() == TrussKey.MechanicsVersion)
            || !reader.Require(reader.Digest() == key))
        {
            return null;
        }

        var quality = new SolveQuality(reader.Number(), reader.Number(), reader.Number());
        var (members, supports) = (reader.Whole(), reader.Whole());
        List<InfluenceLine> axial = [];
        List<InfluenceLine?> reactionX = [], reactionY = [];
        for (var m = 0; m < members && !reader.Failed; m++)
        {
            if (Line(ref reader) is { } line)
            {
                axial.Add(line);
            }
        }

        for (var s = 0; s < supports && !reader.Failed; s++)
        {
            var holds = reader.Whole();
            reactionX.Add((holds & HoldsX) != 0 ? Line(ref reader) : null);
            reactionY.Add((holds & HoldsY) != 0 ? Line(ref reader) : null);
        }

        return !reader.Complete || axial.Count != members || reactionX.Count != supports
            ? null
            : TrussLines.Restore(axial, reactionX, reactionY, quality);
    }

    private static InfluenceLine? Line(ref ByteReader reader)
    {
        var count = reader.Whole();
        var maxAbsSlope = reader.Number();
        if (!reader.Require(count >= 0 && count <= reader.Left / (3 * sizeof(double))))
        {
            return null;
        }

        var line = InfluenceLine.TryRestore(Numbers(ref reader, count), Numbers(ref reader, count), Numbers(ref reader, count), maxAbsSlope);
        reader.Require(line is not null);
        return line;
    }

    private static double[] Numbers(ref ByteReader reader, int count)
    {
        var numbers = new double[count];
        for (var i = 0; i < count; i++)
        {
            numbers[i] = reader.Number();
        }

        return numbers;
    }

    private static void Write(BinaryWriter writer, InfluenceLine? line)
    {
        if (line is null)
        {
            return;
        }

        writer.Write(line.Count);
        writer.Write(line.MaxAbsSlope);
        foreach (var x in line.XM)
        {
            writer.Write(x);
        }

        foreach (var ordinate in line.LeftOrdinates)
        {
            writer.Write(ordinate);
        }

        foreach (var ordinate in line.RightOrdinates)
        {
            writer.Write(ordinate);
        }
    }
}

using System.Security.Cryptography;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Catalogue.Tests.Support;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Tests.Lines;

public sealed class LineBlobTests
{
    [Fact]
    public void What_is_decoded_is_what_was_encoded_to_the_bit()
    {
        var random = new Random(20260811);
        for (var i = 0; i < 100; i++)
        {
            var (key, lines, blob) = Blob(random);
            var decoded = LineBlob.Decode(key, blob);
            Assert.NotNull(decoded);
            LineBits.AssertSame(lines, decoded);
            Assert.Equal(blob, LineBlob.Encode(key, decoded));
        }
    }

    [Fact]
    public void Every_flipped_bit_of_a_blob_is_noticed()
    {
        var (key, _, blob) = Blob(new Random(20260812));
        for (var bit = 0; bit < blob.Length * 8; bit++)
        {
            AssertNoticed(key, blob, bit);
        }

        Figures.Note("lines.blob_flips[all bits of one blob]", blob.Length * 8);
    }

    [Fact]
    public void Flipped_bits_of_other_blobs_are_noticed()
    {
        var random = new Random(20260813);
        var flips = 0;
        for (var i = 0; i < 40; i++)
        {
            var (key, _, blob) = Blob(random);
            for (var n = 0; n < 100; n++, flips++)
            {
                AssertNoticed(key, blob, random.Next(blob.Length * 8));
            }
        }

        Figures.Note("lines.blob_flips[sampled in others]", flips);
    }

    [Fact]
    public void Another_key_or_length_is_noticed()
    {
        var random = new Random(20260814);
        var (key, _, blob) = Blob(random);
        Assert.Null(LineBlob.Decode(Digest.Of([1]), blob));
        Assert.Null(LineBlob.Decode(key, [.. blob, 0]));
        for (var length = 0; length < blob.Length; length++)
        {
            Assert.Null(LineBlob.Decode(key, blob.AsSpan(0, length)));
        }
    }

    /// <summary>Bytes with a checksum that fits, and nonsense under it: what a checksum cannot notice must not throw, nor be taken for lines that are no lines.</summary>
    [Fact]
    public void Nonsense_under_a_sound_checksum_never_throws()
    {
        var random = new Random(20260815);
        var refused = 0;
        for (var i = 0; i < 5_000; i++)
        {
            var (key, _, blob) = i % 500 == 0 ? _last = Blob(random) : _last;
            var changed = blob[..^Digest.Length];
            for (var n = random.Next(1, 4); n > 0; n--)
            {
                changed[random.Next(changed.Length)] = (byte)random.Next(256);
            }

            changed = random.Next(4) == 0 ? changed[..random.Next(changed.Length)] : changed;
            refused += LineBlob.Decode(key, [.. changed, .. SHA256.HashData(changed)]) is null ? 1 : 0;
        }

        Figures.Note("lines.blob_flips[nonsense under a sound checksum, refused of 5000]", refused);
        Assert.True(refused > 0);
    }

    private (Digest Key, TrussLines Lines, byte[] Blob) _last;

    private static void AssertNoticed(Digest key, byte[] blob, int bit)
    {
        blob[bit / 8] ^= (byte)(1 << (bit % 8));
        Assert.Null(LineBlob.Decode(key, blob));
        blob[bit / 8] ^= (byte)(1 << (bit % 8));
    }

    private static (Digest Key, TrussLines Lines, byte[] Blob) Blob(Random random)
    {
        var truss = CanonicalTruss.Of(Shuffled.Random(random));
        var lines = TrussLines.TrySolve(truss.Model, new FaultList())!;
        return (truss.Key, lines, LineBlob.Encode(truss.Key, lines));
    }
}

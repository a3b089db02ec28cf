using System.Runtime.InteropServices;
using System.Security.Cryptography;

namespace PermitScreen.Catalogue.Storage;

/// <summary>A SHA-256 value: the address of content, or of lines.</summary>
[StructLayout(LayoutKind.Sequential)]
public readonly record struct Digest
{
    /// <summary>Bytes of a digest.</summary>
    public const int Length = 32;

    private const int EtagDigits = 24;

    private readonly UInt128 _high;
    private readonly UInt128 _low;

    /// <summary>Takes a digest from its bytes.</summary>
    /// <param name="bytes">Bytes; length <see cref="Length"/>.</param>
    /// <exception cref="ArgumentException">The length is another one.</exception>
    public Digest(ReadOnlySpan<byte> bytes)
    {
        if (bytes.Length != Length)
        {
            throw new ArgumentException($"a digest has {Length} bytes; found {bytes.Length}", nameof(bytes));
        }

        _high = System.Buffers.Binary.BinaryPrimitives.ReadUInt128BigEndian(bytes);
        _low = System.Buffers.Binary.BinaryPrimitives.ReadUInt128BigEndian(bytes[16..]);
    }

    /// <summary>First digits, as fingerprint for people and for updates.</summary>
    public string Etag => ToString()[..EtagDigits];

    /// <summary>The digest of bytes.</summary>
    /// <param name="content">Bytes.</param>
    public static Digest Of(ReadOnlySpan<byte> content)
    {
        Span<byte> bytes = stackalloc byte[Length];
        SHA256.HashData(content, bytes);
        return new Digest(bytes);
    }

    /// <summary>The digest of 64 hexadecimal digits.</summary>
    /// <param name="hex">Digits.</param>
    /// <exception cref="FormatException">They are not hexadecimal.</exception>
    public static Digest Parse(string hex) => new(Convert.FromHexString(hex));

    /// <summary>Writes the bytes.</summary>
    /// <param name="target">Target; length at least <see cref="Length"/>.</param>
    public void CopyTo(Span<byte> target)
    {
        System.Buffers.Binary.BinaryPrimitives.WriteUInt128BigEndian(target, _high);
        System.Buffers.Binary.BinaryPrimitives.WriteUInt128BigEndian(target[16..], _low);
    }

    /// <summary>The bytes.</summary>
    public byte[] ToArray()
    {
        var bytes = new byte[Length];
        CopyTo(bytes);
        return bytes;
    }

    /// <summary>Order of the bytes.</summary>
    /// <param name="left">One digest.</param>
    /// <param name="right">Another.</param>
    public static int Compare(Digest left, Digest right) =>
        left._high.CompareTo(right._high) is var high && high != 0 ? high : left._low.CompareTo(right._low);

    /// <summary>64 hexadecimal digits.</summary>
    public override string ToString() => Convert.ToHexStringLower(ToArray());
}

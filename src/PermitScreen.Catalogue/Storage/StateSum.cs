using System.Buffers.Binary;
using System.Runtime.InteropServices;
using System.Security.Cryptography;
using System.Text;

namespace PermitScreen.Catalogue.Storage;

/// <summary>
/// A sum over revisions in any order, so that it can follow each change at the cost of that change: a copy of the catalogue whose sum differs
/// lacks a revision, or has one too many. It guards against accidents; against intent stands the audit chain.
/// </summary>
/// <remarks>Addition modulo 2^64 in four lanes of the SHA-256 of each revision (a multiset hash by addition: Bellare and Micciancio, 1997).</remarks>
[StructLayout(LayoutKind.Sequential)]
public readonly record struct StateSum
{
    /// <summary>Bytes of a sum.</summary>
    public const int Length = 32;

    private readonly ulong _a;
    private readonly ulong _b;
    private readonly ulong _c;
    private readonly ulong _d;

    private StateSum(ulong a, ulong b, ulong c, ulong d) => (_a, _b, _c, _d) = (a, b, c, d);

    /// <summary>Takes a sum from its bytes.</summary>
    /// <param name="bytes">Bytes; length <see cref="Length"/>.</param>
    public StateSum(ReadOnlySpan<byte> bytes)
        : this(
            BinaryPrimitives.ReadUInt64LittleEndian(bytes),
            BinaryPrimitives.ReadUInt64LittleEndian(bytes[8..]),
            BinaryPrimitives.ReadUInt64LittleEndian(bytes[16..]),
            BinaryPrimitives.ReadUInt64LittleEndian(bytes[24..]))
    {
    }

    /// <summary>The sum with one more revision.</summary>
    /// <param name="head">Revision; its end does not count.</param>
    public StateSum With(RevisionHead head)
    {
        var term = TermOf(head);
        return new StateSum(unchecked(_a + term._a), unchecked(_b + term._b), unchecked(_c + term._c), unchecked(_d + term._d));
    }

    /// <summary>The sum with one revision less.</summary>
    /// <param name="head">Revision; its end does not count.</param>
    public StateSum Without(RevisionHead head)
    {
        var term = TermOf(head);
        return new StateSum(unchecked(_a - term._a), unchecked(_b - term._b), unchecked(_c - term._c), unchecked(_d - term._d));
    }

    /// <summary>The bytes.</summary>
    public byte[] ToArray()
    {
        var bytes = new byte[Length];
        BinaryPrimitives.WriteUInt64LittleEndian(bytes, _a);
        BinaryPrimitives.WriteUInt64LittleEndian(bytes.AsSpan(8), _b);
        BinaryPrimitives.WriteUInt64LittleEndian(bytes.AsSpan(16), _c);
        BinaryPrimitives.WriteUInt64LittleEndian(bytes.AsSpan(24), _d);
        return bytes;
    }

    private static StateSum TermOf(RevisionHead head)
    {
        var name = Encoding.UTF8.GetBytes(head.Name);
        var bytes = new byte[1 + sizeof(long) + Digest.Length + name.Length];
        bytes[0] = (byte)head.Kind;
        BinaryPrimitives.WriteInt64LittleEndian(bytes.AsSpan(1), head.FromVersion);
        head.Content.CopyTo(bytes.AsSpan(1 + sizeof(long)));
        name.CopyTo(bytes, 1 + sizeof(long) + Digest.Length);
        return new StateSum(SHA256.HashData(bytes));
    }
}

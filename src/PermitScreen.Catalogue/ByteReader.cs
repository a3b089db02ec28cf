using System.Buffers.Binary;
using System.Runtime.InteropServices;
using System.Text;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue;

/// <summary>Reads kept bytes from their start; once something does not fit it has failed for good, and every later value is nothing. Never throws.</summary>
[StructLayout(LayoutKind.Auto)]
internal ref struct ByteReader(ReadOnlySpan<byte> bytes)
{
    private ReadOnlySpan<byte> _rest = bytes;

    /// <summary>Whether something did not fit.</summary>
    public bool Failed { get; private set; }

    /// <summary>Whether everything was read and fitted.</summary>
    public readonly bool Complete => !Failed && _rest.IsEmpty;

    /// <summary>Bytes not read yet.</summary>
    public readonly int Left => _rest.Length;

    /// <summary>Notes that a value read does not fit.</summary>
    /// <param name="fits">Whether it fits.</param>
    /// <returns>Whether everything fitted so far.</returns>
    public bool Require(bool fits)
    {
        Failed |= !fits;
        return !Failed;
    }

    public bool Expect(ReadOnlySpan<byte> expected) => Require(Take(expected.Length).SequenceEqual(expected));

    public byte Byte() => Take(1) is [var single] ? single : default;

    public int Whole() => Take(sizeof(int)) is { IsEmpty: false } four ? BinaryPrimitives.ReadInt32LittleEndian(four) : 0;

    public long Long() => Take(sizeof(long)) is { IsEmpty: false } eight ? BinaryPrimitives.ReadInt64LittleEndian(eight) : 0;

    public double Number() => Take(sizeof(double)) is { IsEmpty: false } eight ? BinaryPrimitives.ReadDoubleLittleEndian(eight) : 0;

    public Digest Digest() => Take(Storage.Digest.Length) is { IsEmpty: false } all ? new Digest(all) : default;

    /// <summary>Text with its length before it.</summary>
    public string Text() => Encoding.UTF8.GetString(Bytes());

    /// <summary>Bytes with their length before them.</summary>
    public ReadOnlySpan<byte> Bytes() => Take(Whole());

    public ReadOnlySpan<byte> Take(int length)
    {
        if (!Require(length >= 0 && length <= _rest.Length))
        {
            return [];
        }

        var taken = _rest[..length];
        _rest = _rest[length..];
        return taken;
    }
}

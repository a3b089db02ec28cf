using System.Buffers;
using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>
/// The canonical bytes of a row, over which its checksum goes: the table's name, then each column with a tag for its type and the length of its
/// bytes, so that no two rows have the same.
/// </summary>
internal sealed class RowForm
{
    /// <summary>Bytes of a row's checksum.</summary>
    public const int CheckLength = 16;

    private const byte Nothing = 0;
    private const byte Number = 1;
    private const byte Words = 2;
    private const byte Raw = 3;

    private readonly ArrayBufferWriter<byte> _bytes = new(320);

    /// <summary>Begins a row.</summary>
    /// <param name="table">Table.</param>
    public RowForm(string table) => Add(table);

    /// <summary>Adds a number.</summary>
    /// <param name="value">Number or null.</param>
    public RowForm Add(long? value)
    {
        if (value is not { } number)
        {
            return AddNull();
        }

        var target = _bytes.GetSpan(1 + sizeof(long));
        target[0] = Number;
        BinaryPrimitives.WriteInt64LittleEndian(target[1..], number);
        _bytes.Advance(1 + sizeof(long));
        return this;
    }

    /// <summary>Adds text.</summary>
    /// <param name="value">Text or null.</param>
    public RowForm Add(string? value)
    {
        if (value is null)
        {
            return AddNull();
        }

        var length = Encoding.UTF8.GetByteCount(value);
        Encoding.UTF8.GetBytes(value, Block(Words, length));
        _bytes.Advance(length);
        return this;
    }

    /// <summary>Adds bytes.</summary>
    /// <param name="value">Bytes.</param>
    public RowForm Add(ReadOnlySpan<byte> value)
    {
        value.CopyTo(Block(Raw, value.Length));
        _bytes.Advance(value.Length);
        return this;
    }

    /// <summary>Adds a digest.</summary>
    /// <param name="value">Digest.</param>
    public RowForm Add(Digest value)
    {
        value.CopyTo(Block(Raw, Digest.Length));
        _bytes.Advance(Digest.Length);
        return this;
    }

    /// <summary>Adds a digest or nothing.</summary>
    /// <param name="value">Digest or null.</param>
    public RowForm Add(Digest? value) => value is { } digest ? Add(digest) : AddNull();

    /// <summary>Adds who, why and when.</summary>
    /// <param name="value">Provenance.</param>
    public RowForm Add(Provenance value) => Add(value.Actor).Add(value.Reason).Add(Instants.Write(value.Instant));

    /// <summary>The checksum that stands in the row: the first bytes of the SHA-256.</summary>
    public byte[] Check() => SHA256.HashData(_bytes.WrittenSpan)[..CheckLength];

    /// <summary>The whole SHA-256.</summary>
    public Digest Hash() => Digest.Of(_bytes.WrittenSpan);

    /// <summary>The bytes.</summary>
    public ReadOnlySpan<byte> Written => _bytes.WrittenSpan;

    private RowForm AddNull()
    {
        _bytes.GetSpan(1)[0] = Nothing;
        _bytes.Advance(1);
        return this;
    }

    private Span<byte> Block(byte tag, int length)
    {
        var target = _bytes.GetSpan(1 + sizeof(int));
        target[0] = tag;
        BinaryPrimitives.WriteInt32LittleEndian(target[1..], length);
        _bytes.Advance(1 + sizeof(int));
        return _bytes.GetSpan(length);
    }
}

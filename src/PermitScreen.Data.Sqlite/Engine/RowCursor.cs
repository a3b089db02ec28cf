using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Sqlite.Engine;

/// <summary>Rows of a query. A value of another type than the table's is damage, never a guess.</summary>
/// <param name="file">File, for messages.</param>
/// <param name="table">Table, for messages.</param>
/// <param name="reader">Rows.</param>
internal sealed class RowCursor(string file, string table, SqliteDataReader reader) : IDisposable
{
    /// <summary>Goes to the next row.</summary>
    /// <returns>Whether there is one.</returns>
    public bool Next() => reader.Read();

    /// <summary>A number.</summary>
    /// <param name="column">Column.</param>
    public long Whole(int column) => reader.GetValue(column) is long value ? value : throw WrongType(column, "number");

    /// <summary>A number, or null.</summary>
    /// <param name="column">Column.</param>
    public long? WholeOrNull(int column) => reader.IsDBNull(column) ? null : Whole(column);

    /// <summary>A small number.</summary>
    /// <param name="column">Column.</param>
    public int Small(int column) => Whole(column) is var value and >= int.MinValue and <= int.MaxValue ? (int)value : throw WrongType(column, "small number");

    /// <summary>A small number, or null.</summary>
    /// <param name="column">Column.</param>
    public int? SmallOrNull(int column) => reader.IsDBNull(column) ? null : Small(column);

    /// <summary>Text.</summary>
    /// <param name="column">Column.</param>
    public string Text(int column) => reader.GetValue(column) is string value ? value : throw WrongType(column, "text");

    /// <summary>Text, or null.</summary>
    /// <param name="column">Column.</param>
    public string? TextOrNull(int column) => reader.IsDBNull(column) ? null : Text(column);

    /// <summary>Bytes.</summary>
    /// <param name="column">Column.</param>
    public byte[] Bytes(int column) => reader.GetValue(column) is byte[] value ? value : throw WrongType(column, "bytes");

    /// <summary>Bytes of a known length.</summary>
    /// <param name="column">Column.</param>
    /// <param name="length">Length.</param>
    public byte[] Bytes(int column, int length) => Bytes(column) is var value && value.Length == length ? value : throw WrongType(column, FormattableString.Invariant($"{length} bytes"));

    /// <summary>A digest.</summary>
    /// <param name="column">Column.</param>
    public Digest Digest(int column) => new(Bytes(column, Catalogue.Storage.Digest.Length));

    /// <summary>A digest, or null.</summary>
    /// <param name="column">Column.</param>
    public Digest? DigestOrNull(int column) => reader.IsDBNull(column) ? null : Digest(column);

    /// <summary>Who, why and when, in three columns.</summary>
    /// <param name="column">The first of them.</param>
    public Provenance Provenance(int column) => new(Text(column), Text(column + 1), Instant(column + 2));

    /// <summary>An instant.</summary>
    /// <param name="column">Column.</param>
    public DateTimeOffset Instant(int column) => Instants.Read(Whole(column)) ?? throw WrongType(column, "instant");

    /// <summary>Compares the checksum of a row.</summary>
    /// <param name="column">Column of the checksum.</param>
    /// <param name="expected">Checksum over what was read.</param>
    /// <param name="key">Key of the row, for the message.</param>
    /// <exception cref="StoreException">They differ.</exception>
    public void Compare(int column, ReadOnlySpan<byte> expected, string key)
    {
        if (!expected.SequenceEqual(Bytes(column)))
        {
            throw Damaged(key, "the row does not fit its checksum");
        }
    }

    /// <summary>An error that names the table.</summary>
    /// <param name="key">Key of the row.</param>
    /// <param name="what">What does not fit.</param>
    public StoreException Damaged(string key, string what) => StoreErrors.Damaged(file, table, key, what);

    /// <inheritdoc/>
    public void Dispose() => reader.Dispose();

    private StoreException WrongType(int column, string expected) => Damaged($"column {reader.GetName(column)}", $"it holds no {expected}");
}

using System.Buffers;
using System.Text;
using System.Text.Json;

namespace PermitScreen.Cli.Importing;

/// <summary>
/// Splits a catalogue file into its structures while reading it, so that a file of any length needs the memory of one structure.
/// What stands around the structures is gathered as <see cref="Frame"/>: the same file with an empty list.
/// </summary>
/// <param name="file">File.</param>
internal sealed class StructureSplitter(HashingStream file)
{
    /// <summary>Most bytes of one structure, and of what stands around all of them.</summary>
    public const int MostBytes = 64 * 1024 * 1024;

    private const int FirstBufferBytes = 64 * 1024;
    private static readonly JsonReaderOptions Options = new() { MaxDepth = 80 };
    private readonly ArrayBufferWriter<byte> _frame = new();
    private JsonReaderState _state = new(Options);
    private byte[] _buffer = new byte[FirstBufferBytes];
    private int _start;
    private int _end;
    private bool _atEnd;
    private bool _begun;
    private bool _listFollows;
    private bool _inList;

    /// <summary>The file without its structures; whole once <see cref="TryReadNext"/> has returned false.</summary>
    public string Frame => Encoding.UTF8.GetString(_frame.WrittenSpan);

    /// <summary>Reads the next structure.</summary>
    /// <param name="item">Its text, until the next call.</param>
    /// <returns>False at the end of the file.</returns>
    /// <exception cref="JsonException">The file is not JSON.</exception>
    /// <exception cref="InvalidDataException">A structure, or what stands around them, is too large.</exception>
    public bool TryReadNext(out ReadOnlyMemory<byte> item)
    {
        while (true)
        {
            item = default;
            if (_begun && Step(out item))
            {
                return true;
            }

            if (_begun && _atEnd)
            {
                return false;
            }

            Fill();
        }
    }

    /// <summary>Goes through what is in the buffer.</summary>
    /// <returns>Whether a structure was found; if not, the buffer is used up but for a token or structure that is not whole.</returns>
    private bool Step(out ReadOnlyMemory<byte> item)
    {
        var reader = new Utf8JsonReader(_buffer.AsSpan(_start, _end - _start), _atEnd, _state);
        var kept = 0;
        while (true)
        {
            var before = reader;
            if (!reader.Read())
            {
                break;
            }

            if (_inList && reader is { CurrentDepth: 1, TokenType: JsonTokenType.EndArray })
            {
                _inList = false;
                kept = (int)reader.TokenStartIndex;
            }
            else if (_inList)
            {
                var at = (int)reader.TokenStartIndex;
                if (!reader.TrySkip())
                {
                    reader = before;
                    break;
                }

                item = _buffer.AsMemory(_start + at, (int)reader.BytesConsumed - at);
                Commit(reader, kept);
                return true;
            }
            else if (reader is { CurrentDepth: 1, TokenType: JsonTokenType.PropertyName })
            {
                _listFollows = reader.ValueTextEquals("structures"u8);
            }
            else
            {
                if (_listFollows && reader.TokenType == JsonTokenType.StartArray)
                {
                    Keep(kept, (int)reader.BytesConsumed);
                    _inList = true;
                }

                _listFollows = false;
            }
        }

        item = default;
        Commit(reader, kept);
        return false;
    }

    private void Commit(Utf8JsonReader reader, int kept)
    {
        if (!_inList)
        {
            Keep(kept, (int)reader.BytesConsumed);
        }

        _state = reader.CurrentState;
        _start += (int)reader.BytesConsumed;
    }

    private void Keep(int from, int to)
    {
        if (_frame.WrittenCount + to - from > MostBytes)
        {
            throw new InvalidDataException(FormattableString.Invariant($"What stands beside the structures is larger than {MostBytes >> 20} MB."));
        }

        _frame.Write(_buffer.AsSpan(_start + from, to - from));
    }

    private void Fill()
    {
        if (_start > 0)
        {
            _buffer.AsSpan(_start, _end - _start).CopyTo(_buffer);
            (_start, _end) = (0, _end - _start);
        }

        if (_end == _buffer.Length)
        {
            if (_buffer.Length >= MostBytes)
            {
                throw new InvalidDataException(FormattableString.Invariant($"A structure, or a value beside the structures, is larger than {MostBytes >> 20} MB."));
            }

            Array.Resize(ref _buffer, _buffer.Length * 2);
        }

        var count = file.Read(_buffer.AsSpan(_end));
        _end += count;
        _atEnd = count == 0;
        if (!_begun)
        {
            // A byte order mark is no part of the text.
            _begun = true;
            _start = _buffer.AsSpan(0, _end).StartsWith(Encoding.UTF8.Preamble) ? Encoding.UTF8.Preamble.Length : 0;
        }
    }
}

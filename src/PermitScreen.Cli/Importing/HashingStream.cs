using System.Collections.Immutable;
using System.Security.Cryptography;

namespace PermitScreen.Cli.Importing;

/// <summary>A file that is hashed while it is read.</summary>
/// <param name="path">File.</param>
internal sealed class HashingStream(string path) : IDisposable
{
    private const int BufferBytes = 64 * 1024;
    private readonly FileStream _file = new(path, FileMode.Open, FileAccess.Read, FileShare.Read, BufferBytes, FileOptions.SequentialScan);
    private readonly IncrementalHash _hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);

    /// <summary>Reads on.</summary>
    /// <returns>Bytes read; 0 at the end.</returns>
    public int Read(Span<byte> target)
    {
        var count = _file.Read(target);
        _hash.AppendData(target[..count]);
        return count;
    }

    /// <summary>SHA-256 over the whole file; what was not read yet is read now.</summary>
    public ImmutableArray<byte> Finish()
    {
        var rest = new byte[BufferBytes];
        while (Read(rest) > 0)
        {
        }

        return [.. _hash.GetHashAndReset()];
    }

    public void Dispose()
    {
        _hash.Dispose();
        _file.Dispose();
    }
}

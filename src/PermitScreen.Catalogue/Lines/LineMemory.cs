using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>
/// Lines in memory within a bound. Two generations: when the young one is full it becomes the old one, and the old one is let go; what is used
/// moves to the young one. Thread-safe.
/// </summary>
/// <param name="mostBytes">Bound of both generations together, bytes.</param>
internal sealed class LineMemory(long mostBytes)
{
    /// <summary>What a line and its arrays take beside their numbers, bytes, about.</summary>
    private const int PerLine = 200;

    private readonly Lock _gate = new();
    private Dictionary<Digest, (TrussLines Lines, long Bytes)> _young = [];
    private Dictionary<Digest, (TrussLines Lines, long Bytes)> _old = [];
    private long _youngBytes;
    private long _oldBytes;

    /// <summary>Bytes taken, about.</summary>
    public long Bytes
    {
        get
        {
            lock (_gate)
            {
                return _youngBytes + _oldBytes;
            }
        }
    }

    public TrussLines? Find(Digest key)
    {
        lock (_gate)
        {
            if (_young.TryGetValue(key, out var kept))
            {
                return kept.Lines;
            }

            if (!_old.Remove(key, out kept))
            {
                return null;
            }

            _oldBytes -= kept.Bytes;
            AddYoung(key, kept);
            return kept.Lines;
        }
    }

    public void Add(Digest key, TrussLines lines)
    {
        var bytes = SizeOf(lines);
        lock (_gate)
        {
            if (bytes <= mostBytes / 2 && !_young.ContainsKey(key))
            {
                _oldBytes -= _old.Remove(key, out var kept) ? kept.Bytes : 0;
                AddYoung(key, (lines, bytes));
            }
        }
    }

    private void AddYoung(Digest key, (TrussLines Lines, long Bytes) kept)
    {
        if (_youngBytes + kept.Bytes > mostBytes / 2)
        {
            (_old, _oldBytes) = (_young, _youngBytes);
            (_young, _youngBytes) = ([], 0);
        }

        _young.Add(key, kept);
        _youngBytes += kept.Bytes;
    }

    private static long SizeOf(TrussLines lines)
    {
        var bytes = 0L;
        for (var m = 0; m < lines.MemberCount; m++)
        {
            bytes += PerLine + (3L * sizeof(double) * lines.Axial(m).Count);
        }

        for (var s = 0; s < lines.SupportCount; s++)
        {
            bytes += PerLine + (3L * sizeof(double) * ((lines.ReactionX(s)?.Count ?? 0) + (lines.ReactionY(s)?.Count ?? 0)));
        }

        return bytes;
    }
}

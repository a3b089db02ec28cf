using System.Collections.Concurrent;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>
/// The lines of trusses by content, so that structures of one design share them: from memory, else from the store, else computed. What the store
/// has lost or damaged is computed anew; a store that fails costs time and nothing else. Thread-safe; one truss is computed once at a time.
/// </summary>
/// <param name="store">Keeps blobs; null for none.</param>
/// <param name="mostMemoryBytes">Bound of the lines in memory, bytes.</param>
public sealed class LineLibrary(ILineStore? store = null, long mostMemoryBytes = LineLibrary.UsualMemoryBytes) : ILineSource
{
    /// <summary>The usual bound of the lines in memory, bytes.</summary>
    public const long UsualMemoryBytes = 256L << 20;

    private readonly LineMemory _memory = new(mostMemoryBytes);
    private readonly ConcurrentDictionary<Digest, Lazy<TrussLines?>> _underWay = new();
    private long _solved;
    private long _read;
    private long _damaged;
    private long _storeFailures;

    /// <summary>What it did so far.</summary>
    public LineCounts Counts => new(
        Interlocked.Read(ref _solved), Interlocked.Read(ref _read), Interlocked.Read(ref _damaged), Interlocked.Read(ref _storeFailures), _memory.Bytes);

    /// <inheritdoc/>
    public TrussLines? GetOrSolve(TrussModel model, FaultList faults)
    {
        var truss = CanonicalTruss.Of(model);
        var lines = _memory.Find(truss.Key) ?? Once(truss, () => FindKept(truss) ?? SolveAndRemember(truss));
        return lines is null ? Refuse(truss, faults) : lines.Reordered(truss.MemberOrder.AsSpan(), truss.SupportOrder.AsSpan());
    }

    /// <summary>Makes sure that the lines of a truss are kept, or hands out what is to be kept.</summary>
    /// <param name="model">Truss.</param>
    /// <param name="faults">Takes what is wrong, in the truss's own names.</param>
    /// <param name="toKeep">The blob that the caller has to keep; null where a sound one is kept already, or where there are no lines.</param>
    /// <returns>Whether the truss has lines; false with faults where it is a mechanism or cannot be solved accurately.</returns>
    public bool Ensure(TrussModel model, FaultList faults, out (Digest Key, byte[] Blob)? toKeep)
    {
        var truss = CanonicalTruss.Of(model);
        toKeep = null;
        if (Read(truss, out _) is not null)
        {
            return true;
        }

        if ((_memory.Find(truss.Key) ?? Once(truss, () => SolveAndRemember(truss))) is not { } lines)
        {
            Refuse(truss, faults);
            return false;
        }

        toKeep = (truss.Key, LineBlob.Encode(truss.Key, lines));
        return true;
    }

    /// <summary>Computes the lines of a truss anew, whatever is kept; null with faults where it is a mechanism or cannot be solved accurately.</summary>
    /// <param name="model">Truss.</param>
    /// <param name="faults">Takes what is wrong, in the truss's own names.</param>
    public (Digest Key, byte[] Blob)? Compute(TrussModel model, FaultList faults)
    {
        var truss = CanonicalTruss.Of(model);
        if (Solve(truss) is { } lines)
        {
            return (truss.Key, LineBlob.Encode(truss.Key, lines));
        }

        Refuse(truss, faults);
        return null;
    }

    private TrussLines? Once(CanonicalTruss truss, Func<TrussLines?> work)
    {
        // Whoever comes after the work was done and taken off the list finds its result in memory.
        var own = _underWay.GetOrAdd(truss.Key, _ => new Lazy<TrussLines?>(() => _memory.Find(truss.Key) ?? work()));
        try
        {
            return own.Value;
        }
        finally
        {
            _underWay.TryRemove(new KeyValuePair<Digest, Lazy<TrussLines?>>(truss.Key, own));
        }
    }

    private TrussLines? FindKept(CanonicalTruss truss)
    {
        if (Read(truss, out var damaged) is { } lines)
        {
            _memory.Add(truss.Key, lines);
            return lines;
        }

        if (damaged && SolveAndRemember(truss) is { } anew)
        {
            Try(s => s.Keep([(truss.Key, LineBlob.Encode(truss.Key, anew))]));
            return anew;
        }

        return null;
    }

    private TrussLines? Read(CanonicalTruss truss, out bool damaged)
    {
        damaged = false;
        byte[]? blob = null;
        Try(s => blob = s.Find(truss.Key));
        if (blob is null)
        {
            return null;
        }

        if (LineBlob.Decode(truss.Key, blob) is { } lines && Fits(lines, truss.Model))
        {
            Interlocked.Increment(ref _read);
            return lines;
        }

        Interlocked.Increment(ref _damaged);
        damaged = true;
        return null;
    }

    private TrussLines? SolveAndRemember(CanonicalTruss truss)
    {
        var lines = Solve(truss);
        if (lines is not null)
        {
            _memory.Add(truss.Key, lines);
        }

        return lines;
    }

    private TrussLines? Solve(CanonicalTruss truss)
    {
        Interlocked.Increment(ref _solved);
        return TrussLines.TrySolve(truss.Model, new FaultList());
    }

    private static TrussLines? Refuse(CanonicalTruss truss, FaultList faults) =>
        TrussLines.TrySolve(truss.InOwnNames(), faults) is null
            ? null
            : throw new InvalidOperationException("Names do not decide whether a truss has lines.");

    private static bool Fits(TrussLines lines, TrussModel model) =>
        lines.MemberCount == model.Members.Length
        && lines.SupportCount == model.Supports.Length
        && Enumerable.Range(0, lines.SupportCount).All(s =>
            lines.ReactionX(s) is not null == model.Supports[s].HoldsX && lines.ReactionY(s) is not null == model.Supports[s].HoldsY);

    private void Try(Action<ILineStore> use)
    {
        if (store is null)
        {
            return;
        }

        try
        {
            use(store);
        }
        catch (StoreException)
        {
            // A cache: what it cannot give is computed, what it cannot take is computed again.
            Interlocked.Increment(ref _storeFailures);
        }
    }
}

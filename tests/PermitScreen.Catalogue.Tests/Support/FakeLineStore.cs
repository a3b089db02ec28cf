using System.Collections.Concurrent;
using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Tests.Support;

/// <summary>Blobs in memory, which a test may damage, and a store that may be made to fail.</summary>
internal sealed class FakeLineStore : ILineStore
{
    private int _finds;
    private int _keeps;

    internal ConcurrentDictionary<Digest, byte[]> Blobs { get; } = new();

    internal bool Fails { get; set; }

    internal int Finds => _finds;

    internal int Keeps => _keeps;

    public byte[]? Find(Digest key)
    {
        Interlocked.Increment(ref _finds);
        ThrowWhereAsked();
        return Blobs.GetValueOrDefault(key);
    }

    public void Keep(IReadOnlyList<(Digest Key, byte[] Blob)> blobs)
    {
        Interlocked.Increment(ref _keeps);
        ThrowWhereAsked();
        foreach (var (key, blob) in blobs)
        {
            Blobs[key] = blob;
        }
    }

    public IReadOnlySet<Digest> Known(IReadOnlyCollection<Digest> keys) => keys.Where(Blobs.ContainsKey).ToHashSet();

    public IReadOnlyList<Digest> AllKeys() => [.. Blobs.Keys.Order(Comparer<Digest>.Create(Digest.Compare))];

    public long Count() => Blobs.Count;

    public void Delete(ImmutableArray<Digest> keys)
    {
        foreach (var key in keys)
        {
            Blobs.TryRemove(key, out _);
        }
    }

    private void ThrowWhereAsked()
    {
        if (Fails)
        {
            throw new StoreException(StoreTrouble.Device, "The lines cannot be read.");
        }
    }
}

using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Storage;

/// <summary>Keeps blobs of lines by content address. A cache: whatever it loses is computed anew, and it never hands out what it cannot vouch for.</summary>
/// <exception cref="StoreException">Thrown by every member where the cache cannot be read or written.</exception>
public interface ILineStore
{
    /// <summary>The blob as it was kept; null where there is none. The caller checks it (<c>LineBlob</c>).</summary>
    /// <param name="key">Address.</param>
    byte[]? Find(Digest key);

    /// <summary>Keeps blobs, in one transaction; one that is there already is replaced.</summary>
    /// <param name="blobs">Blobs with their addresses.</param>
    void Keep(IReadOnlyList<(Digest Key, byte[] Blob)> blobs);

    /// <summary>Which of the addresses are kept.</summary>
    /// <param name="keys">Addresses.</param>
    IReadOnlySet<Digest> Known(IReadOnlyCollection<Digest> keys);

    /// <summary>Addresses of everything kept, in order.</summary>
    IReadOnlyList<Digest> AllKeys();

    /// <summary>Number of blobs kept.</summary>
    long Count();

    /// <summary>Deletes blobs.</summary>
    /// <param name="keys">Addresses.</param>
    void Delete(ImmutableArray<Digest> keys);
}

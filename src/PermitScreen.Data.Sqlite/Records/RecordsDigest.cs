using System.Security.Cryptography;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Digest over the revisions that a change set ended and began, in order of kind and name, of one resource the end first.</summary>
internal sealed class RecordsDigest : IDisposable
{
    private readonly IncrementalHash _hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);

    /// <summary>Adds a revision that begins.</summary>
    /// <param name="head">Revision.</param>
    public void AddBegun(RevisionHead head) => _hash.AppendData(RevisionRow.Write(new RowForm("begun"), head).Written);

    /// <summary>Adds a revision that ends.</summary>
    /// <param name="head">Revision.</param>
    public void AddEnded(RevisionHead head) => _hash.AppendData(RevisionRow.Write(new RowForm("ended"), head).Written);

    /// <summary>The digest.</summary>
    public Digest Finish() => new(_hash.GetHashAndReset());

    /// <inheritdoc/>
    public void Dispose() => _hash.Dispose();
}

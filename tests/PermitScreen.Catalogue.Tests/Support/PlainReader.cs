using System.Text;
using PermitScreen.Catalogue.Records;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Catalogue.Tests.Support;

/// <summary>Takes the content of a revision as the title of a structure.</summary>
internal sealed class PlainReader : IRevisionReader
{
    private int _reads;

    /// <summary>How often a structure was made ready.</summary>
    internal int Reads => _reads;

    public PreparedStructure ReadStructure(StoredRevision revision)
    {
        Interlocked.Increment(ref _reads);
        var record = new StructureRecord
        {
            Name = revision.Head.Name,
            Title = Encoding.UTF8.GetString(revision.Content.Span),
            Units = [],
            Etag = revision.Head.Content.Etag,
        };
        return new PreparedStructure(record, Rated: null, [], [], 0);
    }

    public PolicyDocument? ReadPolicy(StoredRevision revision) => null;
}

using PermitScreen.Catalogue.Storage;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Reads kept revisions, so that nothing here knows the contract's messages.</summary>
public interface IRevisionReader
{
    /// <summary>A structure ready to be screened. What this version cannot read is a gap: the structure is not assessed, never passed.</summary>
    /// <param name="revision">Revision.</param>
    PreparedStructure ReadStructure(StoredRevision revision);

    /// <summary>A policy document; null where this version cannot read it.</summary>
    /// <param name="revision">Revision.</param>
    PolicyDocument? ReadPolicy(StoredRevision revision);
}

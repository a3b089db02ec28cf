using Google.Protobuf;
using Google.Protobuf.WellKnownTypes;
using PermitScreen.Catalogue.Storage;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Writes the records for the contract.</summary>
internal static class HistoryWriter
{
    /// <summary>A revision.</summary>
    public static C.Revision Write(RevisionHead head)
    {
        var revision = new C.Revision
        {
            Resource = head.Name,
            FromVersion = head.FromVersion,
            Etag = head.Content.Etag,
            Actor = head.Provenance.Actor,
            Reason = head.Provenance.Reason,
            MadeAt = Timestamp.FromDateTimeOffset(head.Provenance.Instant),
        };
        if (head.ToVersion is { } end)
        {
            revision.ToVersion = end;
        }

        return revision;
    }

    /// <summary>A change set.</summary>
    public static C.ChangeSet Write(ChangeSetHead set) => new()
    {
        Version = set.Version,
        Actor = set.Provenance.Actor,
        Reason = set.Provenance.Reason,
        MadeAt = Timestamp.FromDateTimeOffset(set.Provenance.Instant),
        Action = set.Action,
        AddedCount = set.Added,
        RevisedCount = set.Revised,
        RemovedCount = set.Removed,
    };

    /// <summary>An audit entry.</summary>
    public static C.AuditEntry Write(AuditEntry entry)
    {
        var written = new C.AuditEntry
        {
            Sequence = entry.Sequence,
            MadeAt = Timestamp.FromDateTimeOffset(entry.Provenance.Instant),
            Actor = entry.Provenance.Actor,
            Action = entry.Action,
            Subject = entry.Subject,
            Reason = entry.Provenance.Reason,
            Hash = entry.Hash.ToString(),
        };
        if (entry.Version is { } version)
        {
            written.Version = version;
        }

        return written;
    }

    /// <summary>The content of a revision as the contract's message, without what the service adds; null for null.</summary>
    public static IMessage? Message(StoredRevision? revision) => revision switch
    {
        null => null,
        { Head.Kind: ResourceKind.Structure } => C.Structure.Parser.ParseFrom(revision.Content.Span),
        _ => C.Policy.Parser.ParseFrom(revision.Content.Span),
    };
}

using System.Security.Cryptography;
using Google.Protobuf;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Revisions;

/// <summary>The bytes in which structures and policies are kept: the contract's message without what the service itself adds.</summary>
/// <remarks>The messages have no maps, so that the same content is the same bytes every time.</remarks>
internal static class CanonicalForm
{
    /// <summary>Bytes of a structure.</summary>
    public static byte[] Of(Structure structure)
    {
        // Set aside and put back: a copy of a large structure costs more than all the rest.
        var (etag, version) = (structure.Etag, structure.CatalogueVersion);
        if (etag.Length == 0 && version == 0)
        {
            return structure.ToByteArray();
        }

        (structure.Etag, structure.CatalogueVersion) = ("", 0);
        var bytes = structure.ToByteArray();
        (structure.Etag, structure.CatalogueVersion) = (etag, version);
        return bytes;
    }

    /// <summary>Bytes of a policy document.</summary>
    public static byte[] Of(Policy policy)
    {
        var content = policy.Clone();
        content.Etag = "";
        content.CatalogueVersion = 0;
        return content.ToByteArray();
    }

    /// <summary>Resource name of a policy document, policies/{policy}@{version}.</summary>
    public static string DocumentName(Policy policy) => DocumentName(policy.Name, policy.DocumentVersion);

    /// <summary>Resource name of a policy document, policies/{policy}@{version}.</summary>
    public static string DocumentName(string policy, int documentVersion) => FormattableString.Invariant($"{policy}@{documentVersion}");

    /// <summary>A kept structure as callers see it.</summary>
    public static Structure Structure(StoredRevision revision)
    {
        var structure = Contracts.V1.Structure.Parser.ParseFrom(revision.Content.Span);
        structure.Etag = revision.Head.Content.Etag;
        structure.CatalogueVersion = revision.Head.FromVersion;
        return structure;
    }

    /// <summary>A kept policy document as callers see it.</summary>
    public static Policy Policy(StoredRevision revision)
    {
        var policy = Contracts.V1.Policy.Parser.ParseFrom(revision.Content.Span);
        policy.Etag = revision.Head.Content.Etag;
        policy.CatalogueVersion = revision.Head.FromVersion;
        return policy;
    }

    /// <summary>Adds a fault where a message holds fields that this version does not know: to keep them unread could pass a bridge.</summary>
    /// <param name="parser">Parser of its kind.</param>
    /// <param name="bytes">The message.</param>
    /// <param name="faults">Takes the fault.</param>
    public static void RequireKnown<T>(MessageParser<T> parser, ReadOnlySpan<byte> bytes, FaultList faults)
        where T : IMessage<T>
    {
        if (parser.WithDiscardUnknownFields(true).ParseFrom(bytes).CalculateSize() != bytes.Length)
        {
            faults.Add("", "It holds fields that this version of the service does not know, which can be neither checked nor used; leave them out, or install the version that knows them.");
        }
    }

    /// <summary>Digest of a request, its id set aside: tells a retry from another request under the same id.</summary>
    /// <param name="request">The request.</param>
    public static Digest Fingerprint(IMessage request)
    {
        var method = request.Descriptor.FullName;
        var field = request.Descriptor.FindFieldByName("request_id");
        var id = field?.Accessor.GetValue(request);
        field?.Accessor.Clear(request);
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hash.AppendData(System.Text.Encoding.UTF8.GetBytes(method));
        hash.AppendData([0]);
        hash.AppendData(request.ToByteArray());
        field?.Accessor.SetValue(request, id);
        return new Digest(hash.GetHashAndReset());
    }
}

using System.Collections.Immutable;
using System.Text;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Tests.Support;

/// <summary>Small things to put into a store.</summary>
internal static class Samples
{
    public static readonly DateTimeOffset Start = new(2026, 3, 1, 7, 0, 0, TimeSpan.Zero);

    public static string Name(int number) => FormattableString.Invariant($"structures/S-{number:D5}");

    public static Digest Line(string of) => Digest.Of(Encoding.UTF8.GetBytes("line " + of));

    public static ResourceContent Structure(string name, string text, params string[] lines) =>
        new(ResourceKind.Structure, name, Encoding.UTF8.GetBytes(text), [.. lines.Select(Line)]);

    public static ResourceContent Policy(string name, string text) => new(ResourceKind.Policy, name, Encoding.UTF8.GetBytes(text), []);

    public static Provenance By(string actor, int minute = 0, string reason = "test") => new(actor, reason, Start.AddMinutes(minute));

    public static ChangeRequest Add(ResourceContent content, string? requestId = null, int minute = 0) =>
        new("create structure", new Edit.Add(content), By("ann", minute), Stamp(requestId, "add " + content.Hash));

    public static ChangeRequest Revise(ResourceContent content, string etag, string? requestId = null, int minute = 0) =>
        new("update structure", new Edit.Revise(content, etag), By("ben", minute), Stamp(requestId, "revise " + content.Hash));

    public static ChangeRequest Remove(ResourceKind kind, string name, string etag, string? requestId = null, int minute = 0) =>
        new("delete structure", new Edit.Remove(kind, name, etag), By("cas", minute), Stamp(requestId, "remove " + name));

    public static RequestStamp? Stamp(string? requestId, string request) =>
        requestId is null ? null : new RequestStamp(requestId, Digest.Of(Encoding.UTF8.GetBytes(request)));

    public static ImportPiece Piece(int index, ImmutableArray<ImportRefusal> refusals, params ResourceContent[] items) => new(
        index,
        Digest.Of(Encoding.UTF8.GetBytes(string.Join('|', items.Select(i => i.Name + i.Hash)) + refusals.Length)),
        [.. items.Select(i => (i, i.Name + ".json"))],
        refusals);

    public static ImportPiece Piece(int index, params ResourceContent[] items) => Piece(index, [], items);

    public static ImportBeginning Import(string id, bool partial = false, int minute = 0) => new(id, "fingerprint of " + id, partial, By("imp", minute, "import " + id));

    public static async Task<List<StoredRevision>> All(this ICatalogueStore store, long version)
    {
        var found = new List<StoredRevision>();
        await foreach (var revision in store.ReadAsync(version, CancellationToken.None))
        {
            found.Add(revision);
        }

        return found;
    }

    public static async Task<string> Text(this ICatalogueStore store, long version) =>
        string.Join(' ', (await store.All(version)).Select(r => $"{r.Head.Name}={Encoding.UTF8.GetString(r.Content.Span)}"));

    public static async Task<long> Done(this ICatalogueStore store, ChangeRequest request) =>
        Assert.IsType<ChangeOutcome.Done>(await store.CommitAsync(request, CancellationToken.None)).Version;
}

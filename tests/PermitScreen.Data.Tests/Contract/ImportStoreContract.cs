using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Tests.Support;
using PermitScreen.Mechanics.Faults;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Contract;

/// <summary>What every <see cref="IImportStore"/> must do.</summary>
public abstract class ImportStoreContract
{
    private static CancellationToken None => CancellationToken.None;

    protected abstract Task<StoresUnderTest> OpenAsync();

    [Fact]
    public async Task An_import_is_one_version_whatever_it_adds_revises_and_leaves()
    {
        await using var stores = await OpenAsync();
        var (catalogue, imports) = (stores.Catalogue, stores.Imports);
        await catalogue.Done(Add(Structure("structures/same", "same")));
        await catalogue.Done(Add(Structure("structures/other", "before")));
        var begun = await imports.BeginAsync(Import("i1", minute: 5), None);
        Assert.Equal((ImportState.Staging, 2L, 0, 0, 0, (ImportResult?)null), (begun!.State, begun.BaseVersion, begun.NextPiece, begun.Staged, begun.Refused, begun.Result));
        await Kept(imports, "i1", Piece(0, Structure("structures/same", "same"), Structure("structures/new", "new")));
        await Kept(imports, "i1", Piece(1, Structure("structures/other", "after"), Policy("policies/p@1", "p")));
        Assert.Equal(2, (await catalogue.ReadVersionAsync(None)).Version);

        var published = Assert.IsType<PublishOutcome.Published>(await imports.PublishAsync("i1", 2, By("pub", 9, "ignored"), None)).Head;
        Assert.Equal(new ImportResult(2, 1, 1, 3), published.Result);
        Assert.Equal(ImportState.Published, published.State);
        Assert.Equal("structures/new=new structures/other=after structures/same=same policies/p@1=p", await catalogue.Text(3));
        Assert.Equal("structures/other=before structures/same=same", await catalogue.Text(2));
        var set = (await catalogue.ReadChangeSetsAsync(null, 1, None))[0];
        Assert.Equal((3L, "publish import", 2, 1, 0), (set.Version, set.Action, set.Added, set.Revised, set.Removed));
        Assert.Equal(new Provenance("pub", "import i1", Start.AddMinutes(9)), set.Provenance);
        var entry = (await catalogue.ReadAuditAsync(null, 1, None))[0];
        Assert.Equal(("publish import", "imports/i1", 3L), (entry.Action, entry.Subject, entry.Version));
        Assert.NotEqual(Digest.Of([]), entry.Records);

        Assert.Equal(published, Assert.IsType<PublishOutcome.Published>(await imports.PublishAsync("i1", 2, By("again", 10), None)).Head);
        Assert.Equal(published, await imports.FindAsync("i1", None));
        Assert.Equal(3, (await catalogue.ReadVersionAsync(None)).Version);
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task The_same_import_again_makes_no_version_and_is_logged()
    {
        await using var stores = await OpenAsync();
        foreach (var id in new[] { "i1", "i2" })
        {
            await stores.Imports.BeginAsync(Import(id), None);
            await Kept(stores.Imports, id, Piece(0, [.. Enumerable.Range(0, 30).Select(i => Structure(Name(i), "x"))]));
            await stores.Imports.PublishAsync(id, null, By("pub"), None);
        }

        Assert.Equal(new ImportResult(0, 0, 30, null), (await stores.Imports.FindAsync("i2", None))!.Result);
        Assert.Equal(1, (await stores.Catalogue.ReadVersionAsync(None)).Version);
        var entry = (await stores.Catalogue.ReadAuditAsync(null, 1, None))[0];
        Assert.Equal(("imports/i2", (long?)null, Digest.Of([])), (entry.Subject, entry.Version, entry.Records));
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task Beginning_and_staging_again_change_nothing_and_what_differs_is_told()
    {
        await using var stores = await OpenAsync();
        var imports = stores.Imports;
        var begun = await imports.BeginAsync(Import("i1"), None);
        Assert.Equal(begun, await imports.BeginAsync(Import("i1", minute: 3), None));
        Assert.Null(await imports.BeginAsync(Import("i1", partial: true), None));
        Assert.Null(await imports.BeginAsync(Import("i1") with { SourceFingerprint = "other" }, None));
        Assert.Null(await imports.BeginAsync(Import("i1") with { Provenance = By("imp", 0, "another reason") }, None));

        var piece = Piece(0, Structure("structures/a", "a"));
        await Kept(imports, "i1", piece);
        var head = await Kept(imports, "i1", piece);
        Assert.Equal((1, 1), (head.NextPiece, head.Staged));
        Assert.Equal(StagingOutcome.OtherPiece, (await imports.StageAsync("i1", Piece(0, Structure("structures/a", "b")), None)).Outcome);
        Assert.Equal(StagingOutcome.Gap, (await imports.StageAsync("i1", Piece(2, Structure("structures/b", "b")), None)).Outcome);
        Assert.Equal(StagingOutcome.Gap, (await imports.StageAsync("i1", Piece(-1, Structure("structures/b", "b")), None)).Outcome);
        Assert.Equal((StagingOutcome.NoSuchImport, null), await imports.StageAsync("i9", piece, None));
        Assert.IsType<PublishOutcome.PiecesMissing>(await imports.PublishAsync("i1", 2, By("pub"), None));
        Assert.IsType<PublishOutcome.NoSuchImport>(await imports.PublishAsync("i9", null, By("pub"), None));
        Assert.Null(await imports.FindAsync("i9", None));
        Assert.Null(await imports.CancelAsync("i9", By("pub"), None));
        Assert.Empty(await imports.ReadRefusalsAsync("i9", 0, 10, None));
        Assert.IsType<PublishOutcome.Published>(await imports.PublishAsync("i1", 1, By("pub"), None));
        Assert.Equal(StagingOutcome.NotStaging, (await imports.StageAsync("i1", piece, None)).Outcome);
        Assert.Equal(ImportState.Published, (await imports.CancelAsync("i1", By("pub"), None))!.State);
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public async Task What_stands_twice_or_was_changed_by_others_is_refused(bool partial)
    {
        await using var stores = await OpenAsync();
        var (catalogue, imports) = (stores.Catalogue, stores.Imports);
        foreach (var name in new[] { "structures/revised", "structures/gone", "structures/same", "structures/plain" })
        {
            await catalogue.Done(Add(Structure(name, "0")));
        }

        await imports.BeginAsync(Import("i1", partial), None);
        await catalogue.Done(Revise(Structure("structures/revised", "theirs"), Structure("x", "0").Hash.Etag));
        await catalogue.Done(Remove(ResourceKind.Structure, "structures/gone", Structure("x", "0").Hash.Etag));
        await catalogue.Done(Add(Structure("structures/added", "theirs")));
        await catalogue.Done(Revise(Structure("structures/same", "agreed"), Structure("x", "0").Hash.Etag));
        var bad = new ImportRefusal(0, "structures/bad", "bad.json", [new Fault("units", "none"), new Fault("", "nothing \"fits\" 橋")]);
        await Kept(imports, "i1", Piece(0, [bad], Structure("structures/twice", "1"), Structure("structures/revised", "ours"), Structure("structures/gone", "ours")));
        await Kept(imports, "i1", Piece(1, Structure("structures/twice", "1"), Structure("structures/added", "ours"), Structure("structures/same", "agreed"), Structure("structures/plain", "ours")));

        var outcome = await imports.PublishAsync("i1", 2, By("pub"), None);
        var refusals = await imports.ReadRefusalsAsync("i1", 0, 100, None);
        Assert.Equal(
            ["structures/bad", "structures/twice", "structures/revised", "structures/gone", "structures/twice", "structures/added"], refusals.Select(r => r.Resource));
        Assert.Equal(bad.Faults.AsEnumerable(), refusals[0].Faults.AsEnumerable());
        Assert.Equal([0, 0, 0, 0, 1, 1], refusals.Select(r => r.Piece));
        Assert.All(refusals.Skip(1), r => Assert.Equal("name", Assert.Single(r.Faults).Path));
        Assert.Contains("version 5", refusals[2].Faults[0].Message, StringComparison.Ordinal);
        Assert.Contains("taken out by others at version 6", refusals[3].Faults[0].Message, StringComparison.Ordinal);
        Assert.Contains("version 7", refusals[5].Faults[0].Message, StringComparison.Ordinal);
        Assert.Contains("2 times", refusals[1].Faults[0].Message, StringComparison.Ordinal);
        Assert.Equal(refusals.Skip(2).Take(3).Select(r => r.Resource), (await imports.ReadRefusalsAsync("i1", 2, 3, None)).Select(r => r.Resource));
        if (partial)
        {
            var head = Assert.IsType<PublishOutcome.Published>(outcome).Head;
            Assert.Equal((new ImportResult(0, 1, 1, 9), 6), (head.Result, head.Refused));
            Assert.Equal("structures/added=theirs structures/plain=ours structures/revised=theirs structures/same=agreed", await catalogue.Text(9));
        }
        else
        {
            var refused = Assert.IsType<PublishOutcome.Refused>(outcome);
            Assert.Equal((6, ImportState.Staging), (refused.Head.Refused, refused.Head.State));
            Assert.Equal(6, refused.First.Length);
            Assert.Equal(8, (await catalogue.ReadVersionAsync(None)).Version);

            // Another attempt, and another piece after it, count nothing twice.
            Assert.Equal(6, Assert.IsType<PublishOutcome.Refused>(await imports.PublishAsync("i1", null, By("pub"), None)).Head.Refused);
            Assert.Equal((1, 8), (await Kept(imports, "i1", Piece(2, Structure("structures/more", "m"))) is var h ? (h.Refused, h.Staged) : default));
            Assert.Equal([], await stores.Keeping.Problems());
            Assert.Equal(ImportState.Cancelled, (await imports.CancelAsync("i1", By("pub"), None))!.State);
        }

        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task Giving_up_drops_what_nobody_else_names()
    {
        await using var stores = await OpenAsync();
        var imports = stores.Imports;
        await stores.Catalogue.Done(Add(Structure("structures/a", "shared", "kept")));
        await imports.BeginAsync(Import("i1"), None);
        await imports.BeginAsync(Import("i2"), None);
        await Kept(imports, "i1", Piece(0, Structure("structures/b", "shared", "kept"), Structure("structures/c", "only here", "dropped"), Structure("structures/d", "both", "of both")));
        await Kept(imports, "i2", Piece(0, Structure("structures/e", "both", "of both")));
        Assert.Equal(new[] { "kept", "dropped", "of both" }.Select(Line).ToHashSet(), await stores.Backlog.ReadNamedAsync(None));
        var cancelled = await imports.CancelAsync("i1", By("stop", 4, "wrong files"), None);
        Assert.Equal(ImportState.Cancelled, cancelled!.State);
        Assert.Equal(cancelled, await imports.CancelAsync("i1", By("stop"), None));
        Assert.Equal(new[] { "kept", "of both" }.Select(Line).ToHashSet(), await stores.Backlog.ReadNamedAsync(None));
        Assert.IsType<PublishOutcome.GivenUp>(await imports.PublishAsync("i1", null, By("pub"), None));
        var entry = (await stores.Catalogue.ReadAuditAsync(null, 1, None))[0];
        Assert.Equal(("cancel import", "imports/i1", By("stop", 4, "wrong files")), (entry.Action, entry.Subject, entry.Provenance));
        Assert.Equal([], await stores.Keeping.Problems());
        Assert.IsType<PublishOutcome.Published>(await imports.PublishAsync("i2", null, By("pub"), None));
        Assert.Equal("structures/a=shared structures/e=both", await stores.Catalogue.Text(2));
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task Imports_are_listed_newest_first_by_state()
    {
        await using var stores = await OpenAsync();
        for (var i = 0; i < 6; i++)
        {
            await stores.Imports.BeginAsync(Import(FormattableString.Invariant($"i{i}")), None);
        }

        await stores.Imports.PublishAsync("i1", 0, By("pub"), None);
        await stores.Imports.CancelAsync("i4", By("pub"), None);
        Assert.Equal(["i5", "i4", "i3", "i2", "i1", "i0"], (await stores.Imports.ListAsync(null, 0, 100, None)).Select(h => h.ImportId));
        Assert.Equal(["i4", "i3"], (await stores.Imports.ListAsync(null, 1, 2, None)).Select(h => h.ImportId));
        Assert.Equal(["i5", "i3", "i2", "i0"], (await stores.Imports.ListAsync(ImportState.Staging, 0, 100, None)).Select(h => h.ImportId));
        Assert.Equal(["i1"], (await stores.Imports.ListAsync(ImportState.Published, 0, 100, None)).Select(h => h.ImportId));
        Assert.Equal(["i4"], (await stores.Imports.ListAsync(ImportState.Cancelled, 0, 100, None)).Select(h => h.ImportId));
    }

    [Fact]
    public async Task A_resource_that_was_taken_out_before_the_import_was_begun_is_added_again()
    {
        await using var stores = await OpenAsync();
        await stores.Catalogue.Done(Add(Structure("structures/a", "1")));
        await stores.Catalogue.Done(Remove(ResourceKind.Structure, "structures/a", Structure("x", "1").Hash.Etag));
        await stores.Imports.BeginAsync(Import("i1"), None);
        await Kept(stores.Imports, "i1", Piece(0, Structure("structures/a", "1")));
        Assert.Equal(new ImportResult(1, 0, 0, 3), Assert.IsType<PublishOutcome.Published>(await stores.Imports.PublishAsync("i1", 1, By("pub"), None)).Head.Result);
        Assert.Equal([], await stores.Keeping.Problems());
    }

    private static async Task<ImportHead> Kept(IImportStore imports, string id, ImportPiece piece)
    {
        var (outcome, head) = await imports.StageAsync(id, piece, None);
        Assert.Equal(StagingOutcome.Kept, outcome);
        return head!;
    }
}

using Grpc.Core;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Changes;

/// <summary>Imports: staged in pieces that may be sent again, published at once, all or nothing.</summary>
public sealed class ImportTests(RecordsService service) : IClassFixture<RecordsService>
{
    private ImportService.ImportServiceClient Imports => service.Running.Imports;

    [Fact]
    public async Task Nothing_is_seen_before_it_is_published_and_a_piece_sent_again_is_kept_once()
    {
        var import = await BeginAsync();
        var piece = Piece(import, 0, "structures/I-1", "structures/I-2");
        await Imports.StageImportPieceAsync(piece, RecordsService.Actor);
        var again = (await Imports.StageImportPieceAsync(piece, RecordsService.Actor)).Import;
        Assert.Equal((1, 2), (again.NextPieceIndex, again.StagedCount));
        Assert.Equal(StatusCode.NotFound, (await Assert.ThrowsAsync<RpcException>(() => service.GetAsync("structures/I-1"))).StatusCode);
        var other = await Assert.ThrowsAsync<RpcException>(async () => await Imports.StageImportPieceAsync(Piece(import, 0, "structures/I-3"), RecordsService.Actor));
        Assert.Equal(StatusCode.Aborted, other.StatusCode);
        var gap = await Assert.ThrowsAsync<RpcException>(async () => await Imports.StageImportPieceAsync(Piece(import, 2, "structures/I-3"), RecordsService.Actor));
        Assert.Equal(StatusCode.InvalidArgument, gap.StatusCode);

        await service.RestartAsync();
        var version = await service.VersionAsync();
        Assert.Equal(1, (await Imports.GetImportAsync(new GetImportRequest { Name = import.Name })).Import.NextPieceIndex);
        await Imports.StageImportPieceAsync(Piece(import, 1, "structures/I-3"), RecordsService.Actor);
        var published = await PublishAsync(import);
        Assert.Equal((3, 0, version + 1), (published.AddedCount, published.RevisedCount, published.PublishedVersion));
        var repeated = await PublishAsync(import);
        Assert.Equal(published.PublishedVersion, repeated.PublishedVersion);
        Assert.Equal(version + 1, (await service.GetAsync("structures/I-3")).CatalogueVersion);
        Assert.Equal(version + 1, await service.VersionAsync());
    }

    [Fact]
    public async Task The_same_content_makes_no_version()
    {
        var version = await service.VersionAsync();
        var import = await BeginAsync();
        var piece = new StageImportPieceRequest { Name = import.Name, PieceIndex = 0 };
        piece.Structures.AddRange(ContractFiles.Structures("deploy", "demo", "catalogue").Take(3));
        await Imports.StageImportPieceAsync(piece, RecordsService.Actor);
        var published = await PublishAsync(import);
        Assert.Equal((0, 0, 3, false), (published.AddedCount, published.RevisedCount, published.UnchangedCount, published.HasPublishedVersion));
        Assert.Equal(version, await service.VersionAsync());
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public async Task Refused_items_keep_all_from_being_published_unless_that_is_allowed(bool allowPartial)
    {
        var import = await BeginAsync(allowPartial);
        var piece = Piece(import, 0, $"structures/R-{allowPartial}-1", $"structures/R-{allowPartial}-2");
        piece.Structures[1].Units[0].Truss.Members[0].AreaM2 = -1;
        piece.Origins.AddRange(["good.json", "bad.json"]);
        var staged = await Imports.StageImportPieceAsync(piece, RecordsService.Actor);
        Assert.Equal("bad.json", Assert.Single(staged.Refusals).Origin);
        Assert.Contains(staged.Refusals[0].Faults, f => f.Field == "units[0].truss.members[0].area_m2");
        if (allowPartial)
        {
            Assert.Equal((1, 1), ((await PublishAsync(import)).AddedCount, (await Imports.ListImportRefusalsAsync(new ListImportRefusalsRequest { Parent = import.Name })).Refusals.Count));
        }
        else
        {
            var error = await Assert.ThrowsAsync<RpcException>(() => PublishAsync(import));
            Assert.Equal(StatusCode.FailedPrecondition, error.StatusCode);
            Assert.Contains("bad.json", error.Status.Detail, StringComparison.Ordinal);
            Assert.Equal(StatusCode.NotFound, (await Assert.ThrowsAsync<RpcException>(() => service.GetAsync($"structures/R-{allowPartial}-1"))).StatusCode);
        }
    }

    [Fact]
    public async Task What_others_revised_meanwhile_is_not_overwritten()
    {
        var import = await BeginAsync();
        var piece = new StageImportPieceRequest { Name = import.Name, PieceIndex = 0 };
        var structure = ContractFiles.Structures("deploy", "demo", "catalogue").First(s => s.Name == RecordsService.Bridge);
        structure.Title = "by the import";
        piece.Structures.Add(structure);
        await Imports.StageImportPieceAsync(piece, RecordsService.Actor);
        var mine = await service.UpdateAsync(new Structure(await service.GetAsync()) { Title = "by an engineer, meanwhile" });
        var error = await Assert.ThrowsAsync<RpcException>(() => PublishAsync(import));
        Assert.Equal(StatusCode.FailedPrecondition, error.StatusCode);
        Assert.Equal(mine, await service.GetAsync());
    }

    [Fact]
    public async Task An_import_given_up_leaves_nothing()
    {
        var import = await BeginAsync();
        await Imports.StageImportPieceAsync(Piece(import, 0, "structures/G-1"), RecordsService.Actor);
        await Imports.CancelImportAsync(new CancelImportRequest { Name = import.Name }, RecordsService.Actor);
        Assert.Equal(StatusCode.FailedPrecondition, (await Assert.ThrowsAsync<RpcException>(() => PublishAsync(import))).StatusCode);
        Assert.Equal(StatusCode.NotFound, (await Assert.ThrowsAsync<RpcException>(() => service.GetAsync("structures/G-1"))).StatusCode);
    }

    private async Task<Import> BeginAsync(bool allowPartial = false) =>
        (await Imports.CreateImportAsync(new CreateImportRequest { ChangeReason = "test", AllowPartial = allowPartial }, RecordsService.Actor)).Import;

    private async Task<Import> PublishAsync(Import import) =>
        (await Imports.PublishImportAsync(new PublishImportRequest { Name = import.Name }, RecordsService.Actor)).Import;

    private static StageImportPieceRequest Piece(Import import, int index, params string[] names)
    {
        var piece = new StageImportPieceRequest { Name = import.Name, PieceIndex = index };
        var structure = ContractFiles.Structures("deploy", "demo", "catalogue").First(s => s.Name == RecordsService.Bridge);
        piece.Structures.AddRange(names.Select(n => new Structure(structure) { Name = n }));
        return piece;
    }
}

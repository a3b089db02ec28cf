using Google.Protobuf;
using Grpc.Core;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Tests.BadInput;

namespace PermitScreen.Service.Tests.Changes;

/// <summary>The records as callers see them: history, comparison, as-of screenings, audit, backlog, backup and restore, a restart.</summary>
public sealed class RecordsTests(RecordsService service) : IClassFixture<RecordsService>
{
    [Fact]
    public async Task History_says_who_why_and_when_and_a_comparison_names_the_field()
    {
        var before = await service.GetAsync();
        var change = before.Clone();
        var effect = change.Units[0].Effects.First(e => e.Rated?.Resistances.Count > 0);
        effect.Rated.Resistances[0].Element = "pin";
        var after = await service.UpdateAsync(change);
        var revisions = (await service.Running.History.ListRevisionsAsync(new ListRevisionsRequest { Parent = RecordsService.Bridge })).Revisions;
        Assert.Equal((after.CatalogueVersion, false, "test", "test", after.Etag), (revisions[0].FromVersion, revisions[0].HasToVersion, revisions[0].Actor, revisions[0].Reason, revisions[0].Etag));
        Assert.Equal((before.CatalogueVersion, after.CatalogueVersion), (revisions[1].FromVersion, revisions[1].ToVersion));

        var compared = await service.Running.History.CompareRevisionsAsync(new CompareRevisionsRequest { Name = RecordsService.Bridge });
        var difference = Assert.Single(compared.Differences);
        Assert.Equal($"units[{change.Units[0].UnitId}].effects[{effect.EffectId}].rated.resistances[0].element", difference.Field);
        Assert.Equal("\"pin\"", difference.After);
        Assert.False(compared.LinesDiffer);
    }

    [Fact]
    public async Task A_screening_as_of_a_version_has_the_verdict_of_that_version()
    {
        var request = DemoService.Request();
        var name = request.Application.Route.CrossingList.Crossings[0].Structure;
        var now = (await service.Running.Screening.ScreenApplicationAsync(request)).Screening;
        var closed = await service.UpdateAsync(new Structure(await service.GetAsync(name)) { State = StructureState.Closed });
        var after = (await service.Running.Screening.ScreenApplicationAsync(request)).Screening;
        Assert.Equal((Verdict.Fail, closed.CatalogueVersion), (after.Verdict, after.CatalogueVersion));
        request.AsOfVersion = now.CatalogueVersion;
        Assert.Equal(now, (await service.Running.Screening.ScreenApplicationAsync(request)).Screening);
        request.MinCatalogueVersion = 1;
        Assert.Equal(StatusCode.InvalidArgument, (await Assert.ThrowsAsync<RpcException>(async () => await service.Running.Screening.ScreenApplicationAsync(request))).StatusCode);
    }

    [Fact]
    public async Task The_backlog_empties_and_the_records_verify()
    {
        for (var i = 0; i < 100 && await PendingAsync() > 0; i++)
        {
            await Task.Delay(100);
        }

        var backlog = (await service.Running.Maintenance.GetBacklogAsync(new GetBacklogRequest())).Backlog;
        Assert.Equal((0L, 0L), (backlog.PendingCount, backlog.DamagedCount));
        Assert.True(backlog.KeptCount >= 12, $"{backlog.KeptCount} are kept.");
        Assert.Empty(backlog.Failures);
        var last = await VerifyAsync("");
        Assert.True(last.Sound);
        Assert.True(last.AuditEntryCount > 0 && last.RevisionCount > 12, last.ToString());
        Assert.True((await VerifyAsync(last.NewestHash)).Sound);
        Assert.False((await VerifyAsync(new string('a', 64))).Sound);
    }

    [Fact]
    public async Task A_restart_finds_everything_again()
    {
        var structure = await service.UpdateAsync(new Structure(await service.GetAsync()) { Title = "before the restart" });
        var version = await service.VersionAsync();
        await service.RestartAsync();
        Assert.Equal(version, await service.VersionAsync());
        Assert.Equal(structure, await service.GetAsync());
    }

    [Fact]
    public async Task A_backup_restored_brings_its_structures_back_under_a_newer_version()
    {
        var kept = await service.GetAsync();
        var backup = await BackUpAsync();
        var changed = await service.UpdateAsync(new Structure(kept) { Title = "after the backup" });
        var version = await service.VersionAsync();
        var damaged = backup.ToArray();
        damaged[damaged.Length / 2] ^= 1;
        Assert.NotEqual(StatusCode.OK, (await Assert.ThrowsAsync<RpcException>(() => RestoreAsync(damaged))).StatusCode);
        Assert.Equal(changed, await service.GetAsync());

        var restored = await RestoreAsync(backup);
        Assert.True(restored.CatalogueVersion > version, $"{restored.CatalogueVersion} is not above {version}.");
        Assert.Equal(restored.CatalogueVersion, await service.VersionAsync());
        Assert.Equal(kept, await service.GetAsync());
        Assert.True(File.Exists(Path.Combine(service.Folder, restored.KeptAs)));
        Assert.True((await VerifyAsync("")).Sound);
        await service.RestartAsync();
        Assert.Equal(kept, await service.GetAsync());
    }

    [Fact]
    public async Task Lines_that_nobody_names_are_collected_and_the_others_stay()
    {
        var import = (await service.Running.Imports.CreateImportAsync(new CreateImportRequest { ChangeReason = "test" }, RecordsService.Actor)).Import;
        var collected = await service.Running.Maintenance.CollectLinesAsync(new CollectLinesRequest(), RecordsService.Actor);
        var structure = await service.GetAsync();
        structure.Units[0].Truss.Members[0].AreaM2 *= 2;
        await service.UpdateAsync(structure);
        for (var i = 0; i < 100 && await PendingAsync() > 0; i++)
        {
            await Task.Delay(100);
        }

        var again = await service.Running.Maintenance.CollectLinesAsync(new CollectLinesRequest(), RecordsService.Actor);
        Assert.Equal(0, again.DeletedCount);
        Assert.True(again.KeptCount > collected.KeptCount, $"{again.KeptCount} kept, {collected.KeptCount} before: the earlier revision's lines must stay.");
        await service.Running.Imports.CancelImportAsync(new CancelImportRequest { Name = import.Name }, RecordsService.Actor);
    }

    private async Task<long> PendingAsync() => (await service.Running.Maintenance.GetBacklogAsync(new GetBacklogRequest())).Backlog.PendingCount;

    private async Task<VerifyResult> VerifyAsync(string known)
    {
        VerifyResult? result = null;
        using var call = service.Running.History.VerifyRecords(new VerifyRecordsRequest { KnownHash = known });
        await foreach (var message in call.ResponseStream.ReadAllAsync())
        {
            result = message.Result ?? result;
        }

        return result ?? throw new InvalidOperationException("The stream ended without a result.");
    }

    private async Task<byte[]> BackUpAsync()
    {
        using var bytes = new MemoryStream();
        var sha = "";
        using var call = service.Running.Maintenance.ReadBackup(new ReadBackupRequest());
        await foreach (var message in call.ResponseStream.ReadAllAsync())
        {
            message.Chunk.WriteTo(bytes);
            sha = message.Sha256;
        }

        Assert.Equal(Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(bytes.ToArray())), sha);
        return bytes.ToArray();
    }

    private async Task<RestoreBackupResponse> RestoreAsync(byte[] backup)
    {
        using var call = service.Running.Maintenance.RestoreBackup(RecordsService.Actor);
        await call.RequestStream.WriteAsync(new RestoreBackupRequest { Head = new RestoreHead { ChangeReason = "test" } });
        foreach (var chunk in backup.Chunk(100_000))
        {
            await call.RequestStream.WriteAsync(new RestoreBackupRequest { Chunk = ByteString.CopyFrom(chunk) });
        }

        await call.RequestStream.WriteAsync(new RestoreBackupRequest { Sha256 = Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(backup)) });
        await call.RequestStream.CompleteAsync();
        return await call.ResponseAsync;
    }
}

using Google.Protobuf.WellKnownTypes;
using Google.Rpc;
using Grpc.Core;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Changes;

/// <summary>Creating, revising and removing structures: etags, request ids, masks, as-of answers.</summary>
public sealed class StructureChangeTests(RecordsService service) : IClassFixture<RecordsService>
{
    [Fact]
    public async Task An_update_makes_one_version_and_the_earlier_one_can_still_be_read()
    {
        var before = await service.GetAsync();
        var version = await service.VersionAsync();
        var updated = await service.UpdateAsync(new Structure(before) { Title = before.Title + " (renamed)" });
        Assert.Equal(version + 1, updated.CatalogueVersion);
        Assert.NotEqual(before.Etag, updated.Etag);
        Assert.Equal(updated, await service.GetAsync());
        Assert.Equal(before, await service.GetAsync(asOf: version));
    }

    [Fact]
    public async Task The_same_content_makes_no_version()
    {
        var structure = await service.GetAsync();
        var version = await service.VersionAsync();
        Assert.Equal(structure, await service.UpdateAsync(structure));
        Assert.Equal(version, await service.VersionAsync());
    }

    [Fact]
    public async Task An_update_that_rests_on_an_older_revision_is_aborted_naming_the_newer_one()
    {
        var structure = await service.GetAsync();
        var newer = await service.UpdateAsync(new Structure(structure) { Owner = structure.Owner + " II" });
        var error = await Assert.ThrowsAsync<RpcException>(() => service.UpdateAsync(new Structure(structure) { Owner = "somebody else" }));
        Assert.Equal(StatusCode.Aborted, error.StatusCode);
        var info = error.GetRpcStatus()!.GetDetail<ErrorInfo>()!;
        Assert.Equal(newer.Etag, info.Metadata["etag"]);
        Assert.Equal(newer, await service.GetAsync());
    }

    [Fact]
    public async Task A_retry_under_the_same_request_id_is_answered_and_not_done_again()
    {
        var structure = await service.GetAsync();
        var id = Guid.NewGuid().ToString();
        var change = new Structure(structure) { Owner = structure.Owner + " III" };
        var first = await service.UpdateAsync(change, id);
        await service.UpdateAsync(new Structure(first) { Owner = "in between" });
        var version = await service.VersionAsync();
        Assert.Equal(first, await service.UpdateAsync(change, id));
        Assert.Equal(version, await service.VersionAsync());
        var error = await Assert.ThrowsAsync<RpcException>(() => service.UpdateAsync(new Structure(change) { Owner = "another request" }, id));
        Assert.Equal(StatusCode.InvalidArgument, error.StatusCode);
        Assert.Contains(error.GetRpcStatus()!.GetDetail<BadRequest>()!.FieldViolations, v => v.Field == "request_id");
    }

    [Fact]
    public async Task A_mask_takes_only_its_fields()
    {
        var structure = await service.GetAsync();
        var change = new Structure { Name = structure.Name, Etag = structure.Etag, Title = "by mask", Owner = "not taken", Inspection = new Inspection { SuperstructureCondition = 3 } };
        var request = new UpdateStructureRequest
        {
            Structure = change,
            ChangeReason = "test",
            UpdateMask = FieldMask.FromString("title,inspection.superstructure_condition"),
        };
        var updated = (await service.Catalogue.UpdateStructureAsync(request, RecordsService.Actor)).Structure;
        var expected = new Structure(structure) { Title = "by mask", Etag = updated.Etag, CatalogueVersion = updated.CatalogueVersion };
        expected.Inspection.SuperstructureCondition = 3;
        Assert.Equal(expected, updated);
    }

    /// <summary>Rule F4: the library's own merge writes 0 for a number that the change does not say; 0 trucks a day is the lowest live-load factor.</summary>
    [Fact]
    public async Task Rule_F4_A_masked_number_that_is_not_said_is_taken_out_and_not_set_to_zero()
    {
        var structure = await service.GetAsync();
        var request = new UpdateStructureRequest
        {
            Structure = new Structure { Name = structure.Name, Etag = structure.Etag, Roadway = new Roadway() },
            ChangeReason = "test",
            UpdateMask = FieldMask.FromString("roadway.adtt_one_direction,roadway.left_kerb_m,inspection.interval_months"),
            ValidateOnly = true,
        };
        var updated = (await service.Catalogue.UpdateStructureAsync(request, RecordsService.Actor)).Structure;
        Assert.False(updated.Roadway.HasAdttOneDirection);
        Assert.False(updated.Roadway.HasLeftKerbM);
        Assert.False(updated.Inspection.HasIntervalMonths);
        Assert.Equal(structure.Roadway.RightKerbM, updated.Roadway.RightKerbM);
        Assert.Equal(structure.Inspection.InspectedOn, updated.Inspection.InspectedOn);
    }

    /// <summary>Every optional number of the first two levels, masked and not said, is absent afterwards.</summary>
    [Fact]
    public async Task Rule_F4_No_optional_field_becomes_zero_by_a_mask()
    {
        var structure = await service.GetAsync();
        var tried = 0;
        foreach (var field in Structure.Descriptor.Fields.InFieldNumberOrder().Where(f => f is { IsRepeated: false, FieldType: Google.Protobuf.Reflection.FieldType.Message }))
        {
            foreach (var inner in field.MessageType.Fields.InFieldNumberOrder().Where(f => f is { IsRepeated: false, HasPresence: true }))
            {
                var whole = structure.Clone();
                var change = new Structure { Name = structure.Name };
                var merged = Revisions.UpdateMasks.Merge(FieldMask.FromString($"{field.Name}.{inner.Name}"), change, whole);
                var parent = (Google.Protobuf.IMessage?)field.Accessor.GetValue(merged);
                Assert.True(parent is null || !inner.Accessor.HasValue(parent), $"{field.Name}.{inner.Name}");
                tried++;
            }
        }

        Assert.True(tried > 10, $"{tried} fields were tried.");
    }

    [Fact]
    public async Task A_masked_update_sent_again_is_answered_as_before()
    {
        var structure = await service.GetAsync();
        var request = new UpdateStructureRequest
        {
            Structure = new Structure { Name = structure.Name, Etag = structure.Etag, Owner = "masked and sent twice" },
            ChangeReason = "test",
            UpdateMask = FieldMask.FromString("owner"),
            RequestId = Guid.NewGuid().ToString(),
        };
        var first = await service.Catalogue.UpdateStructureAsync(request, RecordsService.Actor);
        Assert.Equal(first, await service.Catalogue.UpdateStructureAsync(request, RecordsService.Actor));
    }

    [Fact]
    public async Task A_reason_with_a_control_character_is_refused()
    {
        var structure = await service.GetAsync();
        var request = new UpdateStructureRequest { Structure = structure, ChangeReason = "cut\0short" };
        var error = await Assert.ThrowsAsync<RpcException>(async () => await service.Catalogue.UpdateStructureAsync(request, RecordsService.Actor));
        Assert.Contains(error.GetRpcStatus()!.GetDetail<BadRequest>()!.FieldViolations, v => v.Field == "change_reason");
    }

    [Fact]
    public async Task A_structure_is_created_once_removed_and_created_again()
    {
        var structure = new Structure(await service.GetAsync()) { Name = "structures/NEW-1" };
        var create = new CreateStructureRequest { Structure = structure, ChangeReason = "test", RequestId = Guid.NewGuid().ToString() };
        var created = (await service.Catalogue.CreateStructureAsync(create, RecordsService.Actor)).Structure;
        Assert.Equal(created, (await service.Catalogue.CreateStructureAsync(create, RecordsService.Actor)).Structure);
        var twice = await Assert.ThrowsAsync<RpcException>(async () =>
            await service.Catalogue.CreateStructureAsync(new CreateStructureRequest(create) { RequestId = "" }, RecordsService.Actor));
        Assert.Equal(StatusCode.AlreadyExists, twice.StatusCode);

        var delete = new DeleteStructureRequest { Name = structure.Name, Etag = created.Etag, ChangeReason = "test", RequestId = Guid.NewGuid().ToString() };
        var gone = await service.Catalogue.DeleteStructureAsync(delete, RecordsService.Actor);
        Assert.Equal(gone, await service.Catalogue.DeleteStructureAsync(delete, RecordsService.Actor));
        Assert.Equal(StatusCode.NotFound, (await Assert.ThrowsAsync<RpcException>(() => service.GetAsync(structure.Name))).StatusCode);
        Assert.Equal(created, await service.GetAsync(structure.Name, created.CatalogueVersion));
        var again = (await service.Catalogue.CreateStructureAsync(new CreateStructureRequest(create) { RequestId = "" }, RecordsService.Actor)).Structure;
        Assert.Equal(gone.CatalogueVersion + 1, again.CatalogueVersion);
        Assert.Equal(created.Etag, again.Etag);
    }

    [Fact]
    public async Task Validate_only_keeps_nothing()
    {
        var structure = await service.GetAsync();
        var version = await service.VersionAsync();
        var changed = new Structure(structure) { Title = "only checked" };
        var answer = await service.Catalogue.UpdateStructureAsync(new UpdateStructureRequest { Structure = changed, ChangeReason = "test", ValidateOnly = true }, RecordsService.Actor);
        Assert.Equal("only checked", answer.Structure.Title);
        Assert.Equal(structure, await service.GetAsync());
        Assert.Equal(version, await service.VersionAsync());
    }

    [Fact]
    public async Task Who_and_why_and_the_etag_must_be_said_all_at_once()
    {
        var structure = new Structure(await service.GetAsync()) { Etag = "" };
        var error = await Assert.ThrowsAsync<RpcException>(async () =>
            await service.Catalogue.UpdateStructureAsync(new UpdateStructureRequest { Structure = structure, RequestId = "17" }));
        var fields = error.GetRpcStatus()!.GetDetail<BadRequest>()!.FieldViolations.Select(v => v.Field);
        Assert.Equal(["change_reason", "request_id", "structure.etag", "x-permitscreen-actor"], fields.Order(StringComparer.Ordinal));
    }

    [Fact]
    public async Task A_mechanism_is_refused_at_the_door_and_nothing_is_kept()
    {
        var structure = await service.GetAsync();
        var version = await service.VersionAsync();
        var broken = structure.Clone();
        broken.Units[0].Truss.Members.RemoveAt(broken.Units[0].Truss.Members.Count / 2);
        var error = await Assert.ThrowsAsync<RpcException>(() => service.UpdateAsync(broken));
        Assert.Equal(StatusCode.InvalidArgument, error.StatusCode);
        Assert.Equal(version, await service.VersionAsync());
    }

    [Fact]
    public async Task Fields_that_this_version_does_not_know_are_refused()
    {
        var structure = await service.GetAsync();
        var bytes = Google.Protobuf.MessageExtensions.ToByteArray(structure);
        var unknown = Structure.Parser.ParseFrom([.. bytes, 0xF8, 0x3F, 0x01]);
        var error = await Assert.ThrowsAsync<RpcException>(() => service.UpdateAsync(unknown));
        Assert.Contains("does not know", error.Status.Detail, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_version_that_was_never_published_is_out_of_range()
    {
        var version = await service.VersionAsync();
        var error = await Assert.ThrowsAsync<RpcException>(() => service.GetAsync(asOf: version + 1000));
        Assert.Equal(StatusCode.OutOfRange, error.StatusCode);
    }

    [Fact]
    public async Task All_pages_of_a_listing_show_the_version_of_the_first()
    {
        var names = new List<string>();
        var page = await service.Catalogue.ListStructuresAsync(new ListStructuresRequest { PageSize = 5, View = StructureView.Basic });
        var version = page.CatalogueVersion;
        var expected = (await service.Catalogue.ListStructuresAsync(new ListStructuresRequest { PageSize = 1000 })).Structures.Select(s => s.Name).ToList();
        names.AddRange(page.Structures.Select(s => s.Name));
        Assert.All(page.Structures, s => Assert.All(s.Units, u => Assert.Empty(u.Effects)));
        var last = await service.GetAsync(expected[^1]);
        await service.UpdateAsync(new Structure(last) { Title = last.Title + " while listed" });
        while (page.NextPageToken.Length > 0)
        {
            page = await service.Catalogue.ListStructuresAsync(new ListStructuresRequest { PageSize = 5, PageToken = page.NextPageToken });
            Assert.Equal(version, page.CatalogueVersion);
            names.AddRange(page.Structures.Select(s => s.Name));
            Assert.DoesNotContain(page.Structures, s => s.Title.EndsWith("while listed", StringComparison.Ordinal));
        }

        Assert.Equal(expected, names);
    }
}

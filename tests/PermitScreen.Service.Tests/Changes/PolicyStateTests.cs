using Grpc.Core;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Tests.BadInput;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Changes;

/// <summary>Rule B9: a policy is a versioned document; draft, confirmed by a named person, in force between two days, withdrawn.</summary>
public sealed class PolicyStateTests(RecordsService service) : IClassFixture<RecordsService>
{
    private static readonly Google.Type.Date Day = new() { Year = 2026, Month = 12, Day = 1 };

    private PolicyService.PolicyServiceClient Policies => service.Running.Policies;

    [Fact]
    public async Task Rule_B9_A_document_goes_from_draft_to_confirmed_to_in_force_to_withdrawn()
    {
        var draft = await CreateAsync("policies/county", 1);
        Assert.Equal(PolicyState.Draft, draft.State);
        var early = await Assert.ThrowsAsync<RpcException>(() => EnactAsync(draft));
        Assert.Equal(StatusCode.FailedPrecondition, early.StatusCode);

        var confirmed = (await Policies.ConfirmPolicyAsync(
            new ConfirmPolicyRequest
            {
                Name = "policies/county@1",
                Etag = draft.Etag,
                ChangeReason = "test",
                Confirmation = new PolicyConfirmation { Person = "N. N.", ConfirmedOn = Day, Reference = "decision 7" },
            },
            RecordsService.Actor)).Policy;
        var enacted = await EnactAsync(confirmed);
        Assert.Equal(PolicyState.InForce, enacted.State);
        Assert.DoesNotContain(await NoticesAsync("policies/county"), n => n.Contains("not confirmed", StringComparison.Ordinal));

        var changed = await Assert.ThrowsAsync<RpcException>(async () => await Policies.UpdatePolicyAsync(
            new UpdatePolicyRequest { Policy = new Policy(enacted) { State = PolicyState.Draft, Confirmation = null, Title = "other" }, ChangeReason = "test" }, RecordsService.Actor));
        Assert.Equal(StatusCode.FailedPrecondition, changed.StatusCode);

        await Policies.WithdrawPolicyAsync(new WithdrawPolicyRequest { Name = "policies/county@1", Etag = enacted.Etag, ChangeReason = "test" }, RecordsService.Actor);
        var error = await Assert.ThrowsAsync<RpcException>(() => NoticesAsync("policies/county"));
        Assert.Equal(StatusCode.FailedPrecondition, error.StatusCode);
    }

    [Fact]
    public async Task Rule_B9_A_draft_beside_a_document_in_force_is_used_only_by_its_own_name()
    {
        var first = await CreateAsync("policies/town", 1);
        var confirmed = (await Policies.ConfirmPolicyAsync(
            new ConfirmPolicyRequest { Name = "policies/town@1", Etag = first.Etag, ChangeReason = "test", Confirmation = new PolicyConfirmation { Person = "N. N.", ConfirmedOn = Day } },
            RecordsService.Actor)).Policy;
        await EnactAsync(confirmed);
        await CreateAsync("policies/town", 2);
        Assert.Equal("policies/town@1", (await ScreenAsync("policies/town")).Policy);
        Assert.Equal("policies/town@2", (await ScreenAsync("policies/town@2")).Policy);
        Assert.Contains("The policy is a draft.", await NoticesAsync("policies/town@2"));
        Assert.Equal(2, (await Policies.GetPolicyAsync(new GetPolicyRequest { Name = "policies/town" })).Policy.DocumentVersion);
    }

    [Fact]
    public async Task Rule_B9_Editing_a_confirmed_draft_takes_its_confirmation_away()
    {
        var draft = await CreateAsync("policies/parish", 1);
        var confirmed = (await Policies.ConfirmPolicyAsync(
            new ConfirmPolicyRequest { Name = "policies/parish@1", Etag = draft.Etag, ChangeReason = "test", Confirmation = new PolicyConfirmation { Person = "N. N.", ConfirmedOn = Day } },
            RecordsService.Actor)).Policy;
        var refused = await Assert.ThrowsAsync<RpcException>(async () =>
            await Policies.UpdatePolicyAsync(new UpdatePolicyRequest { Policy = new Policy(confirmed) { Title = "edited" }, ChangeReason = "test" }, RecordsService.Actor));
        Assert.Equal(StatusCode.InvalidArgument, refused.StatusCode);
        var edited = (await Policies.UpdatePolicyAsync(
            new UpdatePolicyRequest { Policy = new Policy(confirmed) { Title = "edited", Confirmation = null }, ChangeReason = "test" }, RecordsService.Actor)).Policy;
        Assert.Null(edited.Confirmation);
        var error = await Assert.ThrowsAsync<RpcException>(() => EnactAsync(edited));
        Assert.Equal(StatusCode.FailedPrecondition, error.StatusCode);
    }

    [Fact]
    public async Task Rule_B9_After_a_withdrawal_a_draft_is_not_used_in_its_place()
    {
        var first = await CreateAsync("policies/shire", 1);
        await CreateAsync("policies/shire", 2);
        await Policies.WithdrawPolicyAsync(new WithdrawPolicyRequest { Name = "policies/shire@1", Etag = first.Etag, ChangeReason = "test" }, RecordsService.Actor);
        var error = await Assert.ThrowsAsync<RpcException>(() => ScreenAsync("policies/shire"));
        Assert.Equal(StatusCode.FailedPrecondition, error.StatusCode);
        Assert.Equal("policies/shire@2", (await ScreenAsync("policies/shire@2")).Policy);
    }

    [Fact]
    public async Task Rule_B9_An_import_is_no_way_round_the_states()
    {
        var draft = await CreateAsync("policies/borough", 1);
        var confirmed = (await Policies.ConfirmPolicyAsync(
            new ConfirmPolicyRequest { Name = "policies/borough@1", Etag = draft.Etag, ChangeReason = "test", Confirmation = new PolicyConfirmation { Person = "N. N.", ConfirmedOn = Day } },
            RecordsService.Actor)).Policy;
        var enacted = await EnactAsync(confirmed);
        var unconfirmed = new Policy(Template("policies/hamlet", 1)) { State = PolicyState.InForce, InForceFrom = Day };
        Assert.Equal("state", Assert.Single(Assert.Single(await StageAsync(unconfirmed)).Faults).Field);
        Assert.Equal("state", Assert.Single(Assert.Single(await StageAsync(new Policy(enacted) { Title = "other numbers" })).Faults).Field);
        Assert.Empty(await StageAsync(enacted));
    }

    [Fact]
    public async Task A_step_sent_again_is_answered_as_before_whatever_came_after_it()
    {
        var request = new CreatePolicyRequest { Policy = Template("policies/manor", 1), ChangeReason = "test", RequestId = Guid.NewGuid().ToString() };
        var first = await Policies.CreatePolicyAsync(request, RecordsService.Actor);
        await CreateAsync("policies/manor", 2);
        Assert.Equal(first, await Policies.CreatePolicyAsync(request, RecordsService.Actor));
    }

    [Fact]
    public async Task The_next_document_has_the_next_number()
    {
        await CreateAsync("policies/village", 1);
        var error = await Assert.ThrowsAsync<RpcException>(() => CreateAsync("policies/village", 3));
        Assert.Equal(StatusCode.InvalidArgument, error.StatusCode);
        Assert.Contains("the next document of policies/village is 2", error.Status.Detail, StringComparison.Ordinal);
    }

    private async Task<IEnumerable<ImportRefusal>> StageAsync(Policy policy)
    {
        var import = (await service.Running.Imports.CreateImportAsync(new CreateImportRequest { ChangeReason = "test" }, RecordsService.Actor)).Import;
        return (await service.Running.Imports.StageImportPieceAsync(new StageImportPieceRequest { Name = import.Name, PieceIndex = 0, Policies = { policy } }, RecordsService.Actor)).Refusals;
    }

    private static Policy Template(string name, int version) =>
        new(ContractFiles.Policy("deploy", "policies", "lrfr-permit-2013.json")) { Name = name, DocumentVersion = version };

    private async Task<Policy> CreateAsync(string name, int version) =>
        (await Policies.CreatePolicyAsync(new CreatePolicyRequest { Policy = Template(name, version), ChangeReason = "test" }, RecordsService.Actor)).Policy;

    private async Task<Policy> EnactAsync(Policy policy) => (await Policies.EnactPolicyAsync(
        new EnactPolicyRequest { Name = $"{policy.Name}@{policy.DocumentVersion}", Etag = policy.Etag, InForceFrom = Day, ChangeReason = "test" }, RecordsService.Actor)).Policy;

    private async Task<Contracts.V1.Screening> ScreenAsync(string policy)
    {
        var request = DemoService.Request();
        request.Policy = policy;
        return (await service.Running.Screening.ScreenApplicationAsync(request)).Screening;
    }

    private async Task<IEnumerable<string>> NoticesAsync(string policy) => (await ScreenAsync(policy)).Notices;
}

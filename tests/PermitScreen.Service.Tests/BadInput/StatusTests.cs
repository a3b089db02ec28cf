using Google.Rpc;
using Grpc.Core;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>Requests that are well formed and cannot be answered with a pass, or not at all.</summary>
public sealed class StatusTests(DemoService demo) : IClassFixture<DemoService>
{
    [Fact]
    public async Task A_structure_that_is_not_in_the_catalogue_is_not_assessed()
    {
        var request = DemoService.Request();
        request.Application.Route.CrossingList.Crossings.Add(new Crossing { Structure = "structures/P99-0001", Relation = CrossingRelation.On });
        var screening = (await demo.Service.Screening.ScreenApplicationAsync(request)).Screening;
        Assert.Equal(Verdict.NotAssessed, screening.Verdict);
        Assert.Equal((1, 1), (screening.Counts.Pass, screening.Counts.NotAssessed));
        var crossing = screening.Crossings[1];
        Assert.Equal(Verdict.NotAssessed, crossing.Verdict);
        Assert.Equal(ReasonCode.NotInCatalogue, Assert.Single(crossing.Reasons).Code);
        Assert.False(crossing.HasRatingFactor);
    }

    [Fact]
    public async Task A_policy_that_there_is_not_is_not_found()
    {
        var request = DemoService.Request();
        request.Policy = "policies/another";
        var error = await Refused(request, StatusCode.NotFound);
        Assert.Equal("policies/another", error.GetRpcStatus()?.GetDetail<ResourceInfo>()?.ResourceName);
    }

    [Fact]
    public async Task A_withdrawn_policy_cannot_be_used()
    {
        var request = DemoService.Request();
        request.Policy = DemoService.Withdrawn;
        var error = await Refused(request, StatusCode.FailedPrecondition);
        Assert.Equal(DemoService.Withdrawn, Assert.Single(error.GetRpcStatus()!.GetDetail<PreconditionFailure>()!.Violations).Subject);
    }

    [Theory]
    [InlineData(2026, 12, 31, false)]
    [InlineData(2027, 1, 1, true)]
    [InlineData(2027, 12, 31, true)]
    [InlineData(2028, 1, 1, false)]
    public async Task A_policy_holds_between_its_days(int year, int month, int day, bool inForce)
    {
        var request = DemoService.Request();
        request.Policy = DemoService.Dated;
        request.AsOfDate = new Google.Type.Date { Year = year, Month = month, Day = day };
        request.Application.TravelTo = new Google.Type.Date { Year = 2028, Month = 6, Day = 1 };
        if (inForce)
        {
            Assert.NotNull((await demo.Service.Screening.ScreenApplicationAsync(request)).Screening);
        }
        else
        {
            await Refused(request, StatusCode.FailedPrecondition);
        }
    }

    [Fact]
    public async Task A_catalogue_older_than_asked_for_gives_no_verdict()
    {
        var request = DemoService.Request();
        request.MinCatalogueVersion = 2;
        await Refused(request, StatusCode.Unavailable);
        request.MinCatalogueVersion = 1;
        Assert.Equal(1, (await demo.Service.Screening.ScreenApplicationAsync(request)).Screening.CatalogueVersion);
    }

    [Fact]
    public async Task Changes_are_refused_where_the_records_end_with_the_service()
    {
        var structure = new Structure { Name = "structures/P14-0032" };
        var catalogue = demo.Service.Catalogue;
        var errors = new[]
        {
            await Assert.ThrowsAsync<RpcException>(async () => await catalogue.CreateStructureAsync(new CreateStructureRequest { Structure = structure })),
            await Assert.ThrowsAsync<RpcException>(async () => await catalogue.UpdateStructureAsync(new UpdateStructureRequest { Structure = structure })),
            await Assert.ThrowsAsync<RpcException>(async () => await catalogue.DeleteStructureAsync(new DeleteStructureRequest { Name = structure.Name })),
        };
        Assert.All(errors, e => Assert.Equal(StatusCode.FailedPrecondition, e.StatusCode));
    }

    [Fact]
    public async Task Pages_join_up_to_the_whole_list()
    {
        var all = await demo.Service.Catalogue.ListStructuresAsync(new ListStructuresRequest());
        var paged = new List<string>();
        var request = new ListStructuresRequest { PageSize = 5 };
        do
        {
            var page = await demo.Service.Catalogue.ListStructuresAsync(request);
            Assert.InRange(page.Structures.Count, 1, 5);
            paged.AddRange(page.Structures.Select(s => s.Name));
            request.PageToken = page.NextPageToken;
        }
        while (request.PageToken.Length > 0);
        Assert.Equal(12, all.Structures.Count);
        Assert.Equal(all.Structures.Select(s => s.Name), paged);
    }

    [Theory]
    [InlineData("abc")]
    [InlineData("-1")]
    [InlineData("13")]
    [InlineData("99999999999999999999")]
    public async Task A_token_of_no_page_is_refused(string token)
    {
        var error = await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Catalogue.ListStructuresAsync(new ListStructuresRequest { PageToken = token }));
        Assert.Equal(StatusCode.InvalidArgument, error.StatusCode);
        Assert.Equal("page_token", Assert.Single(error.GetRpcStatus()!.GetDetail<BadRequest>()!.FieldViolations).Field);
    }

    [Fact]
    public async Task A_negative_page_size_is_refused_on_every_list()
    {
        var errors = new[]
        {
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Catalogue.ListStructuresAsync(new ListStructuresRequest { PageSize = -1 })),
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Policies.ListPoliciesAsync(new ListPoliciesRequest { PageSize = -1 })),
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Catalogue.ListInfluenceLinesAsync(new ListInfluenceLinesRequest { Parent = "structures/P14-0032", PageSize = -1 })),
        };
        Assert.All(errors, e => Assert.Equal("page_size", Assert.Single(e.GetRpcStatus()!.GetDetail<BadRequest>()!.FieldViolations).Field));
    }

    [Fact]
    public async Task Names_that_there_are_not_are_not_found()
    {
        var errors = new[]
        {
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Catalogue.GetStructureAsync(new GetStructureRequest { Name = "structures/none" })),
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Catalogue.ListInfluenceLinesAsync(new ListInfluenceLinesRequest { Parent = "structures/none" })),
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Catalogue.ListInfluenceLinesAsync(new ListInfluenceLinesRequest { Parent = "structures/P14-0032", EffectId = "none" })),
            await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Policies.GetPolicyAsync(new GetPolicyRequest { Name = "policies/none" })),
        };
        Assert.All(errors, e => Assert.Equal(StatusCode.NotFound, e.StatusCode));
    }

    [Fact]
    public async Task Faults_of_a_check_are_the_answer_and_not_an_error()
    {
        var structure = new Structure { Name = "structures/x y" };
        structure.Units.Add(new Unit { UnitId = "a", Truss = new TrussUnit() });
        var ofStructure = await demo.Service.Catalogue.ValidateStructureAsync(new ValidateStructureRequest { Structure = structure });
        Assert.Contains("name", ofStructure.Faults.Select(f => f.Field));
        Assert.Contains("title", ofStructure.Faults.Select(f => f.Field));
        Assert.Contains("units[0].truss.deck", ofStructure.Faults.Select(f => f.Field));
        var ofPolicy = await demo.Service.Policies.ValidatePolicyAsync(new ValidatePolicyRequest { Policy = new Policy() });
        string[] needed = ["name", "title", "edition", "document_version", "state", "method", "limit_state", "dead_load_factors", "live_load_rows", "rungs", "lateral_rules.kerb_distance_m", "lateral_rules.tyre_gap_m", "multiple_presence", "capacity_rules.factor_floor", "weighing_rule.tolerance", "weighing_rule.relieving_axles_count", "standing_rules.height_margin_m", "standing_rules.width_margin_m", "standing_rules.poor_up_to_rating"];
        Assert.Empty(needed.Except(ofPolicy.Faults.Select(f => f.Field)));
    }

    private async Task<RpcException> Refused(ScreenApplicationRequest request, StatusCode code)
    {
        var error = await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Screening.ScreenApplicationAsync(request));
        Assert.Equal(code, error.StatusCode);
        return error;
    }
}

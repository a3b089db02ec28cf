using Google.Rpc;
using Grpc.Core;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>Malformed requests: INVALID_ARGUMENT with every fault at once, each with its field, what was found and what is allowed (design, section 9).</summary>
public sealed class RequestTests(DemoService demo) : IClassFixture<DemoService>
{
    private const string Train = "application.configurations[0].loading.axle_trains[0]";

    /// <summary>How a request is spoilt, and the field that the answer must name.</summary>
    private static readonly Dictionary<string, (Action<ScreenApplicationRequest> Spoil, string Field)> Faults = new(StringComparer.Ordinal)
    {
        ["no application"] = (r => r.Application = null, "application"),
        ["no policy"] = (r => r.Policy = "", "policy"),
        ["policy that is no resource name"] = (r => r.Policy = "Ossel Demo", "policy"),
        ["no kind of permit"] = (r => r.Application.PermitKind = PermitKind.Unspecified, "application.permit_kind"),
        ["unknown kind of permit"] = (r => r.Application.PermitKind = (PermitKind)77, "application.permit_kind"),
        ["no first day"] = (r => r.Application.TravelFrom = null, "application.travel_from"),
        ["no last day"] = (r => r.Application.TravelTo = null, "application.travel_to"),
        ["last day before the first"] = (r => r.Application.TravelTo = Day(2026, 12, 2), "application.travel_to"),
        ["as-of date that does not exist"] = (r => r.AsOfDate = Day(2026, 2, 30), "as_of_date"),
        ["as-of date without a day"] = (r => r.AsOfDate = Day(2026, 2, 0), "as_of_date"),
        ["two trips of a single trip"] = (r => r.Application.Trips = 2, "application.trips"),
        ["no trips"] = (r => r.Application.Trips = 0, "application.trips"),
        ["several trips, number not said"] = (SeveralTripsNotSaid, "application.trips"),
        ["several trips, too many"] = (r => (r.Application.PermitKind, r.Application.Trips) = (PermitKind.SpecialMultipleTrips, 100), "application.trips"),
        ["no configuration"] = (r => r.Application.Configurations.Clear(), "application.configurations"),
        ["two configurations of one id"] = (r => r.Application.Configurations.Add(r.Application.Configurations[0].Clone()), "application.configurations"),
        ["configuration without an id"] = (r => r.Application.Configurations[0].ConfigurationId = "", "application.configurations[0].configuration_id"),
        ["no loading"] = (r => r.Application.Configurations[0].Loading = null, "application.configurations[0].loading.axle_trains"),
        ["no axles"] = (r => TrainOf(r).Axles.Clear(), Train + ".axles"),
        ["load NaN"] = (r => TrainOf(r).Axles[0].LoadKn = double.NaN, Train + ".axles[0].load_kn"),
        ["load infinite"] = (r => TrainOf(r).Axles[3].LoadKn = double.PositiveInfinity, Train + ".axles[3].load_kn"),
        ["load negative"] = (r => TrainOf(r).Axles[2].LoadKn = -80, Train + ".axles[2].load_kn"),
        ["load zero"] = (r => TrainOf(r).Axles[2].LoadKn = 0, Train + ".axles[2].load_kn"),
        ["load absent"] = (r => TrainOf(r).Axles[2].ClearLoadKn(), Train + ".axles[2].load_kn"),
        ["offset NaN"] = (r => TrainOf(r).Axles[1].OffsetM = double.NaN, Train + ".axles[1].offset_m"),
        ["offset decreasing"] = (r => TrainOf(r).Axles[2].OffsetM = 0.5, Train + ".axles[2].offset_m"),
        ["axle without a place"] = (r => TrainOf(r).Axles[2].ClearPlace(), Train + ".axles[2].offset_m"),
        ["lead axle behind itself"] = (r => TrainOf(r).Axles[0].OffsetM = 1, Train + ".axles[0].offset_m"),
        ["offsets and gaps mixed"] = (r => TrainOf(r).Axles[2].GapM = 1.4, Train + ".axles"),
        ["width over tyres negative"] = (r => TrainOf(r).WidthOverTyresM = -3, Train + ".width_over_tyres_m"),
        ["width over tyres infinite"] = (r => TrainOf(r).WidthOverTyresM = double.PositiveInfinity, Train + ".width_over_tyres_m"),
        ["overall width NaN"] = (r => r.Application.Configurations[0].OverallWidthM = double.NaN, "application.configurations[0].overall_width_m"),
        ["overall height zero"] = (r => r.Application.Configurations[0].OverallHeightM = 0, "application.configurations[0].overall_height_m"),
        ["leg of no crossing"] = (r => r.Application.Configurations[0].LegIds.Add("nowhere"), "application.configurations[0].leg_ids[0]"),
        ["no route"] = (r => r.Application.Route = null, "application.route"),
        ["empty route"] = (r => r.Application.Route.CrossingList.Crossings.Clear(), "application.route.crossing_list.crossings"),
        ["route by road"] = (r => r.Application.Route.RoadStretches = new RoadStretchList(), "application.route.road_stretches"),
        ["crossing without a structure"] = (r => r.Application.Route.CrossingList.Crossings[0].Structure = "", "application.route.crossing_list.crossings[0].structure"),
        ["crossing of what is no structure"] = (r => r.Application.Route.CrossingList.Crossings[0].Structure = "bridges/7", "application.route.crossing_list.crossings[0].structure"),
        ["neither over nor under"] = (r => r.Application.Route.CrossingList.Crossings[0].Relation = CrossingRelation.Unspecified, "application.route.crossing_list.crossings[0].relation"),
        ["too many next effects"] = (r => r.NextEffects = 201, "next_effects"),
        ["negative number of next effects"] = (r => r.NextEffects = -1, "next_effects"),
    };

    public static TheoryData<string> Names() => [.. Faults.Keys];

    [Theory]
    [MemberData(nameof(Names))]
    public async Task A_fault_is_refused_with_its_field_and_what_is_allowed(string name)
    {
        var (spoil, field) = Faults[name];
        var request = DemoService.Request();
        spoil(request);
        var violations = await Violations(request);
        Assert.Contains(field, violations.Select(v => v.Field));
        Assert.All(violations, v => Assert.NotEmpty(v.Description));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public async Task Asking_for_a_check_alone_refuses_the_same(string name)
    {
        var request = DemoService.Request();
        request.ValidateOnly = true;
        Faults[name].Spoil(request);
        Assert.Contains(Faults[name].Field, (await Violations(request)).Select(v => v.Field));
    }

    [Fact]
    public async Task Every_fault_is_told_at_once()
    {
        string[] names =
        [
            "policy that is no resource name", "no kind of permit", "no first day", "as-of date that does not exist", "load NaN", "load negative",
            "load infinite", "offset NaN", "overall height zero", "neither over nor under", "too many next effects",
        ];
        var request = DemoService.Request();
        foreach (var name in names)
        {
            Faults[name].Spoil(request);
        }

        var found = (await Violations(request)).Select(v => v.Field).ToHashSet(StringComparer.Ordinal);
        Assert.Empty(names.Select(n => Faults[n].Field).Except(found));
    }

    [Fact]
    public async Task Value_found_and_what_is_allowed_are_told()
    {
        var request = DemoService.Request();
        TrainOf(request).Axles[2].LoadKn = -80.5;
        var violation = Assert.Single(await Violations(request));
        Assert.Contains("-80.5", violation.Description, StringComparison.Ordinal);
        Assert.Contains("greater than 0, kN", violation.Description, StringComparison.Ordinal);
    }

    [Fact]
    public async Task The_request_is_sound_where_nothing_is_spoilt()
    {
        var response = await demo.Service.Screening.ScreenApplicationAsync(DemoService.Request());
        Assert.Equal(Verdict.Pass, response.Screening.Verdict);
    }

    [Fact]
    public async Task Asking_for_a_check_alone_gives_no_verdict()
    {
        var request = DemoService.Request();
        request.ValidateOnly = true;
        Assert.Null((await demo.Service.Screening.ScreenApplicationAsync(request)).Screening);
    }

    private async Task<IReadOnlyList<BadRequest.Types.FieldViolation>> Violations(ScreenApplicationRequest request)
    {
        var error = await Assert.ThrowsAsync<RpcException>(async () => await demo.Service.Screening.ScreenApplicationAsync(request));
        Assert.Equal(StatusCode.InvalidArgument, error.StatusCode);
        var details = error.GetRpcStatus()?.GetDetail<BadRequest>();
        Assert.NotNull(details);
        return details.FieldViolations;
    }

    private static AxleTrain TrainOf(ScreenApplicationRequest request) => request.Application.Configurations[0].Loading.AxleTrains[0];

    private static Google.Type.Date Day(int year, int month, int day) => new() { Year = year, Month = month, Day = day };

    private static void SeveralTripsNotSaid(ScreenApplicationRequest request)
    {
        request.Application.PermitKind = PermitKind.SpecialMultipleTrips;
        request.Application.ClearTrips();
    }
}

using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>What stands beside every verdict: the caution (design, section 1), and that nobody confirmed the factors (engineering rule B9).</summary>
public sealed class CautionTests(DemoService demo) : IClassFixture<DemoService>
{
    [Theory]
    [InlineData(DemoService.Demo, ScreeningView.Unspecified)]
    [InlineData(DemoService.Demo, ScreeningView.Basic)]
    [InlineData(DemoService.Demo, ScreeningView.Full)]
    [InlineData(DemoService.Template, ScreeningView.Basic)]
    [InlineData(DemoService.Confirmed, ScreeningView.Basic)]
    public async Task The_caution_stands_in_every_screening(string policy, ScreeningView view)
    {
        var screening = await Screen(policy, view);
        Assert.Contains("no load rating and no permit", screening.Caution, StringComparison.Ordinal);
        Assert.Contains("licensed engineer", screening.Caution, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(DemoService.Demo, true)]
    [InlineData(DemoService.Template, true)]
    [InlineData(DemoService.Confirmed, false)]
    public async Task Factors_that_nobody_confirmed_are_told(string policy, bool told)
    {
        var notices = (await Screen(policy, ScreeningView.Basic)).Notices;
        Assert.Equal(told, notices.Any(n => n.Contains("not confirmed by", StringComparison.Ordinal)));
        Assert.Contains(notices, n => n.Contains("Weighing tolerance", StringComparison.Ordinal));
    }

    [Fact]
    public async Task The_caution_stands_where_nothing_could_be_assessed()
    {
        var request = DemoService.Request();
        request.Application.Route.CrossingList.Crossings[0].Structure = "structures/unknown";
        var screening = (await demo.Service.Screening.ScreenApplicationAsync(request)).Screening;
        Assert.Equal(Verdict.NotAssessed, screening.Verdict);
        Assert.Contains("no load rating and no permit", screening.Caution, StringComparison.Ordinal);
    }

    private async Task<Contracts.V1.Screening> Screen(string policy, ScreeningView view)
    {
        var request = DemoService.Request();
        (request.Policy, request.View) = (policy, view);
        return (await demo.Service.Screening.ScreenApplicationAsync(request)).Screening;
    }
}

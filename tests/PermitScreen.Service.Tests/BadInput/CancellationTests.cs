using Grpc.Core;
using Microsoft.Extensions.Logging.Abstractions;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>A call that is late or given up ends with its status and without a verdict.</summary>
public sealed class CancellationTests(DemoService demo) : IClassFixture<DemoService>
{
    private const int Many = 10_000;

    [Fact]
    public async Task A_deadline_that_passes_gives_no_verdict()
    {
        var error = await Assert.ThrowsAsync<RpcException>(async () =>
            await demo.Service.Screening.ScreenApplicationAsync(LongRoute(), deadline: FromNow(TimeSpan.FromMilliseconds(50))));
        Assert.Equal(StatusCode.DeadlineExceeded, error.StatusCode);
    }

    [Fact]
    public async Task A_call_that_is_given_up_gives_no_verdict()
    {
        using var giveUp = new CancellationTokenSource();
        var call = demo.Service.Screening.ScreenApplicationAsync(LongRoute(), cancellationToken: giveUp.Token);
        await giveUp.CancelAsync();
        var error = await Assert.ThrowsAsync<RpcException>(async () => await call);
        Assert.Equal(StatusCode.Cancelled, error.StatusCode);
    }

    [Fact]
    public void The_engine_stops_between_effects()
    {
        // The client ends a call by itself; that the server's work ends too is seen here.
        var (application, structures, policy) = ContractFiles.HandWorked("01-pass-with-traffic");
        var screen = new InProcess(application, structures, policy, ContractFiles.HandWorkedDay);
        Assert.Throws<OperationCanceledException>(() => screen.Screen(new CancellationToken(canceled: true)));
    }

    [Theory]
    [InlineData(-1, StatusCode.DeadlineExceeded)]
    [InlineData(+600, StatusCode.Cancelled)]
    public async Task The_server_tells_a_deadline_from_a_cancellation(int secondsToDeadline, StatusCode code)
    {
        var error = await Intercepted(new OperationCanceledException(), secondsToDeadline, cancelled: true);
        Assert.Equal(code, error.StatusCode);
        Assert.Contains("no verdict was given", error.Status.Detail, StringComparison.Ordinal);
    }

    [Fact]
    public async Task What_nobody_foresaw_is_internal_and_shows_nothing_of_the_inside()
    {
        var error = await Intercepted(new InvalidOperationException("secret detail"), 600, cancelled: false);
        Assert.Equal(StatusCode.Internal, error.StatusCode);
        Assert.DoesNotContain("secret", error.Status.Detail, StringComparison.Ordinal);
        Assert.Contains("no verdict was given", error.Status.Detail, StringComparison.Ordinal);
    }

    private static async Task<RpcException> Intercepted(Exception thrown, int secondsToDeadline, bool cancelled)
    {
        var interceptor = new ErrorInterceptor(NullLogger<ErrorInterceptor>.Instance);
        var context = new CallContext(FromNow(TimeSpan.FromSeconds(secondsToDeadline)), new CancellationToken(cancelled));
        return await Assert.ThrowsAsync<RpcException>(async () =>
            await interceptor.UnaryServerHandler<ScreenApplicationRequest, ScreenApplicationResponse>(new ScreenApplicationRequest(), context, (_, _) => throw thrown));
    }

    private static DateTime FromNow(TimeSpan time) => TimeProvider.System.GetUtcNow().UtcDateTime + time;

    /// <summary>Far more work than fits into the deadline.</summary>
    private static ScreenApplicationRequest LongRoute()
    {
        var request = DemoService.Request();
        var crossings = request.Application.Route.CrossingList.Crossings;
        crossings.Clear();
        crossings.AddRange(Enumerable.Range(0, Many).Select(_ => new Crossing { Structure = "structures/P14-0236", Relation = CrossingRelation.On }));
        return request;
    }
}

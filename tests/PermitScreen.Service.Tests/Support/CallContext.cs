using Grpc.Core;

namespace PermitScreen.Service.Tests.Support;

/// <summary>A call as an interceptor sees it, without a wire.</summary>
internal sealed class CallContext(DateTime deadline, CancellationToken cancellation) : ServerCallContext
{
    protected override string MethodCore => "test";

    protected override string HostCore => "test";

    protected override string PeerCore => "test";

    protected override DateTime DeadlineCore => deadline;

    protected override Metadata RequestHeadersCore { get; } = [];

    protected override CancellationToken CancellationTokenCore => cancellation;

    protected override Metadata ResponseTrailersCore { get; } = [];

    protected override Status StatusCore { get; set; }

    protected override WriteOptions? WriteOptionsCore { get; set; }

    protected override AuthContext AuthContextCore { get; } = new(null, []);

    protected override ContextPropagationToken CreatePropagationTokenCore(ContextPropagationOptions? options) => throw new NotSupportedException();

    protected override Task WriteResponseHeadersAsyncCore(Metadata responseHeaders) => Task.CompletedTask;
}

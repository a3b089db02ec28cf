using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Tests.Support;

/// <summary>Verifies records.</summary>
internal static class Sound
{
    public static async Task<List<string>> Problems(this IRecordKeeping keeping, Digest? knownHash = null)
    {
        var problems = new List<string>();
        await foreach (var step in keeping.VerifyAsync(knownHash, CancellationToken.None))
        {
            if (step.Problem is { } problem)
            {
                problems.Add($"{step.Stage}: {problem}");
            }
        }

        return problems;
    }
}

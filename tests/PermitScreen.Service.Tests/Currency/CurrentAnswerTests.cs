using System.Collections.Concurrent;
using System.Diagnostics;
using Microsoft.Data.Sqlite;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Tests.BadInput;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Currency;

/// <summary>
/// While the structures of a route are revised as fast as the service takes it, each revision flipping a verdict, every answer names one version
/// that is not older than the newest one committed before the call, and holds the verdicts of just that version. What is committed is read from
/// the database itself, by a connection of the test's own.
/// </summary>
public sealed class CurrentAnswerTests : IAsyncLifetime
{
    private const int Writers = 4;
    private const int Readers = 1;
    private const int LeastOverlapping = 500;
#if DEBUG
    private const int LeastVersions = 1_000;
    private const string Build = "debug_build.";
#else
    private const int LeastVersions = 4_500;
    private const string Build = "";
#endif
    private static readonly TimeSpan BetweenCalls = TimeSpan.FromMilliseconds(8);
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(240);
    private readonly string _folder = Directory.CreateTempSubdirectory("permitscreen-tests-").FullName;
    private RunningService? _service;

    private RunningService Service => _service ?? throw new InvalidOperationException("Not started.");

    public async Task InitializeAsync() => _service = await RunningService.StartAsync(_folder);

    public async Task DisposeAsync()
    {
        await Service.DisposeAsync();
        SqliteConnection.ClearAllPools();
        Directory.Delete(_folder, recursive: true);
    }

    [Fact]
    public async Task Answers_hold_the_verdicts_of_one_version_that_is_not_older_than_the_call()
    {
        var (structures, request) = await RouteAsync();
        var first = (await Service.Catalogue.ListStructuresAsync(new ListStructuresRequest())).CatalogueVersion;
        var log = new VersionLog(first, structures.Count);
        var answers = new ConcurrentQueue<(long Before, long After, Contracts.V1.Screening Screening)>();
        using var stop = new CancellationTokenSource(Patience);
        var writing = Enumerable.Range(0, Writers).Select(w => Task.Run(() => WriteAsync(w, structures, log, stop.Token))).ToList();
        var reading = Enumerable.Range(0, Readers).Select(_ => Task.Run(() => ReadAsync(request, answers, stop.Token))).ToList();
        var (warm, clock) = ((Written: 0, Calls: 0), new Stopwatch());
        while (!stop.IsCancellationRequested && (answers.Count(a => a.After > a.Before) < LeastOverlapping || log.Count < LeastVersions) && !writing.Concat(reading).Any(t => t.IsCompleted))
        {
            await Task.Delay(100);
            if (!clock.IsRunning && log.Count >= LeastVersions / 3)
            {
                // What comes before is judged too, but not timed: the runtime still compiles what it runs.
                warm = (log.Count, answers.Count);
                clock.Start();
            }
        }

        var timed = clock.Elapsed.TotalSeconds;
        var (written, called) = (log.Count, answers.Count);
        await stop.CancelAsync();
        await Task.WhenAll(writing.Concat(reading));

        var states = log.Replay();
        var overlapping = answers.Count(a => a.After > a.Before);
        Figures.Note($"currency.{Build}revisions_per_second", (written - warm.Written) / timed);
        Figures.Note($"currency.{Build}calls_per_second", (called - warm.Calls) / timed);
        Figures.Note("currency.revisions", written);
        Figures.Note("currency.calls", answers.Count);
        Figures.Note("currency.calls_overlapping_a_commit", overlapping);
        Assert.All(answers, a => Judge(a.Before, a.After, a.Screening, states, first));
        Figures.Note("currency.answers_judged", answers.Count);
        Assert.True(overlapping >= LeastOverlapping, $"{overlapping} of {answers.Count} calls overlapped a commit.");
        Assert.True(written >= LeastVersions, $"{written} versions were written.");
    }

    private static void Judge(long before, long after, Contracts.V1.Screening screening, IReadOnlyList<bool[]> states, long first)
    {
        Assert.InRange(screening.CatalogueVersion, before, after);
        var expected = states[(int)(screening.CatalogueVersion - first)];
        Assert.Equal(expected, screening.Crossings.Select(c => c.Verdict != Verdict.Fail));
    }

    /// <summary>Structures that do not fail as they are, and the request that crosses just those.</summary>
    private async Task<(IReadOnlyList<Structure> Structures, ScreenApplicationRequest Request)> RouteAsync()
    {
        var (application, structures, policy) = ContractFiles.Demo("01-reactor-vessel-13-axles.json");
        await Service.ImportAsync(structures, [policy]);
        var request = new ScreenApplicationRequest { Application = application, Policy = DemoService.Demo, AsOfDate = new Google.Type.Date { Year = 2026, Month = 12, Day = 1 } };
        var screening = (await Service.Screening.ScreenApplicationAsync(request)).Screening;
        var kept = screening.Crossings.Where(c => c.Verdict is Verdict.Pass or Verdict.PassWithConditions && c.Relation == CrossingRelation.On).Select(c => c.Structure).Distinct().ToList();
        Assert.True(kept.Count >= Writers, $"Only {kept.Count} crossings of the demo pass.");
        var crossings = application.Route.CrossingList.Crossings;
        var wanted = crossings.Where(c => kept.Contains(c.Structure)).DistinctBy(c => c.Structure).ToList();
        crossings.Clear();
        crossings.AddRange(wanted);
        var route = new List<Structure>();
        foreach (var crossing in wanted)
        {
            route.Add((await Service.Catalogue.GetStructureAsync(new GetStructureRequest { Name = crossing.Structure })).Structure);
        }

        return (route, request);
    }

    /// <summary>Revises structures of its own in turn: weak, strong, weak, ...</summary>
    private async Task WriteAsync(int writer, IReadOnlyList<Structure> structures, VersionLog log, CancellationToken stop)
    {
        var own = Enumerable.Range(0, structures.Count).Where(i => i % Writers == writer).ToList();
        var etags = structures.Select(s => s.Etag).ToArray();
        for (var turn = 0; !stop.IsCancellationRequested; turn++)
        {
            var index = own[turn % own.Count];
            var strong = turn / own.Count % 2 == 1;
            var revised = strong ? structures[index].Clone() : Weak(structures[index]);
            revised.Etag = etags[index];

            // No revision has the content of an earlier one: what is kept by content helps none of them.
            revised.Title = FormattableString.Invariant($"{structures[index].Title}, revision {turn}");
            var answer = await Service.Catalogue.UpdateStructureAsync(
                new UpdateStructureRequest { Structure = revised, ChangeReason = "flip", RequestId = Guid.NewGuid().ToString() }, RunningService.Actor, cancellationToken: CancellationToken.None);
            etags[index] = answer.Structure.Etag;
            log.Add(answer.Structure.CatalogueVersion, index, strong);
        }
    }

    private async Task ReadAsync(ScreenApplicationRequest request, ConcurrentQueue<(long, long, Contracts.V1.Screening)> answers, CancellationToken stop)
    {
        await using var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = Path.Combine(_folder, "catalogue.db"), Mode = SqliteOpenMode.ReadOnly, Pooling = false }.ToString());
        await connection.OpenAsync(CancellationToken.None);
        await using var command = connection.CreateCommand();
        command.CommandText = "SELECT version FROM version";
        while (!stop.IsCancellationRequested)
        {
            var before = (long)command.ExecuteScalar()!;
            var screening = (await Service.Screening.ScreenApplicationAsync(request, cancellationToken: CancellationToken.None)).Screening;
            answers.Enqueue((before, (long)command.ExecuteScalar()!, screening));

            // Two processors serve the writers, their callers and this one too: it is to screen all the time, not to take what the writers need.
            await Task.Delay(BetweenCalls, CancellationToken.None);
        }
    }

    /// <summary>The structure with resistances that its dead load alone exceeds.</summary>
    private static Structure Weak(Structure structure)
    {
        var weak = structure.Clone();
        foreach (var resistance in weak.Units.SelectMany(u => u.Effects).Where(e => e.Rated is not null).SelectMany(e => e.Rated.Resistances))
        {
            if (resistance.HasNominalKn)
            {
                resistance.NominalKn /= 1000;
            }
            else if (resistance.HasFactoredKn)
            {
                resistance.FactoredKn /= 1000;
            }
        }

        return weak;
    }
}

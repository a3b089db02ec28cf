using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Damage;

/// <summary>Small records with everything in them, and every answer that can be read from them.</summary>
internal static class SmallRecords
{
    public static async Task MakeAsync(string folder)
    {
        await using var records = SqliteStores.Open(folder);
        var (store, imports) = (records.Catalogue, records.Imports);
        for (var i = 0; i < 12; i++)
        {
            await store.Done(Add(Structure(Name(i), Long(i, 300 + (i * 40)), Name(i), "shared"), FormattableString.Invariant($"r{i}"), i));
        }

        for (var i = 0; i < 8; i++)
        {
            await store.Done(Revise(Structure(Name(i), Long(i + 100, 200 + (i * 1200)), Name(i)), Structure(Name(i), Long(i, 300 + (i * 40))).Hash.Etag, minute: 20 + i));
        }

        await store.Done(Remove(ResourceKind.Structure, Name(0), Structure(Name(0), Long(100, 200)).Hash.Etag, "gone", 40));
        await store.Done(Add(Structure(Name(0), Long(7000, 900)), minute: 41));
        await store.Done(Remove(ResourceKind.Structure, Name(1), Structure(Name(1), Long(101, 1400)).Hash.Etag, minute: 42));
        await imports.BeginAsync(Import("i1", partial: true), CancellationToken.None);
        await imports.StageAsync("i1", Piece(0, [new ImportRefusal(0, "structures/bad", "", [new("a", "b")])], Structure(Name(2), Long(9, 500)), Structure(Name(20), Long(20, 5000)), Policy("policies/p@1", "p")), CancellationToken.None);
        await imports.PublishAsync("i1", 1, By("pub", 50), CancellationToken.None);
        await imports.BeginAsync(Import("i2"), CancellationToken.None);
        await imports.StageAsync("i2", Piece(0, [.. Enumerable.Range(50, 10).Select(i => Structure(Name(i), Long(i, 3000)))]), CancellationToken.None);
        await imports.CancelAsync("i2", By("stop", 60), CancellationToken.None);
        await imports.BeginAsync(Import("i3"), CancellationToken.None);
        await imports.StageAsync("i3", Piece(0, Structure(Name(70), "staged", "staged")), CancellationToken.None);
        await records.Backlog.NoteFailureAsync(Line(Name(3)), "fails", CancellationToken.None);
        await records.Backlog.NoteMechanicsVersionAsync("1", CancellationToken.None);
        await store.Done(Add(Policy("policies/q@1", "q"), minute: 70));
    }

    /// <summary>Every question, with how to ask it.</summary>
    public static IReadOnlyList<(string Question, Func<SqliteRecords, Task<string>> Ask)> Questions { get; } = MakeQuestions();

    private static string Long(int seed, int length)
    {
        var random = new Random(seed);
        return string.Create(length, random, static (span, r) =>
        {
            foreach (ref var c in span)
            {
                c = (char)('a' + r.Next(26));
            }
        });
    }

    private static List<(string Question, Func<SqliteRecords, Task<string>> Ask)> MakeQuestions()
    {
        var questions = new List<(string, Func<SqliteRecords, Task<string>>)>
        {
            ("version", async r => Write([await r.Catalogue.ReadVersionAsync(CancellationToken.None)])),
            ("audit", async r => Write(await r.Catalogue.ReadAuditAsync(null, 1000, CancellationToken.None))),
            ("audit page", async r => Write(await r.Catalogue.ReadAuditAsync(12, 5, CancellationToken.None))),
            ("change sets", async r => Write(await r.Catalogue.ReadChangeSetsAsync(null, 1000, CancellationToken.None))),
            ("change set page", async r => Write(await r.Catalogue.ReadChangeSetsAsync(9, 4, CancellationToken.None))),
        };
        foreach (var version in new long[] { 5, 14, 21, 25 })
        {
            questions.Add(($"all of {version}", async r => Write((await r.Catalogue.All(version)).Select(x => $"{x.Head} {Digest.Of(x.Content.Span)}"))));
            questions.Add(($"stamp of {version}", async r => Write([await r.Catalogue.FindVersionAsync(version, CancellationToken.None)])));
            questions.Add(($"changes after {version}", async r =>
            {
                var changes = await r.Catalogue.ReadChangesAsync(version, CancellationToken.None);
                return Write(changes.Began.Select(x => $"{x.Head} {Digest.Of(x.Content.Span)}").Concat(changes.Gone.Select(g => g.ToString())).Append(changes.Stamp.ToString()));
            }
            ));
        }

        foreach (var (kind, name) in Enumerable.Range(0, 22).Select(i => (ResourceKind.Structure, Name(i))).Append((ResourceKind.Policy, "policies/p@1")).Append((ResourceKind.Policy, "policies/none@1")))
        {
            questions.Add(($"history of {name}", async r => Write(await r.Catalogue.ReadHistoryAsync(kind, name, CancellationToken.None))));
            foreach (var version in new long[] { 14, 25 })
            {
                questions.Add(($"{name} at {version}", async r =>
                    await r.Catalogue.FindAsync(kind, name, version, CancellationToken.None) is { } x ? $"{x.Head} {Digest.Of(x.Content.Span)}" : "none"));
            }
        }

        return questions;
    }

    private static string Write<T>(IEnumerable<T> answers) => string.Join('\n', answers);
}

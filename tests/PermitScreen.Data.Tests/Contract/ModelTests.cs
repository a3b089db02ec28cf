using CsCheck;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Contract;

/// <summary>Random work against a plain model: a list of dictionaries, one a version.</summary>
public sealed class ModelTests
{
    private const int Names = 6;
    private const int Texts = 4;

    private static readonly Gen<Step[]> Work = Gen.Select(Gen.Int[0, 3], Gen.Int[0, Names - 1], Gen.Int[0, Texts - 1], Gen.Int[0, (1 << Names) - 1], (kind, name, text, set) => new Step(kind, name, text, set)).Array[1, 40];

    [Fact]
    public void As_of_every_version_equals_the_history_of_the_model() =>
        Work.Sample(steps => Task.Run(() => Run(steps)).GetAwaiter().GetResult(), seed: "0000KOIPJEY20", iter: 60, threads: 2);

    private static async Task Run(Step[] steps)
    {
        await using var stores = await SqliteStores.OpenAsync();
        var model = new List<SortedDictionary<string, string>> { new(StringComparer.Ordinal) };
        for (var i = 0; i < steps.Length; i++)
        {
            var newest = model[^1];
            var step = steps[i];
            var (name, text) = (Name(step.Name), FormattableString.Invariant($"{step.Name % 2} {step.Text}"));
            switch (step.Kind)
            {
                case 0:
                    await Expect(await stores.Catalogue.CommitAsync(Add(Structure(name, text)), CancellationToken.None), newest.ContainsKey(name) ? typeof(ChangeOutcome.Exists) : null, m => m[name] = text);
                    break;
                case 1:
                    await Expect(
                        await stores.Catalogue.CommitAsync(Revise(Structure(name, text), Etag(newest, name)), CancellationToken.None),
                        !newest.TryGetValue(name, out var before) ? typeof(ChangeOutcome.Missing) : before == text ? typeof(ChangeOutcome.Unchanged) : null,
                        m => m[name] = text);
                    break;
                case 2:
                    await Expect(
                        await stores.Catalogue.CommitAsync(Remove(ResourceKind.Structure, name, Etag(newest, name)), CancellationToken.None),
                        newest.ContainsKey(name) ? null : typeof(ChangeOutcome.Missing),
                        m => m.Remove(name));
                    break;
                default:
                    await Import(FormattableString.Invariant($"i{i}"), [.. Enumerable.Range(0, Names).Where(n => (step.Set & (1 << n)) != 0)], step.Text);
                    break;
            }
        }

        for (var version = 0; version < model.Count; version++)
        {
            Assert.Equal(string.Join(' ', model[version].Select(p => $"{p.Key}={p.Value}")), await stores.Catalogue.Text(version));
            for (var n = 0; n < Names; n++)
            {
                var found = await stores.Catalogue.FindAsync(ResourceKind.Structure, Name(n), version, CancellationToken.None);
                Assert.Equal(model[version].GetValueOrDefault(Name(n)), found is null ? null : System.Text.Encoding.UTF8.GetString(found.Content.Span));
            }
        }

        Assert.Equal([], await stores.Keeping.Problems());

        async Task Expect(ChangeOutcome outcome, Type? against, Action<SortedDictionary<string, string>> change)
        {
            Assert.Equal(against ?? typeof(ChangeOutcome.Done), outcome.GetType());
            if (against is null)
            {
                var next = new SortedDictionary<string, string>(model[^1], StringComparer.Ordinal);
                change(next);
                model.Add(next);
            }

            Assert.Equal(model.Count - 1, (await stores.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        }

        async Task Import(string id, int[] names, int text)
        {
            await stores.Imports.BeginAsync(Samples.Import(id), CancellationToken.None);
            foreach (var (n, index) in names.Select((n, index) => (n, index)))
            {
                await stores.Imports.StageAsync(id, Piece(index, Structure(Name(n), FormattableString.Invariant($"{n % 2} {text}"))), CancellationToken.None);
            }

            var next = new SortedDictionary<string, string>(model[^1], StringComparer.Ordinal);
            foreach (var n in names)
            {
                next[Name(n)] = FormattableString.Invariant($"{n % 2} {text}");
            }

            var expected = new ImportResult(
                next.Keys.Count(k => !model[^1].ContainsKey(k)), next.Count(p => model[^1].TryGetValue(p.Key, out var b) && b != p.Value), names.Count(n => model[^1].GetValueOrDefault(Name(n)) == next[Name(n)]), null);
            var changed = expected.Added + expected.Revised > 0;
            var head = Assert.IsType<PublishOutcome.Published>(await stores.Imports.PublishAsync(id, names.Length, By("pub"), CancellationToken.None)).Head;
            Assert.Equal(expected with { Version = changed ? model.Count : null }, head.Result);
            if (changed)
            {
                model.Add(next);
            }
        }
    }

    private static string Etag(SortedDictionary<string, string> newest, string name) => newest.TryGetValue(name, out var text) ? Structure(name, text).Hash.Etag : "none";

    private sealed record Step(int Kind, int Name, int Text, int Set);
}

using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Tests.Support;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Tests.Lines;

/// <summary>However a truss is listed and named: one key, one set of lines to the bit.</summary>
public sealed class CanonicalTrussTests
{
    private const int Trusses = 300;

    [Fact]
    public void Order_and_names_change_neither_key_nor_lines()
    {
        var random = new Random(20260801);
        for (var i = 0; i < Trusses; i++)
        {
            var model = Shuffled.Random(random);
            var other = Shuffled.Of(model, random);
            Assert.Equal(TrussKey.Of(model), TrussKey.Of(other.Model));
            var own = new LineLibrary().GetOrSolve(model, new FaultList())!;
            var others = new LineLibrary().GetOrSolve(other.Model, new FaultList())!;
            LineBits.AssertSame(own.Reordered(other.MemberFrom, other.SupportFrom), others);
            Assert.Equal(
                new LineLibrary().Compute(model, new FaultList())!.Value.Blob, new LineLibrary().Compute(other.Model, new FaultList())!.Value.Blob);
        }

        Figures.Note("lines.canonical[trusses]", Trusses);
    }

    [Fact]
    public void Lines_agree_with_those_of_the_truss_as_it_is_listed()
    {
        var random = new Random(20260802);
        var worst = 0.0;
        for (var i = 0; i < Trusses; i++)
        {
            var model = Shuffled.Of(Shuffled.Random(random), random).Model;
            if (TrussLines.TrySolve(model, new FaultList()) is not { } listed)
            {
                Assert.Fail("A truss that stands in one order stands in another.");
                return;
            }

            var canonical = new LineLibrary().GetOrSolve(model, new FaultList())!;
            for (var m = 0; m < model.Members.Length; m++)
            {
                worst = Math.Max(worst, Difference(listed.Axial(m), canonical.Axial(m)));
            }

            for (var s = 0; s < model.Supports.Length; s++)
            {
                worst = Math.Max(worst, Difference(listed.ReactionX(s), canonical.ReactionX(s)));
                worst = Math.Max(worst, Difference(listed.ReactionY(s), canonical.ReactionY(s)));
            }
        }

        Figures.Note("lines.canonical[worst difference to listed order]", worst);
        Assert.InRange(worst, 0, 1e-9);
    }

    [Fact]
    public void The_canonical_model_is_its_own_canonical_form()
    {
        var random = new Random(20260803);
        for (var i = 0; i < 50; i++)
        {
            var truss = CanonicalTruss.Of(Shuffled.Of(Shuffled.Random(random), random).Model);
            var again = CanonicalTruss.Of(truss.Model);
            Assert.Equal(truss.Key, again.Key);
            Assert.Equal(Enumerable.Range(0, truss.Model.Members.Length), again.MemberOrder);
            Assert.Equal(Enumerable.Range(0, truss.Model.Supports.Length), again.SupportOrder);
            Assert.Equal(truss.Model.Nodes.AsEnumerable(), again.Model.Nodes);
            Assert.Equal(truss.Model.Members.AsEnumerable(), again.Model.Members);
        }
    }

    [Fact]
    public void Each_number_and_each_link_changes_the_key()
    {
        var random = new Random(20260804);
        var keys = new HashSet<Storage.Digest>();
        var made = 0;
        var model = Shuffled.Random(random);
        Add(model);
        for (var i = 0; i < model.Nodes.Length; i++)
        {
            Add(With(nodes: Changed(model.Nodes, i, n => n with { XM = Math.BitIncrement(n.XM) })));
            Add(With(nodes: Changed(model.Nodes, i, n => n with { YM = Math.BitIncrement(n.YM) })));
        }

        for (var i = 0; i < model.Members.Length; i++)
        {
            Add(With(members: Changed(model.Members, i, m => m with { AxialStiffnessKn = Math.BitIncrement(m.AxialStiffnessKn) })));
            Add(With(members: [.. model.Members.RemoveAt(i)]));
        }

        Add(With(end: new DeckEnd(DeckEndKind.OverhangingStringers, model.DeckEndM + 2)));
        Add(With(end: new DeckEnd(DeckEndKind.SeatedOnAbutment, model.DeckEndM + 2)));
        Add(With(start: new DeckEnd(DeckEndKind.SeatedOnAbutment, model.DeckStartM - 2)));
        Assert.True(made > model.Nodes.Length + model.Members.Length);
        Assert.Equal(made, keys.Count);

        void Add(TrussModel? changed)
        {
            if (changed is not null)
            {
                keys.Add(TrussKey.Of(changed));
                made++;
            }
        }

        TrussModel? With(TrussNode[]? nodes = null, TrussMember[]? members = null, DeckEnd? start = null, DeckEnd? end = null) => TrussModel.TryCreate(
            nodes ?? [.. model.Nodes], members ?? [.. model.Members], model.Supports, model.DeckPanelPoints, start ?? model.Start, end ?? model.End, new FaultList());

        static T[] Changed<T>(IReadOnlyList<T> list, int at, Func<T, T> change) => [.. list.Select((item, i) => i == at ? change(item) : item)];
    }

    [Fact]
    public void A_tip_that_an_end_floor_beam_does_not_have_is_not_part_of_the_key()
    {
        var model = Shuffled.Random(new Random(20260805));
        Assert.Equal(TrussKey.Of(Ending(1)), TrussKey.Of(Ending(2)));

        TrussModel Ending(double tipM) => TrussModel.TryCreate(
            model.Nodes, model.Members, model.Supports, model.DeckPanelPoints, model.Start, new DeckEnd(DeckEndKind.EndFloorBeam, tipM), new FaultList())!;
    }

    private static double Difference(InfluenceLine? one, InfluenceLine? other)
    {
        if (one is null || other is null)
        {
            Assert.Equal(one is null, other is null);
            return 0;
        }

        // Where an ordinate is nothing but rounding, one may have a zero crossing that the other has not: compared at the points of both.
        var scale = Math.Max(1, one.MaxAbs);
        return one.XM.ToArray().Concat(other.XM.ToArray())
            .Max(x => Math.Max(Math.Abs(one.At(x, Side.Before) - other.At(x, Side.Before)), Math.Abs(one.At(x, Side.After) - other.At(x, Side.After)))) / scale;
    }
}

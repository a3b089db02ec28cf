using System.Buffers.Binary;
using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>
/// A truss in an order and under names that do not depend on how it was written down: joints by place, members by their joints, supports by theirs.
/// The same truss gives the same lines to the bit, however it is listed. Immutable.
/// </summary>
public sealed class CanonicalTruss
{
    private const int FormatVersion = 1;

    private readonly TrussModel _original;
    private readonly CanonicalOrder _order;
    private TrussModel? _model;

    private CanonicalTruss(TrussModel original)
    {
        _original = original;
        _order = new CanonicalOrder(original);
        Key = Digest.Of(Bytes());
    }

    /// <summary>Address of its lines: SHA-256 over the format's and the mechanics' version, joints, connectivity, stiffness, supports and deck.</summary>
    public Digest Key { get; }

    /// <summary>The truss in canonical order, under the names n0, n1 …, m0 …, s0 ….</summary>
    public TrussModel Model => LazyInitializer.EnsureInitialized(ref _model, () => Build(i => Neutral('n', i), i => Neutral('m', i), i => Neutral('s', i)));

    /// <summary>For each member as given, its index in canonical order.</summary>
    public ImmutableArray<int> MemberOrder => _order.PlaceOfMember;

    /// <summary>For each support as given, its index in canonical order.</summary>
    public ImmutableArray<int> SupportOrder => _order.PlaceOfSupport;

    /// <summary>The canonical form of a truss.</summary>
    /// <param name="model">Truss.</param>
    public static CanonicalTruss Of(TrussModel model) => new(model);

    /// <summary>The truss in canonical order under its own names: what it is refused for does not depend on its order, and is told in its words.</summary>
    public TrussModel InOwnNames() => Build(
        i => _original.Nodes[_order.Joints[i]].Name,
        i => _original.Members[_order.Members[i]].Name,
        i => _original.Supports[_order.Supports[i]].Name);

    private static string Neutral(char kind, int index) => string.Create(CultureInfo.InvariantCulture, $"{kind}{index}");

    private static double Plain(double number) => number == 0 ? 0 : number;

    private static DeckEnd Plain(DeckEnd end) => new(end.Kind, end.Kind == DeckEndKind.EndFloorBeam ? 0 : Plain(end.TipM));

    private TrussModel Build(Func<int, string> joint, Func<int, string> member, Func<int, string> support)
    {
        var faults = new FaultList();
        return TrussModel.TryCreate(
            [.. _order.Joints.Select((j, i) => new TrussNode(joint(i), Plain(_original.Nodes[j].XM), Plain(_original.Nodes[j].YM)))],
            [.. _order.Members.Select((m, i) => new TrussMember(member(i), joint(_order.LowEnd[m]), joint(_order.HighEnd[m]), _original.Members[m].AxialStiffnessKn))],
            [.. _order.Supports.Select((s, i) => _original.Supports[s] with { Name = support(i), Node = joint(_order.Held[s]) })],
            [.. _order.Deck.Select(joint)],
            Plain(_original.Start),
            Plain(_original.End),
            faults) ?? throw new InvalidOperationException($"A sound truss stays sound in another order; found {faults.All[0]}.");
    }

    /// <summary>Layout: versions, then each list with its length, integers as 32 bits and numbers as IEEE 754 bits, all little-endian.</summary>
    private byte[] Bytes()
    {
        using var bytes = new MemoryStream();
        bytes.Write("truss-lines/"u8);
        Whole(FormatVersion);
        var version = Encoding.UTF8.GetBytes(TrussKey.MechanicsVersion);
        Whole(version.Length);
        bytes.Write(version);
        Whole(_order.Joints.Length);
        foreach (var j in _order.Joints)
        {
            Number(_original.Nodes[j].XM);
            Number(_original.Nodes[j].YM);
        }

        Whole(_order.Members.Length);
        foreach (var m in _order.Members)
        {
            Whole(_order.LowEnd[m]);
            Whole(_order.HighEnd[m]);
            Number(_original.Members[m].AxialStiffnessKn);
        }

        Whole(_order.Supports.Length);
        foreach (var s in _order.Supports)
        {
            Whole(_order.Held[s]);
            Whole((_original.Supports[s].HoldsX ? 1 : 0) + (_original.Supports[s].HoldsY ? 2 : 0));
        }

        Whole(_order.Deck.Length);
        foreach (var joint in _order.Deck)
        {
            Whole(joint);
        }

        foreach (var end in (ReadOnlySpan<DeckEnd>)[Plain(_original.Start), Plain(_original.End)])
        {
            Whole((int)end.Kind);
            Number(end.TipM);
        }

        return bytes.ToArray();

        void Whole(int value)
        {
            Span<byte> four = stackalloc byte[sizeof(int)];
            BinaryPrimitives.WriteInt32LittleEndian(four, value);
            bytes.Write(four);
        }

        void Number(double value)
        {
            Span<byte> eight = stackalloc byte[sizeof(double)];
            BinaryPrimitives.WriteDoubleLittleEndian(eight, Plain(value));
            bytes.Write(eight);
        }
    }
}

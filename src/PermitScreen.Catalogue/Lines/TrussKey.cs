using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>Content address of a truss's lines: SHA-256 over geometry, connectivity, stiffness, supports and deck. Names are not part of it.</summary>
public static class TrussKey
{
    /// <summary>Bumped whenever the same truss can give other lines.</summary>
    public const string MechanicsVersion = "1";

    /// <summary>The address, 64 hexadecimal digits.</summary>
    /// <param name="model">Truss.</param>
    public static string Of(TrussModel model)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hash.AppendData(Encoding.UTF8.GetBytes("truss-lines/" + MechanicsVersion));
        var nodes = new Dictionary<string, int>(StringComparer.Ordinal);
        Whole(model.Nodes.Length);
        foreach (var node in model.Nodes)
        {
            nodes.Add(node.Name, nodes.Count);
            Number(node.XM);
            Number(node.YM);
        }

        Whole(model.Members.Length);
        foreach (var member in model.Members)
        {
            Whole(nodes[member.StartNode]);
            Whole(nodes[member.EndNode]);
            Number(member.AxialStiffnessKn);
        }

        Whole(model.Supports.Length);
        foreach (var support in model.Supports)
        {
            Whole(nodes[support.Node]);
            Whole((support.HoldsX ? 1 : 0) + (support.HoldsY ? 2 : 0));
        }

        Whole(model.DeckPanelPoints.Length);
        foreach (var point in model.DeckPanelPoints)
        {
            Whole(nodes[point]);
        }

        foreach (var end in new[] { model.Start, model.End })
        {
            Whole((int)end.Kind);
            Number(end.Kind == DeckEndKind.EndFloorBeam ? 0 : end.TipM);
        }

        return Convert.ToHexStringLower(hash.GetHashAndReset());

        void Whole(int value)
        {
            Span<byte> bytes = stackalloc byte[sizeof(int)];
            BinaryPrimitives.WriteInt32LittleEndian(bytes, value);
            hash.AppendData(bytes);
        }

        void Number(double value)
        {
            Span<byte> bytes = stackalloc byte[sizeof(double)];
            BinaryPrimitives.WriteDoubleLittleEndian(bytes, value);
            hash.AppendData(bytes);
        }
    }
}

using System.Collections;
using Google.Protobuf;
using Google.Protobuf.Reflection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Lines;

/// <summary>Values to put into fields: others than are there, and such that as many as can be are accepted.</summary>
internal sealed class SampleValues
{
    private const int MostKnownTexts = 4;
    private const string NewText = "sample-1";

    /// <summary>Texts that name something which is there.</summary>
    private static readonly string[] References = ["node", "start_node", "end_node", "panel_points", "plane_ids", "support", "axial_member"];

    private readonly Dictionary<string, List<string>> _known = new(StringComparer.Ordinal);

    public SampleValues(Structure root) => Gather(root);

    /// <summary>Messages with every field filled in, one for each alternative of a oneof; fresh ones every time.</summary>
    public IEnumerable<IMessage> Filled(MessageDescriptor type)
    {
        var alternatives = type.Oneofs.Where(o => !o.IsSynthetic).Select(o => o.Fields.Count).DefaultIfEmpty(1).Max();
        return Enumerable.Range(0, alternatives).Select(a => Filled(type, a));
    }

    /// <summary>A message with its first field filled in, for those that do not bear all fields at once.</summary>
    public IMessage Sparse(MessageDescriptor type)
    {
        var message = type.Parser.ParseFrom(ByteString.Empty);
        var first = type.Fields.InFieldNumberOrder()[0];
        if (!first.IsRepeated)
        {
            first.Accessor.SetValue(message, first.Accessor.GetValue(Filled(type, 0)));
        }

        return message;
    }

    /// <summary>Values other than the known one.</summary>
    public IEnumerable<object> Others(FieldDescriptor field, object? known, Random random) => field.FieldType switch
    {
        FieldType.Double => new[] { (double?)known + 0.25, (double?)known * 1.5, 0, 1, 2026 }.OfType<double>().Distinct().Where(v => !v.Equals(known)).Cast<object>(),
        FieldType.Int32 => new[] { (int?)known + 1, (int?)known - 1, 1, 2, 7, 2026 }.OfType<int>().Distinct().Where(v => !v.Equals(known)).Cast<object>(),
        FieldType.Int64 => new[] { (long?)known + 1, 1 }.OfType<long>().Where(v => !v.Equals(known)).Cast<object>(),
        FieldType.Bool => new[] { true, false }.Where(v => !v.Equals(known)).Cast<object>(),
        FieldType.Enum => Enum.GetValues(field.EnumType.ClrType).Cast<object>().Where(v => !v.Equals(known)),
        FieldType.String => Texts(field, random).Where(v => !v.Equals(known)),
        _ => throw new NotSupportedException($"The contract has a kind of field that this test does not change yet: {field.FullName}."),
    };

    private IEnumerable<object> Texts(FieldDescriptor field, Random random)
    {
        var known = Known(field).ToArray();
        random.Shuffle(known);
        return known.Take(MostKnownTexts).Append(NewText).Append("").Append("structures/S-1").Append("sample 2");
    }

    private IMessage Filled(MessageDescriptor type, int alternative)
    {
        var message = type.Parser.ParseFrom(ByteString.Empty);
        foreach (var field in type.Fields.InFieldNumberOrder())
        {
            if (field.RealContainingOneof is { } oneof && field != oneof.Fields[Math.Min(alternative, oneof.Fields.Count - 1)])
            {
                continue;
            }

            var value = field.FieldType == FieldType.Message ? Filled(field.MessageType, 0) : Value(field);
            if (field.IsRepeated)
            {
                ((IList)field.Accessor.GetValue(message)).Add(value);
            }
            else
            {
                field.Accessor.SetValue(message, value);
            }
        }

        return message;
    }

    private object Value(FieldDescriptor field) => field.FieldType switch
    {
        FieldType.Double => 1.0,
        FieldType.Int32 => field.Name == "year" ? 2026 : 1,
        FieldType.Int64 => 1L,
        FieldType.Bool => true,
        FieldType.Enum => Enum.ToObject(field.EnumType.ClrType, 1),
        FieldType.String => References.Contains(field.Name) ? (field.Name == "end_node" ? Known(field).LastOrDefault() : Known(field).FirstOrDefault()) ?? NewText : NewText,
        _ => throw new NotSupportedException($"The contract has a kind of field that this test does not fill yet: {field.FullName}."),
    };

    private List<string> Known(FieldDescriptor field) => _known.TryGetValue(field.FullName, out var texts) ? texts : [];

    private void Gather(IMessage message)
    {
        foreach (var field in message.Descriptor.Fields.InFieldNumberOrder())
        {
            var value = field.Accessor.GetValue(message);
            foreach (var item in field.IsRepeated ? ((IList)value).Cast<object>() : value is null ? [] : [value])
            {
                if (item is IMessage below)
                {
                    Gather(below);
                }
                else if (item is string { Length: > 0 } text)
                {
                    var known = _known.TryGetValue(field.FullName, out var texts) ? texts : _known[field.FullName] = [];
                    if (!known.Contains(text))
                    {
                        known.Add(text);
                    }
                }
            }
        }
    }
}

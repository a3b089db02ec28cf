using System.Collections;
using Google.Protobuf;
using Google.Protobuf.Reflection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Lines;

/// <summary>
/// Changes of a structure by enumeration over the contract's descriptor: each field of each message, those that are absent too, each by itself.
/// Of long lists a few items are taken, drawn from a seed.
/// </summary>
internal sealed class FieldChanges(Structure root, int seed)
{
    private const int ItemsOfAList = 4;

    private readonly Random _random = new(seed);
    private readonly SampleValues _samples = new(root);

    public IEnumerable<FieldChange> All() => Below(root, []);

    /// <summary>Every field that a structure can have, at any depth.</summary>
    public static IReadOnlyCollection<FieldDescriptor> Reachable()
    {
        var seen = new HashSet<MessageDescriptor>();
        var open = new Stack<MessageDescriptor>([Structure.Descriptor]);
        while (open.TryPop(out var message))
        {
            if (seen.Add(message))
            {
                foreach (var field in message.Fields.InFieldNumberOrder().Where(f => f.FieldType == FieldType.Message))
                {
                    open.Push(field.MessageType);
                }
            }
        }

        return [.. seen.SelectMany(m => m.Fields.InFieldNumberOrder())];
    }

    private IEnumerable<FieldChange> Below(Structure whole, (FieldDescriptor Field, int? Index)[] path)
    {
        foreach (var field in At(whole, path).Descriptor.Fields.InFieldNumberOrder())
        {
            foreach (var (what, edit) in Edits(field, At(whole, path)))
            {
                yield return new FieldChange(field, what, whole, Copy(whole, path, edit));
            }

            if (field.FieldType == FieldType.Message)
            {
                foreach (var (deeper, step) in Deeper(whole, path, field))
                {
                    foreach (var change in Below(deeper, [.. path, step]))
                    {
                        yield return change;
                    }
                }
            }
        }
    }

    /// <summary>The messages under a field; where there is none, and for each kind of unit, one that is filled in for the purpose.</summary>
    private IEnumerable<(Structure Whole, (FieldDescriptor Field, int? Index) Step)> Deeper(
        Structure whole, (FieldDescriptor Field, int? Index)[] path, FieldDescriptor field)
    {
        var value = field.Accessor.GetValue(At(whole, path));
        if (!field.IsRepeated)
        {
            return value is not null
                ? [(whole, (field, null))]
                : _samples.Filled(field.MessageType).Select(f => (Copy(whole, path, m => field.Accessor.SetValue(m, f)), (field, (int?)null)));
        }

        var count = ((IList)value).Count;
        var there = Some(count).Select(i => (whole, (field, (int?)i)));
        var added = count == 0 || field.MessageType == Unit.Descriptor
            ? _samples.Filled(field.MessageType).Select(f => (Copy(whole, path, m => List(field, m).Add(f)), (field, (int?)count)))
            : [];
        return there.Concat(added);
    }

    private IEnumerable<(string What, Action<IMessage> Edit)> Edits(FieldDescriptor field, IMessage message)
    {
        if (field.IsRepeated)
        {
            return ListEdits(field, List(field, message).Count);
        }

        var value = field.Accessor.GetValue(message);
        var set = field.HasPresence ? field.Accessor.HasValue(message) : value is not null;
        var others = field.FieldType == FieldType.Message ? Messages(field) : _samples.Others(field, set ? value : null, _random);
        var edits = others.Select(other => ("set", (Action<IMessage>)(m => field.Accessor.SetValue(m, other))));
        return set && field.HasPresence ? edits.Append(("clear", field.Accessor.Clear)) : edits;
    }

    private IEnumerable<(string What, Action<IMessage> Edit)> ListEdits(FieldDescriptor field, int count)
    {
        var added = field.FieldType == FieldType.Message ? Messages(field) : _samples.Others(field, known: null, _random);
        foreach (var item in added)
        {
            yield return ("add", m => List(field, m).Add(item));
        }

        foreach (var i in Some(count))
        {
            yield return ("remove", m => List(field, m).RemoveAt(i));
            if (i > 0)
            {
                yield return ("swap", m => Swap(List(field, m), i, i - 1));
            }

            foreach (var other in field.FieldType == FieldType.Message ? [] : _samples.Others(field, known: null, _random))
            {
                yield return ("set", m => List(field, m)[i] = other);
            }
        }
    }

    private IEnumerable<IMessage> Messages(FieldDescriptor field) => _samples.Filled(field.MessageType).Append(_samples.Sparse(field.MessageType));

    private int[] Some(int count)
    {
        var all = Enumerable.Range(0, count).ToArray();
        _random.Shuffle(all);
        return all[..Math.Min(count, ItemsOfAList)];
    }

    private static void Swap(IList list, int a, int b) => (list[a], list[b]) = (list[b], list[a]);

    private static IList List(FieldDescriptor field, IMessage message) => (IList)field.Accessor.GetValue(message);

    private static Structure Copy(Structure whole, (FieldDescriptor Field, int? Index)[] path, Action<IMessage> edit)
    {
        var copy = whole.Clone();
        edit(At(copy, path));
        return copy;
    }

    private static IMessage At(Structure whole, (FieldDescriptor Field, int? Index)[] path)
    {
        IMessage at = whole;
        foreach (var (field, index) in path)
        {
            var value = field.Accessor.GetValue(at);
            at = (IMessage)(index is { } i ? ((IList)value)[i]! : value);
        }

        return at;
    }
}

using System.Collections;
using Google.Protobuf;
using Google.Protobuf.Reflection;

namespace PermitScreen.Service.Tests.Support;

/// <summary>A field that is set somewhere below a message.</summary>
/// <param name="root">Message.</param>
/// <param name="steps">Fields from the message down to it; an index where a list is passed.</param>
public sealed class SetField<T>(T root, (FieldDescriptor Field, int? Index)[] steps)
    where T : class, IMessage<T>
{
    /// <summary>The field itself.</summary>
    public FieldDescriptor Field => steps[^1].Field;

    /// <summary>Path with indices, for instance <c>units[0].truss.nodes[3].x_m</c>.</summary>
    public string Path => string.Join('.', steps.Select(s => s.Index is { } i ? FormattableString.Invariant($"{s.Field.Name}[{i}]") : s.Field.Name));

    /// <summary>Path without indices.</summary>
    public string Kind => string.Join('.', steps.Select(s => s.Field.Name));

    /// <summary>A copy in which the field is cleared.</summary>
    public T Cleared() => Changed(m => Field.Accessor.Clear(m));

    /// <summary>A copy in which the field has another value.</summary>
    public T WithValue(object value) => Changed(m => Field.Accessor.SetValue(m, value));

    private T Changed(Action<IMessage> change)
    {
        var copy = root.Clone();
        IMessage at = copy;
        foreach (var (field, index) in steps[..^1])
        {
            var value = field.Accessor.GetValue(at);
            at = (IMessage)(index is { } i ? ((IList)value)[i]! : value);
        }

        change(at);
        return copy;
    }
}

using System.Collections;
using Google.Protobuf;
using Google.Protobuf.Reflection;

namespace PermitScreen.Service.Tests.Support;

/// <summary>Walks a message through its descriptor: every singular field that is set, at any depth, with a way to change it in a copy.</summary>
public static class MessageFields
{
    /// <summary>Every singular field that is set, in the message and in all messages below it, lists included.</summary>
    public static IEnumerable<SetField<T>> Set<T>(T root)
        where T : class, IMessage<T> =>
        Below(root, []).Select(steps => new SetField<T>(root, steps));

    private static IEnumerable<(FieldDescriptor Field, int? Index)[]> Below(IMessage message, (FieldDescriptor Field, int? Index)[] above)
    {
        foreach (var field in message.Descriptor.Fields.InFieldNumberOrder())
        {
            if (field.IsRepeated)
            {
                var list = (IList)field.Accessor.GetValue(message);
                for (var i = 0; field.FieldType == FieldType.Message && i < list.Count; i++)
                {
                    foreach (var deeper in Below((IMessage)list[i]!, [.. above, (field, i)]))
                    {
                        yield return deeper;
                    }
                }
            }
            else if (IsSet(field, message))
            {
                yield return [.. above, (field, null)];
                if (field.FieldType == FieldType.Message)
                {
                    foreach (var deeper in Below((IMessage)field.Accessor.GetValue(message), [.. above, (field, null)]))
                    {
                        yield return deeper;
                    }
                }
            }
        }
    }

    private static bool IsSet(FieldDescriptor field, IMessage message) =>
        field.HasPresence ? field.Accessor.HasValue(message) : field.Accessor.GetValue(message) switch
        {
            string text => text.Length > 0,
            bool flag => flag,
            Enum value => Convert.ToInt32(value, System.Globalization.CultureInfo.InvariantCulture) != 0,
            IConvertible number => number.ToDouble(System.Globalization.CultureInfo.InvariantCulture) != 0,
            _ => true,
        };
}

using Google.Protobuf;
using Google.Protobuf.WellKnownTypes;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Revisions;

/// <summary>Takes only some fields of a structure.</summary>
internal static class UpdateMasks
{
    private const string Everything = "*";
    private static readonly string[] NotToBeGiven = ["name", "etag", "catalogue_version"];

    /// <summary>The mask, or null where all fields are taken.</summary>
    public static FieldMask? Of(FieldMask? mask, FaultList faults)
    {
        if (mask is null || mask.Paths.Count == 0 || mask.Paths is [Everything])
        {
            return null;
        }

        foreach (var path in mask.Paths)
        {
            if (NotToBeGiven.Contains(path, StringComparer.Ordinal))
            {
                faults.Add("update_mask", $"Found \"{path}\"; this field is not revised, leave it out of the mask.");
            }
            else if (!FieldMask.IsValid(Structure.Descriptor, path))
            {
                var near = Spelling.Nearest(Structure.Descriptor.Fields.InFieldNumberOrder().Select(f => f.Name), path);
                faults.Add("update_mask", $"Found \"{path}\", which is no field of a structure; {(near is null ? "paths are those of the contract, such as inspection.superstructure_condition; a list is given as a whole" : $"did you mean \"{near}\"?")}.");
            }
        }

        return mask;
    }

    /// <summary>The newest content with the fields of the mask taken from the change; a field that the change lacks is taken out.</summary>
    public static Structure Merge(FieldMask mask, Structure change, Structure newest)
    {
        foreach (var path in mask.Paths)
        {
            Take(path.Split('.'), change, newest);
        }

        return newest;
    }

    /// <summary>Takes one field. What the change does not say is taken out, never set to 0: absent is not zero (rule F4).</summary>
    /// <remarks>The library's own merge writes the default of an absent number as if it had been said.</remarks>
    private static void Take(ReadOnlySpan<string> path, IMessage? change, IMessage target)
    {
        var field = target.Descriptor.FindFieldByName(path[0]);
        var said = change is not null && (field.IsRepeated || !field.HasPresence || field.Accessor.HasValue(change));
        if (path.Length > 1)
        {
            if (!said && !field.Accessor.HasValue(target))
            {
                return;
            }

            if (!field.Accessor.HasValue(target))
            {
                field.Accessor.SetValue(target, field.MessageType.Parser.ParseFrom(ByteString.Empty));
            }

            Take(path[1..], said ? (IMessage)field.Accessor.GetValue(change!) : null, (IMessage)field.Accessor.GetValue(target));
            return;
        }

        field.Accessor.Clear(target);
        if (!said)
        {
            return;
        }

        if (field.IsRepeated)
        {
            var items = (System.Collections.IList)field.Accessor.GetValue(target);
            foreach (var item in (System.Collections.IList)field.Accessor.GetValue(change!))
            {
                items.Add(item);
            }
        }
        else
        {
            field.Accessor.SetValue(target, field.Accessor.GetValue(change!));
        }
    }
}

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
        mask.Merge(change, newest, new FieldMask.MergeOptions { ReplaceMessageFields = true, ReplaceRepeatedFields = true, ReplacePrimitiveFields = true });
        return newest;
    }
}

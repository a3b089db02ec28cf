using System.Text.RegularExpressions;
using Google.Protobuf.Reflection;

namespace PermitScreen.Service.Tests.Contract;

/// <summary>The contract's own rules (design, section 9), walked through its descriptors: presence, units, comments, names.</summary>
public sealed partial class DescriptorTests
{
    /// <summary>Ends of names that are units.</summary>
    private static readonly string[] Units =
        ["_m", "_m2", "_m4", "_km", "_kn", "_knm", "_kn_per_m", "_kn_m2", "_mpa", "_deg", "_km_per_h", "_per_kn", "_per_m"];

    /// <summary>What a comment says where the name has no unit.</summary>
    private static readonly string[] UnitsInWords = ["dimensionless", "in the effect's unit", "trucks a day"];

    /// <summary>Numbers without presence: answers only, always filled, where 0 means nothing but 0.</summary>
    private static readonly Dictionary<string, string> AnswersOnly = new(StringComparer.Ordinal)
    {
        ["permitscreen.v1.Structure.catalogue_version"] = "output only; versions count from 1",
        ["permitscreen.v1.Policy.catalogue_version"] = "output only; versions count from 1",
        ["permitscreen.v1.ListStructuresResponse.catalogue_version"] = "an answer; versions count from 1",
        ["permitscreen.v1.DeleteStructureResponse.catalogue_version"] = "an answer; versions count from 1",
        ["permitscreen.v1.Screening.catalogue_version"] = "an answer; versions count from 1",
        ["permitscreen.v1.ValidateStructureResponse.effect_count"] = "an answer; a count",
    };

    [Fact]
    public void Every_number_can_be_told_from_its_absence()
    {
        var without = ContractDescriptors.Fields
            .Where(f => !f.IsRepeated && IsNumber(f) && !f.HasPresence)
            .Select(f => f.FullName)
            .Order(StringComparer.Ordinal);
        Assert.Equal(AnswersOnly.Keys.Order(StringComparer.Ordinal), without);
    }

    [Fact]
    public void No_number_is_of_single_precision() =>
        Assert.Empty(ContractDescriptors.Fields.Where(f => f.FieldType == FieldType.Float).Select(f => f.FullName));

    [Fact]
    public void Every_real_number_has_a_unit()
    {
        var without = ContractDescriptors.Fields
            .Where(f => f.FieldType == FieldType.Double
                && !Units.Any(u => f.Name.EndsWith(u, StringComparison.Ordinal))
                && !UnitsInWords.Any(w => ProtoComments.Of(f.FullName)?.Contains(w, StringComparison.Ordinal) == true))
            .Select(f => f.FullName);
        Assert.Empty(without);
    }

    [Fact]
    public void Everything_has_a_comment()
    {
        var names = ContractDescriptors.Messages.Select(m => m.FullName)
            .Concat(ContractDescriptors.Fields.Select(f => f.FullName))
            .Concat(ContractDescriptors.Messages.SelectMany(m => m.Oneofs).Where(o => !o.IsSynthetic).Select(o => o.FullName))
            .Concat(ContractDescriptors.Enums.Select(e => e.FullName))
            .Concat(ContractDescriptors.Enums.SelectMany(e => e.Values.Select(v => $"{e.FullName}/{v.Name}")))
            .Concat(ContractDescriptors.Services.Select(s => s.FullName))
            .Concat(ContractDescriptors.Services.SelectMany(s => s.Methods).Select(m => m.FullName))
            .ToList();
        var without = names.Where(n => string.IsNullOrWhiteSpace(ProtoComments.Of(n))).ToList();
        Figures.Note("contract", FormattableString.Invariant($"{names.Count} declarations, {without.Count} without a comment"));
        Assert.True(names.Count > 100, "The contract was not found.");
        Assert.Empty(without);
    }

    [Fact]
    public void Every_file_of_the_contract_is_walked()
    {
        var files = Directory.EnumerateFiles(Repository.Path("protos", "permitscreen"), "*.proto", SearchOption.AllDirectories)
            .Select(f => Path.GetRelativePath(Repository.Path("protos"), f).Replace('\\', '/'))
            .Order(StringComparer.Ordinal);
        Assert.Equal(files, ContractDescriptors.Files.Select(f => f.Name));
    }

    [Fact]
    public void Every_method_has_a_request_and_a_response_of_its_own()
    {
        Assert.All(ContractDescriptors.Services, s => Assert.EndsWith("Service", s.Name, StringComparison.Ordinal));
        Assert.All(ContractDescriptors.Services.SelectMany(s => s.Methods), m =>
        {
            Assert.Equal(m.Name + "Request", m.InputType.Name);
            Assert.Equal(m.Name + "Response", m.OutputType.Name);
        });
        var types = ContractDescriptors.Services.SelectMany(s => s.Methods).SelectMany(m => new[] { m.InputType.FullName, m.OutputType.FullName }).ToList();
        Assert.Equal(types.Count, types.Distinct().Count());
    }

    [Fact]
    public void Every_enumeration_begins_with_nothing_said_and_carries_its_name()
    {
        Assert.All(ContractDescriptors.Enums, e =>
        {
            var prefix = WordStart().Replace(e.Name, "_").ToUpperInvariant();
            Assert.Equal(prefix + "_UNSPECIFIED", e.FindValueByNumber(0)?.Name);
            Assert.All(e.Values, v => Assert.StartsWith(prefix + "_", v.Name, StringComparison.Ordinal));
            Assert.Equal(e.Values.Count, e.Values.Select(v => v.Number).Distinct().Count());
        });
    }

    [Fact]
    public void The_caution_stands_beside_every_verdict()
    {
        // A verdict is reached through Screening only, which has the caution (design, section 1).
        Assert.NotNull(Contracts.V1.Screening.Descriptor.FindFieldByName("caution"));
        var carriers = ContractDescriptors.Fields.Where(f => f.FieldType == FieldType.Enum && f.EnumType.Name == "Verdict").Select(f => f.ContainingType.Name);
        Assert.Equal(["CrossingResult", "Screening"], carriers.Order(StringComparer.Ordinal));
        var holders = ContractDescriptors.Fields.Where(f => f.FieldType == FieldType.Message && f.MessageType.Name == "CrossingResult").Select(f => f.ContainingType.Name);
        Assert.Equal(["Screening"], holders);
    }

    private static bool IsNumber(FieldDescriptor field) => field.FieldType is not
        (FieldType.Message or FieldType.Group or FieldType.Enum or FieldType.String or FieldType.Bytes or FieldType.Bool);

    [GeneratedRegex("(?<=[a-z0-9])(?=[A-Z])", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex WordStart();
}

using System.Reflection;
using Google.Protobuf.Reflection;

namespace PermitScreen.Service.Tests.Contract;

/// <summary>Everything that the contract declares, from the generated code.</summary>
internal static class ContractDescriptors
{
    public static IReadOnlyList<FileDescriptor> Files { get; } =
        [.. typeof(Contracts.V1.Screening).Assembly.GetTypes()
            .Select(t => t.GetProperty("Descriptor", BindingFlags.Public | BindingFlags.Static)?.GetValue(null))
            .OfType<FileDescriptor>()
            .OrderBy(f => f.Name, StringComparer.Ordinal)];

    public static IReadOnlyList<MessageDescriptor> Messages { get; } = [.. Files.SelectMany(f => f.MessageTypes.SelectMany(WithNested))];

    public static IReadOnlyList<EnumDescriptor> Enums { get; } = [.. Files.SelectMany(f => f.EnumTypes), .. Messages.SelectMany(m => m.EnumTypes)];

    public static IReadOnlyList<ServiceDescriptor> Services { get; } = [.. Files.SelectMany(f => f.Services)];

    public static IReadOnlyList<FieldDescriptor> Fields { get; } = [.. Messages.SelectMany(m => m.Fields.InDeclarationOrder())];

    private static IEnumerable<MessageDescriptor> WithNested(MessageDescriptor message) => [message, .. message.NestedTypes.SelectMany(WithNested)];
}

using Google.Protobuf.Reflection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Lines;

/// <summary>One change of one field.</summary>
/// <param name="Field">Field.</param>
/// <param name="What">What was done: set, clear, add, remove, swap.</param>
/// <param name="Before">Structure without the change.</param>
/// <param name="After">The same structure with it.</param>
internal sealed record FieldChange(FieldDescriptor Field, string What, Structure Before, Structure After);

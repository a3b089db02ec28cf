using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Writes reasons and faults for the contract.</summary>
internal static class ReasonWriter
{
    /// <summary>A reason.</summary>
    /// <remarks>The numbers of both enumerations are the same; a test walks them.</remarks>
    public static C.Reason Write(Reason reason) => new() { Code = (C.ReasonCode)(int)reason.Code, Message = reason.Message, Field = reason.Field };

    /// <summary>A fault of an input.</summary>
    public static C.FieldFault Write(Fault fault) => new() { Field = fault.Path, Description = fault.Message };

    /// <summary>A gap, as the answer of a check.</summary>
    public static C.FieldFault WriteGap(Reason reason) => new() { Field = reason.Field, Description = reason.Message };
}

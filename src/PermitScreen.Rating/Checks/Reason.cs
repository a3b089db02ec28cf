namespace PermitScreen.Rating.Checks;

/// <summary>One reason.</summary>
/// <param name="Code">For machines.</param>
/// <param name="Message">For people.</param>
/// <param name="Field">Field of the structure, application or policy at fault; empty where there is none.</param>
public sealed record Reason(ReasonCode Code, string Message, string Field = "");

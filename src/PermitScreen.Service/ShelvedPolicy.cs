using PermitScreen.Rating.Policies;

namespace PermitScreen.Service;

/// <summary>A policy as it was read, and as the engine uses it.</summary>
/// <param name="Contract">The contract's message, with its etag.</param>
/// <param name="Document">The checked document.</param>
public sealed record ShelvedPolicy(Contracts.V1.Policy Contract, PolicyDocument Document);

using System.Collections.Immutable;

namespace PermitScreen.Service;

/// <summary>The policies of this service. Filled once, before it serves.</summary>
public sealed class PolicyShelf
{
    private ImmutableSortedDictionary<string, ShelvedPolicy> _policies = ImmutableSortedDictionary.Create<string, ShelvedPolicy>(StringComparer.Ordinal);

    /// <summary>All policies in order of name.</summary>
    public IReadOnlyList<ShelvedPolicy> All => [.. _policies.Values];

    /// <summary>Their resource names.</summary>
    public IEnumerable<string> Names => _policies.Keys;

    /// <summary>The policy of a resource name, or null.</summary>
    /// <param name="name">Resource name.</param>
    public ShelvedPolicy? Find(string name) => _policies.GetValueOrDefault(name);

    /// <summary>Replaces all policies.</summary>
    /// <param name="policies">Policies of different names.</param>
    public void Fill(IEnumerable<ShelvedPolicy> policies) =>
        _policies = policies.ToImmutableSortedDictionary(p => p.Document.Name, p => p, StringComparer.Ordinal);
}

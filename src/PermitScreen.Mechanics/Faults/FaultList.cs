namespace PermitScreen.Mechanics.Faults;

/// <summary>Gathers every fault of an input, so that a user is told of all of them at once.</summary>
/// <remarks>A list made by <see cref="Under"/> or <see cref="At"/> writes to the same faults under a longer path. Not thread-safe.</remarks>
public sealed class FaultList
{
    private readonly List<Fault> _faults;
    private readonly string _prefix;

    /// <summary>Makes an empty list.</summary>
    public FaultList()
        : this([], "")
    {
    }

    private FaultList(List<Fault> faults, string prefix)
    {
        _faults = faults;
        _prefix = prefix;
    }

    /// <summary>All faults gathered so far, in the order found.</summary>
    public IReadOnlyList<Fault> All => _faults;

    /// <summary>Number of faults gathered so far, by this list and all that share it.</summary>
    public int Count => _faults.Count;

    /// <summary>Whether any fault was gathered.</summary>
    public bool Any => _faults.Count > 0;

    /// <summary>The same list one field deeper: <c>prefix.field</c>.</summary>
    /// <param name="field">Field name in the contract's spelling.</param>
    public FaultList Under(string field) => new(_faults, Join(field));

    /// <summary>The same list at one element of a repeated field: <c>prefix.field[index]</c>.</summary>
    /// <param name="field">Field name in the contract's spelling.</param>
    /// <param name="index">Zero-based index of the element.</param>
    public FaultList At(string field, int index) => new(_faults, Join(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{field}[{index}]")));

    /// <summary>Adds a fault at a field below this list's path.</summary>
    /// <param name="field">Field name; empty for this list's own path.</param>
    /// <param name="message">What was found and what is allowed.</param>
    public void Add(string field, string message) => _faults.Add(new Fault(field.Length == 0 ? _prefix : Join(field), message));

    private string Join(string field) => _prefix.Length == 0 ? field : $"{_prefix}.{field}";
}

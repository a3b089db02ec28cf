using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Screening.Crossings;

/// <summary>Gathers what standing and fit say about a crossing, beside the ladder.</summary>
public sealed class Findings
{
    private readonly List<Reason> _reasons = [];
    private readonly List<Reason> _flags = [];

    /// <summary>Worst verdict so far; a pass where nothing was found.</summary>
    public Verdict Verdict { get; private set; } = Verdict.Pass;

    /// <summary>Reasons found.</summary>
    public IReadOnlyList<Reason> Reasons => _reasons;

    /// <summary>Flags found.</summary>
    public IReadOnlyList<Reason> Flags => _flags;

    /// <summary>The crossing fails.</summary>
    /// <param name="code">Reason for machines.</param>
    /// <param name="message">Reason for people.</param>
    /// <param name="field">Field at fault.</param>
    public void Fail(ReasonCode code, string message, string field) => Add(Verdict.Fail, new Reason(code, message, field));

    /// <summary>The crossing cannot be assessed.</summary>
    /// <param name="code">Reason for machines.</param>
    /// <param name="message">Reason for people.</param>
    /// <param name="field">Field at fault.</param>
    public void NotAssessed(ReasonCode code, string message, string field) => Add(Verdict.NotAssessed, new Reason(code, message, field));

    /// <summary>What the policy does about a doubt.</summary>
    /// <param name="rule">Rule of the policy.</param>
    /// <param name="code">Reason for machines.</param>
    /// <param name="message">Reason for people.</param>
    /// <param name="field">Field at fault.</param>
    public void Doubt(DoubtRule rule, ReasonCode code, string message, string field)
    {
        if (rule == DoubtRule.Flag)
        {
            _flags.Add(new Reason(code, message, field));
        }
        else
        {
            NotAssessed(code, message, field);
        }
    }

    private void Add(Verdict verdict, Reason reason)
    {
        Verdict = Verdicts.Worse(Verdict, verdict);
        _reasons.Add(reason);
    }
}

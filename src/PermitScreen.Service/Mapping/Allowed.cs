namespace PermitScreen.Service.Mapping;

/// <summary>What a number may be.</summary>
internal enum Allowed
{
    /// <summary>Any finite number.</summary>
    Any,

    /// <summary>Greater than 0.</summary>
    Positive,

    /// <summary>0 or greater.</summary>
    NotNegative,

    /// <summary>Greater than 0, at most 1.</summary>
    Fraction,

    /// <summary>0 or greater, less than 1.</summary>
    BelowOne,

    /// <summary>1 or greater.</summary>
    OneOrMore,
}

namespace Campaigns.Statistics.Corrections;

/// <summary>A condition on the joint law of the p-values, from the weakest demand to the strongest.</summary>
public enum Dependence
{
    /// <summary>Any joint law.</summary>
    Any,

    /// <summary>The p-values of true nulls satisfy Sidak's inequality: P(all above c) is at least the product; holds under independence and for two-sided normal tests of any correlation.</summary>
    Sidak,

    /// <summary>Simes' inequality holds for the true nulls; holds under independence and positive regression dependence.</summary>
    Simes,

    /// <summary>Positive regression dependence on the subset of true nulls; independence is a special case.</summary>
    PositiveRegression,

    /// <summary>Independent p-values.</summary>
    Independent,

    /// <summary>Independent p-values whose true nulls are uniformly conservative: P(p at most u tau, given p at most tau) is at most u for all u and tau; exactly uniform p-values are.</summary>
    IndependentConservative,
}

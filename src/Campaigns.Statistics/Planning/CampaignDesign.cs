namespace Campaigns.Statistics.Planning;

/// <summary>A campaign of experiments of one design: so many of them, some with a real effect, all of the same size, the others with none.</summary>
/// <remarks>Independent experiments, each with the F test of its groups; the p-value of an experiment without an effect is uniform. Source of the two-group model: Genovese and Wasserman (2002), Journal of the Royal Statistical Society B 64:499-517.</remarks>
public sealed record CampaignDesign
{
    /// <summary>Describes a campaign.</summary>
    /// <param name="experiments">Experiments, m; at least 1.</param>
    /// <param name="real">How many have a real effect.</param>
    /// <param name="experiment">Groups and observations of each experiment.</param>
    /// <param name="noncentrality">Lambda of a real effect, at least 0 and finite; <see cref="OneWayPower.Noncentrality"/> and <see cref="OneWayPower.NoncentralityOfDifference"/> make it.</param>
    /// <exception cref="ArgumentException">An argument is outside its range, or more effects are real than there are experiments.</exception>
    public CampaignDesign(int experiments, RealEffects real, OneWayDesign experiment, double noncentrality)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(experiments);
        ArgumentNullException.ThrowIfNull(real);
        ArgumentNullException.ThrowIfNull(experiment);
        if (!(noncentrality >= 0 && double.IsFinite(noncentrality)))
        {
            throw new ArgumentOutOfRangeException(nameof(noncentrality), noncentrality, "A noncentrality is at least 0 and finite.");
        }

        if (real.Number > experiments)
        {
            throw new ArgumentException(FormattableString.Invariant($"{real.Number} of {experiments} experiments cannot have a real effect."), nameof(real));
        }

        (Experiments, Real, Experiment, Noncentrality) = (experiments, real, experiment, noncentrality);
    }

    /// <summary>Experiments, m; at least 1.</summary>
    public int Experiments { get; }

    /// <summary>How many have a real effect.</summary>
    public RealEffects Real { get; }

    /// <summary>Groups and observations of each experiment.</summary>
    public OneWayDesign Experiment { get; }

    /// <summary>Lambda of a real effect; at least 0.</summary>
    public double Noncentrality { get; }

    /// <summary>The expected number of real effects, m1; the number itself where it is fixed.</summary>
    public double ExpectedReal => Real.Number ?? (Experiments * Real.Share!.Value);

    /// <summary>The share of experiments with a real effect, pi1: assumed, or m1/m.</summary>
    public double ShareReal => Real.Share ?? ((double)Real.Number!.Value / Experiments);

    /// <summary>The share of experiments without one, pi0.</summary>
    public double ShareNull => Real.Share is { } share ? 1 - share : (double)(Experiments - Real.Number!.Value) / Experiments;
}

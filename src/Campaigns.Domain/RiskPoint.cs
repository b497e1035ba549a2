namespace Campaigns.Domain;

/// <summary>What a campaign risked when one more of its experiments had been tested.</summary>
/// <param name="Tests">Tests so far, this one included.</param>
/// <param name="Experiment">The experiment tested.</param>
/// <param name="TestRun">Number of the run in which it was tested, over the whole catalog.</param>
/// <param name="Independent">The probability of at least one false positive without correction if nothing is real and the tests are independent.</param>
/// <param name="AtLeast">Its lower bound whatever the dependence.</param>
/// <param name="AtMost">Its upper bound whatever the dependence.</param>
/// <param name="ExpectedFalse">False positives to expect without correction if nothing is real.</param>
/// <param name="Hits">Tests so far whose own p-value is at most the level.</param>
/// <param name="Survivors">Tests so far that survive the correction as the campaign stands today.</param>
/// <param name="Corrected">What the correction still risked then; null where the campaign is corrected in several families.</param>
public sealed record RiskPoint(
    int Tests,
    ExperimentResult Experiment,
    long TestRun,
    double Independent,
    double AtLeast,
    double AtMost,
    double ExpectedFalse,
    int Hits,
    int Survivors,
    CorrectedRisk? Corrected);

using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Units;

/// <summary>Brings an experiment down to independent values: readings of one specimen become their mean.</summary>
/// <remarks>
/// A formulation is applied to a specimen as a whole, so that the specimen is the experimental unit: readings of the same one share its luck and are not independent observations of the formulation.
/// Testing the means of the specimens is the analysis of variance with subsampling where all specimens have as many readings (D. C. Montgomery, Design and Analysis of Experiments, on nested designs), and the usual approximation where they do not.
/// </remarks>
public static class ExperimentalUnits
{
    /// <summary>Tests an experiment on its units.</summary>
    /// <param name="test">The planned test.</param>
    /// <param name="readings">All its values, with their specimens where these are recorded.</param>
    /// <param name="draws">As in <see cref="GroupTest.Test(GroupedSample, RandomDraws)"/>.</param>
    /// <returns>The outcome; <see cref="TestOutcome.ObservationCount"/> counts the readings, <see cref="TestOutcome.SpecimenCount"/> the specimens that were tested, where any are recorded, and <see cref="TestOutcome.Specimens"/> says how readings and specimens vary.</returns>
    public static TestOutcome Test(GroupTest test, GroupedSample readings, RandomDraws draws)
    {
        ArgumentNullException.ThrowIfNull(test);
        if (SpecimenMeans.Of(readings) is not { } means)
        {
            TestOutcome plain = test.Test(readings, draws);
            return readings.Specimens.IsEmpty ? plain : plain with { SpecimenCount = readings.Count };
        }

        NotTestableReason? obstacle =
            means.InSeveralGroups ? NotTestableReason.SpecimenInSeveralGroups
            : means.InSeveralBlocks && test.UsesBlocks ? NotTestableReason.SpecimenInSeveralBlocks
            : null;
        TestOutcome outcome = obstacle is { } reason
            ? new NotTestable(GroupsWithValues(readings), means.Count, reason)
            : test.Test(means.Sample, draws);
        return outcome with { ObservationCount = readings.Count, SpecimenCount = means.Count, Specimens = SpecimenVariation.Of(readings) };
    }

    private static int GroupsWithValues(GroupedSample readings)
    {
        var seen = new HashSet<ushort>();
        foreach (ushort group in readings.Groups)
        {
            seen.Add(group);
        }

        return seen.Count;
    }
}

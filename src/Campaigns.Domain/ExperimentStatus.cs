using Campaigns.Statistics.GroupTests;

namespace Campaigns.Domain;

/// <summary>Where an experiment stands. The words in <see cref="ExperimentStatusWords"/> are frozen: files and scripts rely on them.</summary>
public enum ExperimentStatus
{
    /// <summary>Registered, no values yet.</summary>
    Planned,

    /// <summary>Some of the planned values are there.</summary>
    Incomplete,

    /// <summary>All planned values are there; not yet tested.</summary>
    Ready,

    /// <summary>Tested, with a result.</summary>
    Tested,

    /// <summary>Tested; fewer than two groups hold values.</summary>
    TooFewGroups,

    /// <summary>Tested; no group holds more than one value.</summary>
    NoReplication,

    /// <summary>Tested; all values are the same.</summary>
    ConstantResponse,

    /// <summary>Tested; no variation inside any group while the groups differ.</summary>
    ZeroWithinVariation,

    /// <summary>Tested; a group holds a single value, whose variance the test needs.</summary>
    GroupOfOne,

    /// <summary>Tested; the values of one group are all the same, and the test weights by variances.</summary>
    ConstantGroup,

    /// <summary>Tested; the test compares within blocks, and a value has none.</summary>
    BlockNotRecorded,

    /// <summary>Tested; the blocks do not connect all groups.</summary>
    DisconnectedBlocks,

    /// <summary>Tested; the test compares within blocks, and a specimen was read in several.</summary>
    SpecimenInSeveralBlocks,

    /// <summary>Tested; a specimen stands in several groups.</summary>
    SpecimenInSeveralGroups,

    /// <summary>Withdrawn: not tested, and without a result that counts where it was tested before.</summary>
    Withdrawn,
}

/// <summary>The frozen words and the plain sentences of <see cref="ExperimentStatus"/>.</summary>
public static class ExperimentStatusWords
{
    private static readonly (ExperimentStatus Status, string Word, string Sentence)[] Words =
    [
        (ExperimentStatus.Planned, "planned", "registered, no values yet"),
        (ExperimentStatus.Incomplete, "incomplete", "some of the planned values are missing"),
        (ExperimentStatus.Ready, "ready", "complete, not yet tested"),
        (ExperimentStatus.Tested, "tested", "tested"),
        (ExperimentStatus.TooFewGroups, "too-few-groups", "no test: fewer than two groups hold values"),
        (ExperimentStatus.NoReplication, "no-replication", "no test: no group holds more than one value"),
        (ExperimentStatus.ConstantResponse, "constant-response", "no test: all values are the same"),
        (ExperimentStatus.ZeroWithinVariation, "zero-within-variance", "no test: the values inside every group are all the same while the groups differ, so the measurement is too coarse to show its own variation"),
        (ExperimentStatus.GroupOfOne, "group-of-one", "no test: a group holds a single value, and this test needs the variance of every group"),
        (ExperimentStatus.ConstantGroup, "constant-group", "no test: the values of one group are all the same, and this test weights each group by its variance"),
        (ExperimentStatus.BlockNotRecorded, "block-not-recorded", "no test: it compares within blocks, and some value has no block recorded"),
        (ExperimentStatus.DisconnectedBlocks, "blocks-disconnected", "no test: it compares within blocks, and the blocks do not connect all groups with each other"),
        (ExperimentStatus.SpecimenInSeveralBlocks, "specimen-in-several-blocks", "no test: it compares within blocks, and readings of one specimen stand in several of them"),
        (ExperimentStatus.SpecimenInSeveralGroups, "specimen-in-several-groups", "no test: readings of one specimen stand in several groups, while an experimental unit belongs to one"),
        (ExperimentStatus.Withdrawn, "withdrawn", "withdrawn, so that it has no result that counts"),
    ];

    /// <summary>The frozen word of a status.</summary>
    public static string Word(this ExperimentStatus status) => Words[(int)status].Word;

    /// <summary>The status in a plain sentence, without a full stop.</summary>
    public static string Sentence(this ExperimentStatus status) => Words[(int)status].Sentence;

    /// <summary>The status of a frozen word.</summary>
    /// <exception cref="ArgumentException">No status has this word.</exception>
    public static ExperimentStatus Parse(string word)
    {
        foreach ((ExperimentStatus status, string known, _) in Words)
        {
            if (known == word)
            {
                return status;
            }
        }

        throw new ArgumentException($"'{word}' is no status of an experiment.", nameof(word));
    }

    /// <summary>The status of an experiment whose test found no result.</summary>
    public static ExperimentStatus Of(NotTestableReason reason) => reason switch
    {
        NotTestableReason.TooFewGroups => ExperimentStatus.TooFewGroups,
        NotTestableReason.NoReplication => ExperimentStatus.NoReplication,
        NotTestableReason.ConstantResponse => ExperimentStatus.ConstantResponse,
        NotTestableReason.ZeroWithinVariation => ExperimentStatus.ZeroWithinVariation,
        NotTestableReason.GroupOfOne => ExperimentStatus.GroupOfOne,
        NotTestableReason.ConstantGroup => ExperimentStatus.ConstantGroup,
        NotTestableReason.BlockNotRecorded => ExperimentStatus.BlockNotRecorded,
        NotTestableReason.DisconnectedBlocks => ExperimentStatus.DisconnectedBlocks,
        NotTestableReason.SpecimenInSeveralBlocks => ExperimentStatus.SpecimenInSeveralBlocks,
        NotTestableReason.SpecimenInSeveralGroups => ExperimentStatus.SpecimenInSeveralGroups,
        _ => throw new ArgumentOutOfRangeException(nameof(reason), reason, "No status for this reason."),
    };

    /// <summary>Whether the experiment's test was run, with or without a result, and stands; it is then closed to more data.</summary>
    public static bool WasTested(this ExperimentStatus status) => status is >= ExperimentStatus.Tested and not ExperimentStatus.Withdrawn;
}

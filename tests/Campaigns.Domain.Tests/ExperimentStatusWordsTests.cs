using Campaigns.Statistics.GroupTests;

namespace Campaigns.Domain.Tests;

public sealed class ExperimentStatusWordsTests
{
    /// <summary>Catalogs and scripts hold these words: they never change, and new ones are only added.</summary>
    private static readonly string[] Frozen =
        ["planned", "incomplete", "ready", "tested", "too-few-groups", "no-replication", "constant-response", "zero-within-variance",
         "group-of-one", "constant-group", "block-not-recorded", "blocks-disconnected", "specimen-in-several-blocks", "specimen-in-several-groups", "withdrawn"];

    [Fact]
    public void The_words_are_frozen_and_read_back()
    {
        ExperimentStatus[] all = Enum.GetValues<ExperimentStatus>();
        Assert.Equal(Frozen, all.Select(s => s.Word()));
        Assert.Equal(all, Frozen.Select(ExperimentStatusWords.Parse));
        Assert.Throws<ArgumentException>(() => ExperimentStatusWords.Parse("Tested"));
    }

    [Fact]
    public void Every_status_has_a_sentence_without_a_full_stop() =>
        Assert.All(Enum.GetValues<ExperimentStatus>(), s => Assert.Matches("^[a-z].*[a-z]$", s.Sentence()));

    [Fact]
    public void Only_a_test_that_was_run_closes_an_experiment() => Assert.Equal(
        [ExperimentStatus.Planned, ExperimentStatus.Incomplete, ExperimentStatus.Ready, ExperimentStatus.Withdrawn],
        Enum.GetValues<ExperimentStatus>().Where(s => !s.WasTested()));

    [Fact]
    public void Every_reason_why_there_is_no_result_has_a_status() => Assert.Equal(
        Enum.GetValues<NotTestableReason>().Select(r => r.ToString()),
        Enum.GetValues<NotTestableReason>().Select(r => ExperimentStatusWords.Of(r).ToString()));

    [Fact]
    public void The_words_of_follow_ups_are_frozen() =>
        Assert.Equal(["none", "tukey-kramer", "games-howell", "dunnett", "scheffe", "holm-pairs"], FollowUpKeys.All);
}

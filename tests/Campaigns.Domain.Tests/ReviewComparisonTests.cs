using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

/// <summary>Two reviews that differ in one thing, or in several at once: the reason given is the thing that made the difference.</summary>
/// <remarks>Adjusted p-values are small enough to be seen by hand: Bonferroni's is p times the size; Benjamini and Hochberg's the least p times size over rank of those not smaller.</remarks>
public sealed class ReviewComparisonTests
{
    private static readonly Dictionary<long, IReadOnlyList<ReviewEvent>> NoEvents = [];

    [Fact]
    public void What_was_first_tested_between_the_two_is_gained_for_that()
    {
        ReviewComparison compared = Compare("bh", Review(1, 3, (1, 0.001)), Review(2, 3, (1, 0.001), (2, 0.01)));
        Assert.Equal([(2L, true, ReviewReason.FirstTested)], Told(compared));
        Assert.Equal((1, 1, 0), (compared.Kept, compared.Added, compared.Gone));
    }

    [Theory]
    [InlineData(0.2, 0.01, true)]
    [InlineData(0.01, 0.2, false)]
    public void An_own_p_value_that_would_have_left_it_as_it_was_is_the_reason(double before, double after, bool gained)
    {
        ReviewComparison compared = Compare("bh", Review(1, 2, (1, before), (2, 0.001)), Review(2, 2, (1, after), (2, 0.001)));
        Assert.Equal([(1L, gained, ReviewReason.OwnP)], Told(compared));
        Assert.Equal((before, after), (compared.Differences[0].Before!.Value.P.Value, compared.Differences[0].After!.Value.P.Value));
    }

    [Theory]
    [InlineData(2, 3, false)]
    [InlineData(3, 2, true)]
    public void A_family_that_grows_loses_and_one_that_shrinks_gains(int before, int after, bool gained)
    {
        // Bonferroni: 0.02 x 2 = 0.04, 0.02 x 3 = 0.06.
        ReviewComparison compared = Compare("bonferroni", Review(1, before, (1, 0.02)), Review(2, after, (1, 0.02)));
        Assert.Equal([(1L, gained, ReviewReason.FamilySize)], Told(compared));
        Assert.Equal((before, after), (compared.Differences[0].SizeBefore, compared.Differences[0].SizeAfter));
    }

    [Fact]
    public void Another_p_value_that_fell_gains_an_experiment_whose_own_stayed()
    {
        // Benjamini and Hochberg: 0.04 x 2 / 1 = 0.08; with two of them 0.04 x 2 / 2 = 0.04.
        ReviewComparison compared = Compare("bh", Review(1, 2, (1, 0.04), (2, 0.5)), Review(2, 2, (1, 0.04), (2, 0.04)));
        Assert.Equal([(1L, true, ReviewReason.OtherP), (2L, true, ReviewReason.OwnP)], Told(compared));
        Assert.Equal(1, compared.OtherP);
    }

    [Fact]
    public void An_own_p_value_that_moved_without_consequence_is_not_blamed()
    {
        ReviewComparison compared = Compare("bh", Review(1, 2, (1, 0.04), (2, 0.5)), Review(2, 2, (1, 0.039), (2, 0.04)));
        Assert.Equal((1L, true, ReviewReason.OtherP), Told(compared)[0]);
    }

    [Fact]
    public void What_none_of_the_changes_does_alone_they_do_together()
    {
        // 0.03 x 4 = 0.12 before; size 3 alone 0.09; the other p alone 0.03 x 4 / 2 = 0.06; both 0.03 x 3 / 2 = 0.045.
        ReviewComparison compared = Compare("bh", Review(1, 4, (1, 0.03), (2, 0.9)), Review(2, 3, (1, 0.03), (2, 0.02)));
        Assert.Equal([(1L, true, ReviewReason.Together), (2L, true, ReviewReason.OwnP)], Told(compared));
    }

    [Fact]
    public void Weights_take_part_in_every_judgement()
    {
        // Weighted Bonferroni: p times the sum of weights over its own: 0.03 x 4 / 3 = 0.04 with weights 3 and 1, 0.03 x 5 / 3 = 0.05 with another of 1, 0.03 x 6 / 3 = 0.06 with two.
        FamilyCount rest = new(new Family(""), 4, 4) { WeightOfRest = 2 };
        ReviewedFamily before = Review(1, 2, "weighted-bonferroni", [3, 1], (1, 0.03), (2, 0.5));
        ReviewedFamily grown = before with { Members = before.Members with { Families = [rest] } };
        Assert.Equal([(1L, false, ReviewReason.FamilySize)], Told(Compare("weighted-bonferroni", before, grown)));
        ReviewedFamily kept = before with { Members = before.Members with { Families = [rest with { Size = 3, Planned = 3, WeightOfRest = 1 }] } };
        Assert.Empty(Compare("weighted-bonferroni", before, kept).Differences);
    }

    [Fact]
    public void A_gate_that_opened_is_the_reason_of_what_survives_behind_it()
    {
        Campaign campaign = Campaign("holm") with { Families = [new Family("a"), new Family("b") { OpensAfter = "a" }] };
        ReviewedFamily before = InTwoFamilies(campaign, 1, 0.9, 1e-6);
        ReviewedFamily after = InTwoFamilies(campaign, 2, 1e-6, 1e-6);
        ReviewComparison compared = ReviewComparison.Of(campaign, before, after, NoEvents, NotAsked);
        Assert.Equal([(1L, true, ReviewReason.OwnP), (2L, true, ReviewReason.FamilyOpened)], Told(compared));
        Assert.Equal(["a", "b"], compared.Differences.Select(d => d.Family));
        Assert.Equal(ReviewReason.FamilyClosed, ReviewComparison.Of(campaign, after, before, NoEvents, NotAsked).Differences[1].Reason);
    }

    [Fact]
    public void What_was_done_to_the_families_on_which_one_waits_is_told_with_its_gate_and_with_no_other()
    {
        // c waits on b, b on a: all three gates stand or fall with a, and what was done in d has nothing to do with them.
        Campaign campaign = Campaign("holm") with
        {
            Level = new SignificanceLevel(0.05),
            Families = [new Family("a"), new Family("b") { OpensAfter = "a" }, new Family("c") { OpensAfter = "b" }, new Family("d") { Level = new SignificanceLevel(0.01) }],
        };
        var events = new Dictionary<long, IReadOnlyList<ReviewEvent>>
        {
            [1] = [new ReviewEvent(ReviewCause.Exclusion, "torn") { Experiment = "A", Family = "a" }],
            [2] = [new ReviewEvent(ReviewCause.AddedValues, "more") { Experiment = "B", Family = "b" }],
            [4] = [new ReviewEvent(ReviewCause.PlanAmendment, "r") { Experiment = "D", Family = "d" }],
            [9] = [new ReviewEvent(ReviewCause.Withdrawal, "gone") { Experiment = "D2", Family = "d", ChangesFamily = true }],
        };
        ReviewComparison compared = ReviewComparison.Of(campaign, InFamilies(campaign, 1, 0.9, 1e-6, 1e-6, 0.5), InFamilies(campaign, 2, 1e-6, 1e-6, 1e-6, 0.5), events, NotAsked);
        Assert.Equal([(1L, true, ReviewReason.OwnP), (2L, true, ReviewReason.FamilyOpened), (3L, true, ReviewReason.FamilyOpened)], Told(compared));
        Assert.Equal([null, "a", "b"], compared.Differences.Select(d => d.Gate));
        Assert.Equal([0, 1, 0], compared.Differences.Select(d => d.GateResults));
        Assert.Equal(["", "A", "B A"], compared.Differences.Select(d => string.Join(' ', d.FamilyEvents.Select(e => e.Experiment))));
        Assert.Equal(
            [new ReviewFamilyChange("a", 0, 0, 0), new ReviewFamilyChange("b", 0, 0, 0), new ReviewFamilyChange("c", 0, 0, 0), new ReviewFamilyChange("d", 0, 1, 0)], compared.FamilyChanges);
    }

    [Fact]
    public void What_lost_its_line_is_told_by_what_the_record_says_of_it()
    {
        var events = new Dictionary<long, IReadOnlyList<ReviewEvent>> { [2] = [new ReviewEvent(ReviewCause.Exclusion, "a scratch")] };
        ReviewComparison compared = ReviewComparison.Of(
            Campaign("bh"), Review(1, 3, (1, 0.001), (2, 0.01)), Review(2, 3, (1, 0.001)), events, (inLater, key) => inLater && key == 2 ? ReviewReason.AwaitsTest : throw new InvalidOperationException());
        Assert.Equal([(2L, false, ReviewReason.AwaitsTest)], Told(compared));
        Assert.Equal((ReviewCause.Exclusion, "a scratch"), (compared.Differences[0].Events[0].Cause, compared.Differences[0].Events[0].Reason));
        Assert.Null(compared.Differences[0].After);
    }

    [Fact]
    public void What_kept_its_verdict_with_another_adjusted_p_value_is_counted()
    {
        ReviewComparison compared = Compare("bonferroni", Review(1, 2, (1, 0.001), (2, 0.4)), Review(2, 3, (1, 0.001), (2, 0.4)));
        Assert.Empty(compared.Differences);
        Assert.Equal((2, 0, false), (compared.OtherAdjusted, compared.OtherP, compared.NothingChanged));
    }

    [Fact]
    public void Two_equal_reviews_have_nothing_between_them()
    {
        ReviewComparison compared = Compare("bh", Review(1, 3, (1, 0.001), (2, 0.2)), Review(2, 3, (1, 0.001), (2, 0.2)));
        Assert.True(compared.NothingChanged);
        Assert.Equal(1, compared.Kept);
        Assert.False(Compare("bh", Review(1, 2, (1, 1.0), (2, 1.0)), Review(2, 3, (1, 1.0), (2, 1.0))).NothingChanged);
    }

    [Fact]
    public void Under_Bonferroni_only_the_own_p_value_and_the_size_are_ever_reasons()
    {
        // There the threshold is level / size whatever the others are, so the right answer is known: own p if p_A against the later threshold decides as before, else size.
        const int seed = 20261201;
        var random = new Random(seed);
        for (int round = 0; round < 300; round++)
        {
            int count = random.Next(1, 8);
            double[] first = [.. Enumerable.Range(0, count).Select(_ => random.NextDouble() * 0.05)];
            double[] second = [.. first.Select(p => random.Next(3) == 0 ? random.NextDouble() * 0.05 : p)];
            (int before, int after) = (count + random.Next(4), count + random.Next(4));
            ReviewComparison compared = Compare(
                "bonferroni", Review(1, before, [.. first.Select((p, i) => (i + 1L, p))]), Review(2, after, [.. second.Select((p, i) => (i + 1L, p))]));
            for (int i = 0; i < count; i++)
            {
                bool was = first[i] * before <= 0.05;
                bool isNow = second[i] * after <= 0.05;
                ReviewDifference? told = compared.Differences.SingleOrDefault(d => d.Key == i + 1);
                Assert.True((told is not null) == (was != isNow), FormattableString.Invariant($"seed {seed}, round {round}, experiment {i + 1}"));
                if (told is not null)
                {
                    bool ownDecides = first[i] != second[i] && first[i] * after <= 0.05 == was;
                    Assert.Equal(ownDecides ? ReviewReason.OwnP : ReviewReason.FamilySize, told.Reason);
                }
            }
        }
    }

    [Fact]
    public void Every_reason_and_every_cause_has_a_word_of_its_own()
    {
        Assert.Equal(
            ["first-tested", "own-p", "family-size", "other-p", "together", "family-opened", "family-closed", "awaits-test", "no-result", "withdrawn"],
            Enum.GetValues<ReviewReason>().Select(r => r.Word()));
        Assert.Equal(
            ["added-values", "exclusion", "exclusion-taken-back", "plan-amendment", "amended-in", "withdrawal", "withdrawal-taken-back"],
            Enum.GetValues<ReviewCause>().Select(c => c.Word()));
    }

    private static ReviewComparison Compare(string correction, ReviewedFamily before, ReviewedFamily after)
    {
        Campaign campaign = Campaign(correction);
        return ReviewComparison.Of(campaign, Judged(campaign, before), Judged(campaign, after), NoEvents, NotAsked);
    }

    /// <summary>Without a line in the earlier review only what was not tested is asked about.</summary>
    private static ReviewReason NotAsked(bool inLater, long key) => inLater ? throw new InvalidOperationException() : ReviewReason.FirstTested;

    private static (long, bool, ReviewReason)[] Told(ReviewComparison compared) => [.. compared.Differences.Select(d => (d.Key, d.IsGained, d.Reason))];

    private static Campaign Campaign(string correction) => new()
    {
        Code = "C",
        ErrorRate = ErrorRate.Familywise,
        Level = new SignificanceLevel(0.05),
        Correction = correction,
        OpenedAt = DateTimeOffset.UnixEpoch,
        SealedAt = DateTimeOffset.UnixEpoch,
    };

    private static ReviewedFamily Review(int number, int size, params (long Key, double P)[] lines) => Review(number, size, "bh", [], lines);

    private static ReviewedFamily Review(int number, int size, string correction, double[] weights, params (long Key, double P)[] lines)
    {
        FamilyMembers members = FamilyMembers.OneFamily(lines.Select(l => PValue.FromValue(l.P)).ToArray(), size) with { Weights = weights };
        return Judged(Campaign(correction), new ReviewedFamily(Head(number, size, lines.Length), lines.Select(l => l.Key).ToArray(), members, [], []));
    }

    private static ReviewedFamily InTwoFamilies(Campaign campaign, int number, double a, double b) => InFamilies(campaign, number, a, b);

    /// <summary>An experiment in each family, with these p-values.</summary>
    private static ReviewedFamily InFamilies(Campaign campaign, int number, params double[] p)
    {
        var tally = new FamilyTally(campaign);
        for (int i = 0; i < p.Length; i++)
        {
            tally.Add(campaign.Families[i].Name, null, null, PValue.FromValue(p[i]));
        }

        return Judged(campaign, new ReviewedFamily(Head(number, p.Length, p.Length), p.Select((_, i) => i + 1L).ToArray(), tally.Members(testedOnly: false), [], []));
    }

    private static ReviewedFamily Judged(Campaign campaign, ReviewedFamily review)
    {
        CampaignVerdict verdict = FamilyVerdict.Judge(campaign, review.Members);
        return review with
        {
            Lines = [.. verdict.Adjusted.Select((adjusted, i) => new ReviewLine(review.Members.P.Span[i], adjusted, verdict.Survives[i]))],
            Families = verdict.Families,
        };
    }

    private static ReviewHead Head(int number, int size, int tested) => new()
    {
        Number = number,
        At = DateTimeOffset.UnixEpoch,
        Correction = "bh",
        Level = new SignificanceLevel(0.05),
        FamilySize = size,
        TestedCount = tested,
        SurvivorCount = 0,
        IsInterim = false,
        ProgramVersion = "t",
    };
}

using Campaigns.App.Output;

namespace Campaigns.App.Commands;

/// <summary>The answers of the command size, with the sentences that people need beside them.</summary>
internal static class SizeTable
{
    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("groups", "groups", true), new("replicates", "replicates", true), new("observations", "in all", true), new("level", "level", true),
        new("effect", "effect f", true), new("noncentrality", "lambda", true, 1), new("power", "power", true), new("largest_difference", "difference", true),
    ];

    public static RowTable Of(SizeQuestion question, IReadOnlyList<SizeAnswer> answers) => new(Columns, answers.Select(a => Row(question, a)))
    {
        Above = [answers.Count == 1 ? Sentence(question, answers[0]) : Heading(question)],
        Below =
        [
            .. Below(question, answers),
            "Assumed: the F test; independent, normally distributed values, with the same standard deviation in every group; of repeated readings of one specimen only the specimens count. No guarantee for the effect you guessed: if the true one is smaller, or the spread larger, so is the power smaller.",
        ],
    };

    private static Cell[] Row(SizeQuestion question, SizeAnswer a) =>
    [
        Cell.Whole(a.Groups), Cell.Whole(a.Replicates), Cell.Whole(a.Observations), question.Tests == 1 ? Cell.Setting(a.Level) : Cell.Number(a.Level),
        Cell.Number(a.Effect), Cell.Number(a.Noncentrality), Cell.Number(a.Power), Cell.Number(a.LargestDifference),
    ];

    private static string Heading(SizeQuestion question) =>
        question.AsksReplicates ? "A row a combination: the least replicates that reach the wanted power, and the power that they give."
        : question.AsksPower ? "A row a combination: the power, that is the probability that the F test finds the effect."
        : "A row a combination: the smallest effect that is found with the wanted power.";

    private static string Sentence(SizeQuestion question, SizeAnswer a)
    {
        string design = a.Replicates is { } n
            ? FormattableString.Invariant($"{n} replicates in each of {a.Groups} groups, {a.Observations} observations in all,")
            : FormattableString.Invariant($"{a.Observations} observations in {a.Groups} groups of the sizes {string.Join(", ", question.Sizes!)}");
        string effect = $"f = {Text(a.Effect)}";
        string apart = a.LargestDifference is { } d ? Text(d) : "";
        string upTo = apart.Length > 0 ? $" (two means up to {apart} apart)" : "";
        string whenever = apart.Length > 0 ? $", and whenever two means lie {apart} or more apart," : "";
        string test = $"by the F test at level {Text(a.Level)}";
        return question.AsksPower ? $"{design} find an effect of {effect}{upTo} {test} with power {Power(a.Power)}."
            : question.AsksReplicates ? $"{design} find an effect of {effect}{upTo} {test} with power {Power(a.Power)}; {NumberText.RoundTrip(a.WantedPower!.Value)} was wanted{(a.Replicates > 2 ? ", and one replicate less in each group does not reach it" : ", and fewer than two replicates cannot be tested")}."
            : $"{design} find an effect of {effect} or more{whenever} {test} with power {NumberText.RoundTrip(a.WantedPower!.Value)} or more.";
    }

    private static IEnumerable<string> Below(SizeQuestion question, IReadOnlyList<SizeAnswer> answers)
    {
        yield return "Effect f (Cohen): the standard deviation of the group means, weighted with their observations, over the standard deviation within groups. Lambda: observations times f squared.";
        if (answers.Any(a => a.LargestDifference is not null))
        {
            yield return "Difference: the widest gap between two group means, in the unit of the response. Where only f or the difference itself was given, two groups lie that far apart and all others in the middle between them, which of all patterns with such a gap is the one that the F test finds hardest"
                + (question.Sizes is null ? "." : "; with unequal groups the two smallest, the others at the mean weighted with the observations.");
        }

        yield return question.Tests == 1
            ? "The level is that of this one test. Among many tests each has less: --tests N takes the Nth part, as Bonferroni's correction does."
            : FormattableString.Invariant($"The level of each of {question.Tests} tests is {string.Join(", ", question.Levels.Select(l => NumberText.RoundTrip(l)))} over {question.Tests}, as under Bonferroni's correction. The campaign's own correction may be milder, and then fewer replicates do; --campaign N plans the whole campaign with the correction itself.");
    }

    /// <summary>Never a rounded 1 for what is less.</summary>
    public static string Power(double power) => power > 0.9999 ? "above 0.9999" : NumberText.Screen(power, 4);

    /// <summary>A few digits, without the zeros at their end.</summary>
    public static string Text(double value, int digits = 4)
    {
        string text = NumberText.Screen(value, digits);
        return text.Contains('.', StringComparison.Ordinal) && !text.Contains('e', StringComparison.Ordinal) ? text.TrimEnd('0').TrimEnd('.') : text;
    }
}

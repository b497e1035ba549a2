namespace Campaigns.Domain;

/// <summary>A change of a sealed plan, with its reason; the sealed plan is what stands when all of them are undone.</summary>
/// <param name="Number">Number in the campaign, from 1: the version of its plan.</param>
/// <param name="Reason">Why.</param>
/// <param name="NamedBy">Who said so.</param>
/// <param name="At">When.</param>
/// <param name="Changes">What it changed, in the plan's order.</param>
public sealed record PlanAmendment(int Number, string Reason, string NamedBy, DateTimeOffset At, IReadOnlyList<PlanAmendmentChange> Changes);

/// <summary>One field of one experiment before and after an amendment.</summary>
/// <param name="Experiment">The experiment.</param>
/// <param name="Field">The column of the plan; <see cref="Added"/> where the amendment added the experiment.</param>
/// <param name="Before">What the field said, as a plan file would; null where it said nothing.</param>
/// <param name="After">What it says since; null where it says nothing.</param>
public sealed record PlanAmendmentChange(string Experiment, string Field, string? Before, string? After)
{
    /// <summary>The field of an experiment that an amendment added.</summary>
    public const string Added = "experiment";

    /// <summary>Whether the amendment added the experiment.</summary>
    public bool IsAdded => Field == Added;

    /// <summary>The change in plain words, without a full stop.</summary>
    /// <param name="amendment">The amendment to which it belongs.</param>
    public string Sentence(PlanAmendment amendment)
    {
        ArgumentNullException.ThrowIfNull(amendment);
        string what = IsAdded ? "added to the sealed plan" : $"{Field} of the sealed plan changed from {Said(Before)} to {Said(After)}";
        return FormattableString.Invariant($"{what} (amendment {amendment.Number}), by {amendment.NamedBy}: {amendment.Reason}");
    }

    private static string Said(string? text) => text is null ? "nothing" : $"'{text}'";
}

/// <summary>How far a plan was amended since its seal.</summary>
/// <param name="Amendments">Amendments: the version of the plan, 0 as it was sealed.</param>
/// <param name="Added">Experiments added.</param>
/// <param name="Changed">Experiments of the sealed plan, or added, of which a field was changed.</param>
public readonly record struct AmendedPlan(int Amendments, int Added, int Changed);

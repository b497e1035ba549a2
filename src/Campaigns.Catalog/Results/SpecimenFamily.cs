using Campaigns.Domain;
using Campaigns.Statistics.CampaignPermutation;

namespace Campaigns.Catalog.Results;

/// <summary>Tested experiments that were measured on the same specimens, each of them in the same groups.</summary>
/// <param name="Experiments">The experiments, in the plan's order.</param>
/// <param name="Set">Their values, ready to be permuted, a response for each experiment in the same order; null where one of them has a test whose statistic is not permuted.</param>
public sealed record ExperimentsOnSpecimens(IReadOnlyList<ExperimentResult> Experiments, SpecimenSet? Set);

/// <summary>The experiments of a campaign as far as permutations are concerned.</summary>
/// <param name="Standing">The campaign as it stands.</param>
/// <param name="Sets">Experiments by the specimens on which they were measured; different sets share no specimen.</param>
/// <param name="LeftOut">Tested experiments that are not permuted because of their test, in the plan's order.</param>
public sealed record SpecimenFamily(CampaignStanding Standing, IReadOnlyList<ExperimentsOnSpecimens> Sets, IReadOnlyList<ExperimentResult> LeftOut);

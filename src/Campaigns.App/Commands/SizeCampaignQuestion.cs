using Campaigns.App.Output;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>The command size, asked about a whole campaign.</summary>
internal sealed class SizeCampaignQuestion(SizeCampaign campaign, SizeQuestion one)
{
    public SizeCampaign Campaign { get; } = campaign;

    public SizeQuestion One { get; } = one;

    public bool AsksReplicates => Campaign.Wanted.Count > 0;

    /// <summary>A row a correction and combination: levels first, then real effects, effects, and designs or wanted shares.</summary>
    /// <exception cref="UsageException">What was typed leaves nothing or no answer to compute.</exception>
    /// <exception cref="OperationCanceledException">Somebody stopped it.</exception>
    public IReadOnlyList<SizeCampaignAnswer> Answers(Session session)
    {
        if (AsksReplicates == One.Designs.Count > 0)
        {
            throw new UsageException("Give either the replicates of each group with --replicates or --sizes, or with --wanted the share of the real effects that is to be found.");
        }

        using var line = new ProgressLine(session.Host);
        var work = new SizeCampaignWork(Campaign, line.Report, session.Host.Cancel);
        return
        [
            .. from level in One.Levels.Select(l => new SignificanceLevel(l))
               from real in Campaign.Real
               from effect in One.Effects
               from answer in AsksReplicates
                   ? Campaign.Wanted.SelectMany(wanted => Campaign.Corrections.Select(c => Replicates(work, c, level, real, effect, wanted)))
                   : One.Designs.SelectMany(design => Row(work, level, real, effect, design))
               select answer,
        ];
    }

    private IEnumerable<SizeCampaignAnswer> Row(SizeCampaignWork work, SignificanceLevel level, RealEffects real, SizeEffect effect, SizeDesign design)
    {
        CampaignDesign planned = Planned(real, effect, design);
        return Campaign.Corrections.Zip(work.Expect(planned, Campaign.Corrections, level), (correction, expected) => Answer(correction, level, planned, design.Replicates, effect, null, expected));
    }

    private SizeCampaignAnswer Replicates(SizeCampaignWork work, ErrorProcedure correction, SignificanceLevel level, RealEffects real, SizeEffect effect, double wanted)
    {
        if (real.Number == 0)
        {
            throw new UsageException("--real 0 leaves no real effect to find, so no share of them can be wanted; give --replicates instead.");
        }

        var tried = new Dictionary<int, CampaignExpectation>();
        int? least = CampaignReplicates.Smallest(n =>
        {
            tried[n] = work.Expect(Planned(real, effect, Balanced(n)), [correction], level)[0];
            return tried[n].ShareFound >= wanted;
        });
        return least is { } found
            ? Answer(correction, level, Planned(real, effect, Balanced(found)), found, effect, wanted, tried[found])
            : throw new UsageException(FormattableString.Invariant($"The effect is too small: even {OneWayPower.MostReplicates} replicates in each group do not find a share of {wanted} of the real effects under {correction.Key}; ask for a larger effect."));
    }

    private SizeDesign Balanced(int replicates) => new(OneWayDesign.Balanced(One.Groups, replicates), replicates);

    private CampaignDesign Planned(RealEffects real, SizeEffect effect, SizeDesign design) =>
        new(Campaign.Experiments, real, design.Design, Math.Min(double.MaxValue, OneWayPower.Noncentrality(design.Design, effect.CohenF(design.Design, One.Sizes))));

    private SizeCampaignAnswer Answer(ErrorProcedure correction, SignificanceLevel level, CampaignDesign planned, int? replicates, SizeEffect effect, double? wanted, CampaignExpectation expected) => new(
        correction, level, planned, replicates, effect.CohenF(planned.Experiment, One.Sizes), effect.LargestDifference(planned.Experiment, planned.Noncentrality), wanted, expected,
        correction is Correction batch && LargeCampaign.LevelOf(batch, planned, level) is { } q ? LargeCampaign.Approximate(planned, q).TrueSurvivors : null);
}

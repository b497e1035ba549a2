using System.CommandLine;
using Campaigns.Catalog.Loading;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Planning;

namespace Campaigns.App.Commands;

/// <summary>size: replicates, power or smallest detectable effect of one experiment; with --campaign, what a whole campaign finds after correction.</summary>
internal sealed class SizeVerb : Verb
{
    private const int MostGroups = 10_000;

    private readonly Option<int?> _groups = TypedOptions.WholeOrNone("--groups", 2, "Groups of the experiment (else as many as --means or --sizes has).");
    private readonly Option<double[]?> _effects = NumberLists.Reals("--effect", "F,...", "Effects to find, as Cohen's f: the spread of the group means over the spread within groups.", 0);
    private readonly Option<ParsedDecimal[]?> _means = NumberLists.Any("--means", "M,M,...", "The group means to find, one a group; needs --sd.");
    private readonly Option<double[]?> _differences = NumberLists.Reals("--difference", "D,...", "Differences to find: two groups that far apart, the others in the middle; needs --sd.", 0);
    private readonly Option<double[]?> _deviations = NumberLists.Reals("--sd", "S,...", "Standard deviations within groups, in the unit of the response.", 0);
    private readonly Option<int[]?> _replicates = NumberLists.Wholes("--replicates", "N,...", "Observations in each group.", 2, OneWayPower.MostReplicates);
    private readonly Option<int[]?> _sizes = NumberLists.Wholes("--sizes", "N,N,...", "Observations in every group, where they are unequal.", 1, OneWayPower.MostReplicates);
    private readonly Option<double[]?> _powers = NumberLists.Reals("--power", "P,...", "Powers wanted (else 0.8, where power is not what is asked).", 0, 1);
    private readonly Option<double[]?> _levels = NumberLists.Reals("--level", "A,...", "Levels of the F test (else 0.05).", 0, 1);
    private readonly Option<int?> _tests = TypedOptions.WholeOrNone("--tests", 1, "Tests that share the level: each is made at level/N, as under Bonferroni's correction.");

    private readonly SizeCampaignOptions _campaign = new();

    public override Command Build()
    {
        var command = new Command("size", Describe("Replicates, power or smallest detectable effect of one experiment: give two of effect, replicates and power, and the third is computed. With --campaign, what a whole campaign finds under each correction, or the replicates that it needs. Several values give a table. Needs no catalog.",
            "size --campaign 100 --share-real 0.3 --groups 4 --difference 1.5 --sd 1.1 --replicates 6,8 --correction bh,holm"))
        {
            _groups, _effects, _means, _differences, _deviations, _replicates, _sizes, _powers, _levels, _tests,
        };
        _campaign.AddTo(command);
        return command;
    }

    public override int Run(Session session)
    {
        SizeCampaign? campaign = _campaign.Read(session);
        SizeQuestion question = Question(session, campaign is not null);
        if (campaign is not null)
        {
            SizeCampaignQuestion asked = new(campaign, question);
            session.Print(SizeCampaignTable.Of(asked, asked.Answers(session)));
            return ExitCode.Done;
        }

        session.Print(SizeTable.Of(question, [.. question.Answers()]));
        return ExitCode.Done;
    }

    private SizeQuestion Question(Session session, bool ofCampaign)
    {
        double[]? deviations = NumberLists.Given(session, _deviations);
        int[]? sizes = NumberLists.Given(session, _sizes);
        int[]? replicates = NumberLists.Given(session, _replicates);
        double[]? powers = NumberLists.Given(session, _powers);
        ParsedDecimal[]? means = NumberLists.Given(session, _means);
        if (sizes is not null && replicates is not null)
        {
            throw new UsageException("--replicates and --sizes both say how many observations a group has; give one of them.");
        }

        int groups = Groups(session.Typed.GetValue(_groups), means?.Length, sizes?.Length);
        IReadOnlyList<SizeEffect> effects = Effects(session, groups, means, deviations);
        bool hasDesign = sizes is not null || replicates is not null;
        if (ofCampaign)
        {
            RefuseForCampaign(session, effects.Count > 0);
        }

        if (effects.Count == 0 && !hasDesign)
        {
            throw new UsageException("Two of effect, replicates and power are needed: give an effect with --effect, --means or --difference, or observations with --replicates or --sizes.");
        }

        if (effects.Count > 0 && hasDesign && powers is not null)
        {
            throw new UsageException("Effect, replicates and power are all given, and nothing is left to compute; leave one of them out.");
        }

        return new SizeQuestion
        {
            Groups = groups,
            Effects = effects,
            Deviations = [.. deviations?.Select(d => (double?)d) ?? [null]],
            Designs = Designs(groups, replicates, sizes),
            Sizes = sizes,
            Powers = effects.Count > 0 && hasDesign ? [] : powers ?? [0.8],
            Levels = NumberLists.Given(session, _levels) ?? [0.05],
            Tests = session.Typed.GetValue(_tests) ?? 1,
        };
    }

    private void RefuseForCampaign(Session session, bool hasEffect)
    {
        if (session.Typed.GetResult(_powers) is not null || session.Typed.GetResult(_tests) is not null)
        {
            throw new UsageException("--power and --tests are for one experiment; with --campaign, --wanted takes the share of real effects to find, and --correction the corrections.");
        }

        if (!hasEffect)
        {
            throw new UsageException("A campaign is planned for an effect: give it with --effect, --means or --difference.");
        }
    }

    private static int Groups(int? groups, int? means, int? sizes)
    {
        if (means is { } m && sizes is { } s && m != s)
        {
            throw new UsageException(FormattableString.Invariant($"--means has {m} groups and --sizes has {s}; give one mean and one size a group."));
        }

        (string name, int? listed) = means is not null ? ("--means", means) : ("--sizes", sizes);
        if (groups is { } given && listed is { } count && given != count)
        {
            throw new UsageException(FormattableString.Invariant($"--groups is {given}, but {name} has {count}; leave --groups out, or let them agree."));
        }

        return (groups ?? listed) switch
        {
            null => throw new UsageException("The number of groups is missing; give it with --groups."),
            < 2 => throw new UsageException($"{name} takes at least two groups, separated by commas."),
            > MostGroups => throw new UsageException(FormattableString.Invariant($"--groups takes a whole number from 2 to {MostGroups}.")),
            { } all => all,
        };
    }

    private IReadOnlyList<SizeEffect> Effects(Session session, int groups, ParsedDecimal[]? means, double[]? deviations)
    {
        double[]? effects = NumberLists.Given(session, _effects);
        double[]? differences = NumberLists.Given(session, _differences);
        if ((effects is null ? 0 : 1) + (differences is null ? 0 : 1) + (means is null ? 0 : 1) > 1)
        {
            throw new UsageException("--effect, --means and --difference each say what is to be found; give one of them.");
        }

        if (deviations is null && (means is not null || differences is not null))
        {
            throw new UsageException($"{(means is not null ? "--means" : "--difference")} is in the unit of the response; give the standard deviation within groups with --sd.");
        }

        if (effects is not null)
        {
            return [.. effects.SelectMany(f => (deviations?.Select(d => (double?)d) ?? [null]).Select(d => SizeEffect.OfCohenF(f, d)))];
        }

        if (differences is not null)
        {
            return [.. differences.SelectMany(d => deviations!.Select(sd => SizeEffect.OfDifference(d, sd)))];
        }

        if (means is null)
        {
            return [];
        }

        // Typed decimals are subtracted before anything is rounded, so that means of 1000000000000.1 and .2 differ by 0.1.
        WideReal[] exact = [.. means.Select(m => WideReal.From(m.WideMantissa) * WideReal.PowerOfTen(-(long)m.Decimals))];
        double[] shifted = [.. exact.Select(m => (m - exact[0]).ToDouble())];
        return shifted.All(m => m == 0)
            ? throw new UsageException("The --means are all equal, so there is no effect to find; give means that differ.")
            : [.. deviations!.Select(sd => SizeEffect.OfMeans(shifted, sd))];
    }

    private static IReadOnlyList<SizeDesign> Designs(int groups, int[]? replicates, int[]? sizes)
    {
        if (sizes is null)
        {
            return [.. replicates?.Select(n => new SizeDesign(OneWayDesign.Balanced(groups, n), n)) ?? []];
        }

        return sizes.All(n => n == 1)
            ? throw new UsageException("--sizes has one observation in every group; without a group of two or more nothing is known about the variation within groups.")
            : [new SizeDesign(OneWayDesign.Of(sizes), sizes.All(n => n == sizes[0]) ? sizes[0] : null)];
    }
}

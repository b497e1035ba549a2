namespace Campaigns.Catalog.Exporting;

/// <summary>The text of the data dictionary: of each file a line a column, COLUMN|TYPE|VALUES|MEANING.</summary>
internal static class ColumnMeaningsText
{
    private const string Plan =
        """
        experiment|text||code of the experiment: one hypothesis, all its group means are equal
        title|text||what it is about
        response|text||what is measured
        unit|text||unit of measure of the response
        groups|text|separated by vertical bars|the planned groups; empty where they are taken from the data
        control|text|one of the groups|the group that others are held against
        test|text|f; welch; brown-forsythe; kruskal-wallis; permutation; block-f|the planned test of the experiment
        follow_up|text|none; tukey-kramer; games-howell; dunnett; scheffe; holm-pairs|the planned comparisons between groups
        replicates|whole number|2 and more|planned observations in each group
        smallest_effect|number|unit of the response|the smallest difference that would matter
        assumed_sd|number|unit of the response|the standard deviation assumed when planning
        weight|number|0 and more|weight of the experiment in a weighted correction
        family|text||the family in which it is corrected
        confirms|text||the experiment that it repeats, as CAMPAIGN/EXPERIMENT or EXPERIMENT
        shared_control|text||the experiments that share their control observations carry the same name here
        """;

    private const string Families =
        """
        family|text||name of the family
        correction|text|key of a correction|its correction where it has one of its own
        level|number|between 0 and 1|its level where it has one of its own
        opens_after|text||the family that must have survivors before this one is judged
        opens_when|text|any; all|whether one survivor there suffices or all must survive
        """;

    private const string Measurements =
        """
        experiment|text||code of the experiment
        group|text||the group that the observation belongs to
        value|number|unit of the response|the value as it was typed, in decimals, up to trailing zeros
        specimen|text||the experimental unit; readings of one specimen are averaged before the test
        block|text||the block within which groups are compared
        order|whole number||place in the order of measuring
        file|text||name of the loaded file
        line|whole number|1 and more|line in that file
        """;

    private const string Exclusions =
        """
        experiment|text||code of the experiment
        file|text||name of the loaded file
        line|whole number|1 and more|line in that file
        group|text||group of the observation
        value|number|unit of the response|its value as it was typed
        excluded|truth|true; false|whether it was left out, or taken in again; of each observation the last row counts
        reason|text||why
        by|text||who said so
        at|instant||when
        """;

    private const string Results =
        """
        experiment|text||code of the experiment
        test|text|as in plan.csv|the test
        groups|whole number||groups with observations
        observations|whole number||observations tested, those left out not counted
        statistic|number||the statistic of the test: F, Welch's F, F*, H of Kruskal and Wallis
        df1|number||degrees of freedom between groups
        df2|number||degrees of freedom within groups
        p|number|0 to 1|p-value of the test; may be below the smallest double
        adjusted_p|number|0 to 1|p-value adjusted over the family; of a campaign judged as experiments arrive empty
        survives|truth|true; false|whether the experiment survives; empty where it was not tested
        status|text||the state of the experiment in one word
        ln_p|number|0 and less|natural logarithm of p
        eta_squared|number|0 to 1|share of the variation that lies between groups
        omega_squared|number||the same, less biased
        title|text||what it is about
        amendments|text||deviations from the plan, with their reasons
        specimens|whole number||specimens tested, where readings were averaged
        epsilon_squared|number||effect size between eta squared and omega squared
        cohen_f|number|0 and more|effect size: standard deviation of the means over that within groups
        arrangements|whole number||arrangements counted by a permutation test
        seed|text||seed of drawn arrangements; empty where all were counted
        follow_up|text|as in plan.csv|the planned comparisons
        standing_level|number|0 to 1|the level that a stream gave the experiment
        batch_adjusted_p|number|0 to 1|beside a standing decision: p adjusted over all at once
        batch_survives|truth|true; false|beside a standing decision: whether it would survive all at once
        family|text||the family in which it is corrected
        family_size|whole number||hypotheses in that family
        family_tested|whole number||of these, tested ones; the others count as p = 1
        level|number|between 0 and 1|the family's level
        confirms|text||the experiment that it repeats
        replicability_p|number|0 to 1|p-value that the effect is there in both
        replicability_adjusted_p|number|0 to 1|the same, adjusted
        replicated|truth|true; false|whether the effect is replicated
        """;

    private const string Comparisons =
        """
        experiment|text||code of the experiment
        group_a|text||the first group
        group_b|text||the second group
        difference|number|unit of the response|mean of the second group less that of the first
        lower|number|unit of the response|lower end of the simultaneous interval within the experiment
        upper|number|unit of the response|upper end of it
        statistic|number||statistic of the comparison
        p|number|0 to 1|p-value adjusted within the experiment by its follow-up
        adjusted_p|number|0 to 1|p-value that also accounts for the selection of the experiment
        survives|truth|true; false|whether the difference is claimed
        follow_up|text|as in plan.csv|the procedure
        df|number||degrees of freedom
        unit|text||unit of measure of the response
        note|text||why it is not claimed
        amendments|text||deviations from the plan, with their reasons
        family|text||the family of the experiment
        selected_lower|number|unit of the response|lower end of the interval that accounts for the selection
        selected_upper|number|unit of the response|upper end of it
        selected_confidence|number|0 to 1|confidence of that interval
        """;

    private const string Reviews =
        """
        review|whole number|1 and more|number of the review
        taken_at|instant||when it was taken
        correction|text|key of a correction|the correction, of the experiment's family
        level|number|between 0 and 1|the level
        family_size|whole number||hypotheses corrected together
        interim|truth|true; false|whether only tested experiments were counted
        experiment|text||code of the experiment
        p|number|0 to 1|its p-value on that day
        adjusted_p|number|0 to 1|its adjusted p-value
        survives|truth|true; false|whether it survived
        family|text||the family of the experiment
        plan_version|whole number|0 and more|version of the plan on that day: 0 as it was sealed, then the number of its latest amendment
        files|whole number||files of measurements that had been loaded
        rows|whole number||rows of these files
        program_version|text||version of the program that took the review
        ledger_sequence|whole number|1 and more|the first entry of the ledger that speaks for the review
        """;

    private const string Streams =
        """
        stream|whole number|1 and more|number of the stream
        procedure|text|key of an online procedure|the procedure
        level|number|between 0 and 1|the level
        horizon|whole number|0 and more|experiments that the shape is spread over; 0 for no end
        shape|text||how the level is spent
        initial_wealth|number||wealth at the start
        lambda|number||candidates have a p-value below it
        tau|number||p-values above it are discarded
        started_at|instant||when the stream started
        reason|text||why a new stream was started
        """;

    private const string Decisions =
        """
        stream|whole number|1 and more|the stream
        position|whole number|1 and more|place in it
        experiment|text||code of the experiment
        level|number|0 to 1|the level that it was given
        p|number|0 to 1|its p-value; empty before the decision
        survives|truth|true; false|the decision that stands; empty before it
        registered_at|instant||when it was given its level
        decided_at|instant||when it was decided
        overlaps|truth|true; false|whether earlier results were unknown when it was given its level
        """;

    private const string Amendments =
        """
        amendment|whole number|1 and more|number of the amendment of the sealed plan
        experiment|text||code of the experiment
        field|text|a column of plan.csv; added|what was changed; added: the experiment was not in the sealed plan
        before|text||the value in the plan before
        after|text||the value since
        reason|text||why
        by|text||who said so
        at|instant||when
        """;

    private const string Withdrawals =
        """
        experiment|text||code of the experiment
        withdrawn|truth|true; false|whether it was withdrawn, or taken in again; of each experiment the last row counts
        had_data|truth|true; false|whether it had data then; one withdrawn before any data leaves the family
        reason|text||why
        by|text||who said so
        at|instant||when
        after_results|truth|true; false|whether results of the campaign had been seen by then
        """;

    private const string Ledger =
        """
        sequence|whole number|1 and more|place in the chain of the whole catalog; entries of other campaigns are left out here
        at|instant||when, by the computer's clock
        account|text||the account that acted
        acting_as|text||the name that the account gave
        version|text||version of the program
        action|text||what was done
        campaign|text||the campaign; empty for the whole catalog
        subject|text||what in it was touched
        reason|text||why, where a reason is due
        changes|text|a line a value|what had which value before, and after the arrow which it has since; ledger_changes.csv has them one by one
        hash|text|64 hexadecimal digits|SHA-256 of the entry and of the hash before it; it can be recomputed from this file, ledger_changes.csv and ledger_evidence.csv
        previous_hash|text|64 hexadecimal digits|hash of the entry before, which may be of another campaign and left out here; zeros before the first
        """;

    private const string LedgerChanges =
        """
        sequence|whole number|1 and more|the entry in ledger.csv
        position|whole number|1 and more|place among its changes
        what|text||what has the value
        had_before|truth|true; false|whether it had a value before, which may be an empty text
        before|text||the value before
        has_after|truth|true; false|whether it has a value since, which may be an empty text
        after|text||the value since
        """;

    private const string LedgerEvidence =
        """
        sequence|whole number|1 and more|the entry in ledger.csv
        position|whole number|1 and more|place among its digests
        kind|text||kind of the rows in the catalog that were written
        owner|whole number||key in the catalog of what owns them
        first|whole number||first of a range within the owner; 0 where there is none
        last|whole number||last of that range
        digest|text|64 hexadecimal digits|SHA-256 of the rows; ledger verify recomputes it from the catalog
        """;

    private const string Dictionary =
        """
        file|text||a file of this folder
        column|text||a column of it
        type|text|text; number; whole number; truth; instant|how its cells are to be read; an instant is UTC
        values|text||values, range or unit of measure
        meaning|text||what it says
        """;

    /// <summary>The files.</summary>
    public static IReadOnlyList<(string File, string Text)> Files { get; } =
    [
        ("plan.csv", Plan), (CampaignExport.SealedPlanName, Plan), (CampaignExport.FamiliesName, Families), (CampaignExport.MeasurementsPath, Measurements), (CampaignExport.ExclusionsName, Exclusions),
        (CampaignExport.ResultsName, Results), (CampaignExport.ComparisonsName, Comparisons), (CampaignExport.ReviewsName, Reviews), (CampaignExport.StreamsName, Streams),
        (CampaignExport.DecisionsName, Decisions), (CampaignExport.AmendmentsName, Amendments), (CampaignExport.WithdrawalsName, Withdrawals), (CampaignExport.LedgerName, Ledger),
        (CampaignExport.LedgerChangesName, LedgerChanges), (CampaignExport.LedgerEvidenceName, LedgerEvidence),
        (ColumnMeanings.FileName, Dictionary),
    ];
}

using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Takes the rows of one experiment after the other, checks them against the plan, and stores what one load brings to each as packed columns.</summary>
internal sealed class ExperimentSink : IDisposable
{
    private readonly Catalog _catalog;
    private readonly StoredCampaign _campaign;
    private readonly LoadOptions _options;
    private readonly long _loadId;
    private readonly bool _takesNewExperiments;
    private readonly ExperimentDirectory _directory;
    private readonly GroupSets _sets;
    private readonly GroupPlacement _placement;
    private readonly ExperimentWriter _experiments;
    private readonly SqliteStatement _insert;
    private readonly NameComplaints _complaints;
    private readonly PackWriter _packed = new();
    private readonly ExperimentLabels _labels = new();
    private readonly SpecimenRule _specimens;
    private readonly Utf8Interner _names;
    private readonly StandingWithdrawals _withdrawals;
    private IReadOnlyList<string>? _codes;
    private KnownExperiment? _experiment;
    private long _firstLine;

    /// <param name="catalog">The open catalog, in a transaction.</param>
    /// <param name="campaign">The campaign.</param>
    /// <param name="options">How the file is taken in.</param>
    /// <param name="loadId">Key of the load.</param>
    /// <param name="fileSize">Size of the file in bytes.</param>
    /// <param name="labels">Numbers of the group labels of the whole file.</param>
    /// <param name="complaints">Takes what the plan does not allow.</param>
    public ExperimentSink(Catalog catalog, StoredCampaign campaign, LoadOptions options, long loadId, long fileSize, Utf8Interner labels, NameComplaints complaints)
    {
        _catalog = catalog;
        _campaign = campaign;
        _options = options;
        _loadId = loadId;
        _complaints = complaints;
        _specimens = new SpecimenRule(complaints);
        _names = labels;
        _withdrawals = new StandingWithdrawals(catalog, campaign.Id);
        _directory = new ExperimentDirectory(catalog, campaign.Id, fileSize);
        _takesNewExperiments = campaign.Campaign.IsExploratory || (!campaign.Campaign.IsSealed && _directory.IsEmpty);
        _sets = new GroupSets(catalog, campaign.Id);
        _placement = new GroupPlacement(_sets, labels);
        _experiments = new ExperimentWriter(catalog, campaign.Id);
        _insert = catalog.Prepare("INSERT INTO measurements (experiment_id, load_id, value_count, missing_count, packed, group_set_id) VALUES (?1, ?2, ?3, ?4, ?5, ?6)");
    }

    /// <summary>The columns of the experiment at hand.</summary>
    public ObservationColumns Values { get; } = new();

    public int ExperimentCount { get; private set; }

    public int NewExperimentCount { get; private set; }

    public long MissingCount { get; private set; }

    /// <summary>Tested experiments that received more values.</summary>
    public List<string> Amended { get; } = [];

    /// <summary>Takes the rows of a batch, ending one experiment and beginning the next where they change.</summary>
    /// <param name="batch">The rows.</param>
    /// <param name="codes">Experiments by their numbers in the file.</param>
    /// <param name="mayReturn">Whether a smaller number may follow a larger one; where rows are in the file's order it would be an experiment that was ended before.</param>
    /// <param name="current">Number of the experiment at hand, -1 before the first.</param>
    /// <returns>False where an experiment returned that may not.</returns>
    public bool TryTake(RowBatch batch, Utf8Interner codes, bool mayReturn, ref int current)
    {
        for (int i = 0; i < batch.Count; i++)
        {
            int experiment = batch[i].Experiment;
            if (experiment != current)
            {
                if (experiment < current && !mayReturn)
                {
                    return false;
                }

                EndLast();
                current = experiment;
                Begin(codes[experiment], batch[i].Line);
            }

            batch.HandTo(this, i);
        }

        return true;
    }

    /// <summary>Ends the last experiment, and looks at what can only be seen of all together.</summary>
    public void Finish()
    {
        EndLast();
        if (_specimens.SawSpecimens && _complaints.IsEmpty)
        {
            _specimens.LookAtEarlierLoads(_catalog, _campaign.Id, _loadId);
        }
    }

    /// <summary>Ends the experiment at hand, if there is one.</summary>
    private void EndLast()
    {
        if (_experiment is not null)
        {
            End();
            _experiment = null;
        }
    }

    /// <summary>Begins an experiment; rows of one that may not take them are only counted.</summary>
    private void Begin(ReadOnlySpan<byte> code, long line)
    {
        Values.Clear();
        _labels.Clear();
        _firstLine = line;
        _experiment = _directory.Find(code);
        if (_experiment is not null)
        {
            return;
        }

        string text = System.Text.Encoding.UTF8.GetString(code);
        _experiment = new KnownExperiment { Code = text, IsTested = false, GroupsArePlanned = false };
        if (!_takesNewExperiments)
        {
            _complaints.Add("experiment", "unknown-experiment", text, line, 0, () => UnknownExperiment(text));
        }
    }

    /// <summary>The experiment's number of a group label.</summary>
    /// <param name="label">The label's number in the file.</param>
    /// <param name="line">The row's line.</param>
    public ushort GroupOf(int label, long line) => _labels.NumberOf(label, line);

    /// <summary>Stores the rows of the experiment at hand, unless something was found wrong with the file.</summary>
    private void End()
    {
        KnownExperiment experiment = _experiment ?? throw new InvalidOperationException("No experiment was begun.");
        long rows = Values.Count + Values.MissingCount;
        ExperimentCount++;
        MissingCount += Values.MissingCount;
        if (experiment.Id == 0 && !_takesNewExperiments)
        {
            _complaints.Add("experiment", "unknown-experiment", experiment.Code, _firstLine, rows, () => UnknownExperiment(experiment.Code));
            return;
        }

        if (_withdrawals.IsWithdrawn(experiment.Id))
        {
            _complaints.Add("experiment", "withdrawn-experiment", experiment.Code, _firstLine, rows, () => Withdrawn(experiment.Code));
            return;
        }

        if (experiment.IsTested && _options.AmendmentReason is null)
        {
            _complaints.Add("experiment", "closed-experiment", experiment.Code, _firstLine, rows, () => Closed(experiment.Code));
            return;
        }

        GroupPlacement.Placement placement = _placement.Find(experiment, _labels.Ids);
        if (placement.HasUnknown)
        {
            ComplainOfGroups(experiment, placement);
            return;
        }

        _specimens.Look(experiment.Code, Values, group => _names.Text(_labels.Ids[group]));
        if (_complaints.IsEmpty)
        {
            Store(experiment, placement);
        }
    }

    public void Dispose()
    {
        _insert.Dispose();
        _experiments.Dispose();
        _sets.Dispose();
        _directory.Dispose();
    }

    private void Store(KnownExperiment experiment, GroupPlacement.Placement placement)
    {
        foreach (ref ushort group in Values.Groups)
        {
            group = (ushort)placement.Positions[group];
        }

        if (experiment.Id == 0)
        {
            experiment.Id = _experiments.Insert(
                new PlannedExperiment { Code = experiment.Code, Test = _campaign.Campaign.DefaultTest, FollowUp = _campaign.Campaign.DefaultFollowUp },
                placement.SetId,
                groupsArePlanned: false,
                _loadId);
            NewExperimentCount++;
        }
        else if (experiment.GroupSetId != placement.SetId)
        {
            _experiments.Regroup(experiment.Id, placement.SetId);
        }

        if (experiment.IsTested)
        {
            Amended.Add(experiment.Code);
        }

        _packed.Clear();
        PackedMeasurements.Write(Values, _packed);
        _insert.Bind(1, experiment.Id).Bind(2, _loadId).Bind(3, (long)Values.Count).Bind(4, (long)Values.MissingCount)
            .BindBlob(5, _packed.Written).Bind(6, placement.SetId).Run();
    }

    private void ComplainOfGroups(KnownExperiment experiment, GroupPlacement.Placement placement)
    {
        string[] planned = _sets.Labels(experiment.GroupSetId);
        for (int number = 0; number < _labels.Count; number++)
        {
            if (placement.Positions[number] < 0)
            {
                string label = _names.Text(_labels.Ids[number]);
                _complaints.Add("group", "unknown-group", $"{experiment.Code}\n{label}", _labels.FirstLine(number), RowsOf(number),
                    () => $"{ShownText.Quote(label)} is no group of experiment {ShownText.Quote(experiment.Code)}{Suggest(label, planned)}; its groups are {string.Join(", ", planned)}. Correct the file; a sealed plan takes no new group.");
            }
        }
    }

    private long RowsOf(int number) => Values.Groups.Count((ushort)number);

    private string UnknownExperiment(string code) =>
        $"{ShownText.Quote(code)} is no experiment of the campaign '{_campaign.Campaign.Code}'{Suggest(code, _codes ??= ExperimentDirectory.Codes(_catalog, _campaign.Id))}; correct the file, or plan the experiment in another campaign.";

    private static string Closed(string code) =>
        $"experiment {ShownText.Quote(code)} was tested already and is closed to more data: looking, then adding, then looking again is another way to a false positive. Register a new experiment that confirms it (plan column confirms) and put the new data there, or give --amend REASON (in the dashboard the field 'amend because') to have them recorded as an amendment.";

    private string Withdrawn(string code) =>
        $"experiment {ShownText.Quote(code)} is withdrawn and takes no measurements. Leave its rows out, or take it in again first: 'campaigns withdraw {_campaign.Campaign.Code} {code} --take-back --reason TEXT', in the dashboard key w.";

    private static string Suggest(string word, IReadOnlyList<string> known) =>
        Nearest.Of(word, known) is { } near ? $" (did you mean '{near}'?)" : "";
}

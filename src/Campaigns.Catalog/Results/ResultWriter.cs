using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Results;

/// <summary>Writes the outcomes of one test run; the run itself is stored with its first outcome, so that a run without any leaves no trace.</summary>
internal sealed class ResultWriter(Catalog catalog, long campaignId, RecordPosition seen, bool includesIncomplete, StreamKeeper? streams) : IDisposable
{
    private SqliteStatement? _insert;
    private long _runId;

    /// <summary>Key of the run; 0 before its first outcome.</summary>
    public long RunId => _runId;

    public int Tested { get; private set; }

    public int NotTestable { get; private set; }

    /// <summary>Experiments left alone because planned values are missing.</summary>
    public int Incomplete { get; private set; }

    public void Write(TestBatch batch)
    {
        for (int i = 0; i < batch.Count; i++)
        {
            if (batch.OutcomeOf(i) is { } outcome)
            {
                Write(batch[i].Id, outcome);
            }
            else
            {
                Incomplete++;
            }
        }
    }

    private void Write(long experimentId, TestOutcome outcome)
    {
        _insert ??= Begin();
        _insert.Bind(1, experimentId).Bind(2, _runId).Bind(4, (long)outcome.GroupCount).Bind(5, (long)outcome.ObservationCount)
            .Bind(13, outcome.SpecimenCount is { } specimens ? (long?)specimens : null);
        Resampling? resampling = (outcome as Tested)?.Resampling;
        _insert.Bind(14, resampling?.Arrangements).Bind(15, resampling?.AsExtreme).Bind(16, unchecked((long?)resampling?.Seed));
        switch (outcome)
        {
            case Tested tested:
                Tested++;
                double p = tested.P.Value;
                _insert.Bind(3, "tested").Bind(6, tested.Statistic).Bind(7, tested.Df1).Bind(8, tested.Df2).Bind(9, p)
                    .Bind(10, p < PackedReviewLines.LogStoredBelow ? tested.P.Log : null)
                    .Bind(11, tested.Variation?.EtaSquared).Bind(12, tested.Variation?.OmegaSquared);
                break;
            case NotTestable none:
                NotTestable++;
                _insert.Bind(3, ExperimentStatusWords.Of(none.Reason).Word());
                for (int parameter = 6; parameter <= 12; parameter++)
                {
                    _insert.BindNull(parameter);
                }

                break;
            default:
                throw new InvalidOperationException("An outcome is either a result or the reason why there is none.");
        }

        _insert.Run();
        streams?.Decide(experimentId, (outcome as Tested)?.P, _runId);
    }

    public void Dispose() => _insert?.Dispose();

    private SqliteStatement Begin()
    {
        using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1 FROM test_runs");
        next.Read();
        _runId = next.Integer(0);
        next.Reset();
        using SqliteStatement run = catalog.Prepare("INSERT INTO test_runs (id, campaign_id, last_load_id, ran_at, includes_incomplete, program_version, last_exclusion_id, last_amendment_id, last_withdrawal_id) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9)");
        run.Bind(1, _runId).Bind(2, campaignId).Bind(3, seen.LastLoadId).Bind(4, catalog.Now)
            .Bind(5, includesIncomplete ? 1L : 0L).Bind(6, ProgramVersion.Current).Bind(7, seen.LastExclusionId)
            .Bind(8, seen.LastAmendmentId).Bind(9, seen.LastWithdrawalId).Run();
        return catalog.Prepare(
            """
            INSERT INTO test_results (experiment_id, test_run_id, status, group_count, observation_count, statistic, df1, df2, p, log_p, eta_squared, omega_squared, specimen_count, arrangements, as_extreme, seed)
            VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15, ?16)
            """);
    }
}

using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Originals;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Takes measurement files into the catalog, each whole or not at all.</summary>
/// <remarks>
/// One pass over the file. Where the rows of an experiment come together, which is how laboratories write them, memory holds one experiment at a time;
/// where they do not, the file is begun again and its rows are gathered first (<see cref="RowHeap"/>). O(rows) either way.
/// </remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class MeasurementLoader(Catalog catalog)
{
    /// <summary>Loads one file.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="path">The file.</param>
    /// <param name="options">How it is taken in.</param>
    /// <param name="progress">Told now and then how far the work is.</param>
    /// <param name="cancel">Stops the work; nothing of the file is then kept.</param>
    /// <exception cref="RefusedException">The file has problems, was loaded before, or the campaign takes no data; nothing was changed.</exception>
    /// <exception cref="LoadingException">The file cannot be read.</exception>
    public LoadSummary Load(string code, string path, LoadOptions options, Action<WorkProgress> progress, CancellationToken cancel) =>
        LoadUnlessKnown(code, path, options, progress, cancel) ?? throw Repeat(code, path);

    /// <summary>Loads one file, unless its bytes were loaded into the campaign before.</summary>
    /// <returns>What was loaded; null where the file is known.</returns>
    /// <inheritdoc cref="Load"/>
    public LoadSummary? LoadUnlessKnown(string code, string path, LoadOptions options, Action<WorkProgress> progress, CancellationToken cancel)
    {
        ArgumentNullException.ThrowIfNull(options);
        return catalog.Change(() =>
        {
            StoredCampaign campaign = new CampaignStore(catalog).Get(code);
            long size = SizeOf(path);

            // Digesting goes on while the file is read, unless a file of just this size is here already.
            if (HoldsFileOfSize(campaign.Id, size) && LoadedAt(campaign.Id, FileDigest.Sha256(path)) is not null)
            {
                return null;
            }

            if (!campaign.Campaign.IsSealed && !campaign.Campaign.IsExploratory && HasPlan(campaign.Id))
            {
                throw new RefusedException($"The plan of '{code}' is not sealed: fix it before the data come, with 'campaigns seal {code}', and load again.");
            }

            return new OneFile(catalog, campaign, path, size, options, progress, cancel).Load();
        });
    }

    private RefusedException Repeat(string code, string path)
    {
        FileDigest digest = FileDigest.Sha256(path);
        (string name, DateTimeOffset at) = LoadedAt(new CampaignStore(catalog).Get(code).Id, digest)!.Value;
        return new RefusedException(FormattableString.Invariant($"The file '{path}' was loaded into '{code}' before, as '{name}' on {at:yyyy-MM-dd HH:mm:ss} UTC (same SHA-256 {digest.Hex[..12]}...); it was not loaded again."));
    }

    private (string Name, DateTimeOffset At)? LoadedAt(long campaignId, FileDigest digest)
    {
        using SqliteStatement select = catalog.Prepare("SELECT file_name, loaded_at FROM loads WHERE campaign_id = ?1 AND sha256 = ?2");
        select.Bind(1, campaignId).Bind(2, digest.Hex);
        return select.Read() ? (select.Text(0), Instants.FromMicroseconds(select.Integer(1))) : null;
    }

    private bool HoldsFileOfSize(long campaignId, long size)
    {
        using SqliteStatement any = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM loads WHERE campaign_id = ?1 AND byte_count = ?2)");
        any.Bind(1, campaignId).Bind(2, size).Read();
        return any.Integer(0) != 0;
    }

    /// <summary>Size of a file in bytes, of the one that a link points to; 0 where there is none.</summary>
    private static long SizeOf(string path)
    {
        var file = new FileInfo(path);
        return !file.Exists ? 0 : file.ResolveLinkTarget(returnFinalTarget: true) is FileInfo { Exists: true } target ? target.Length : file.Length;
    }

    private bool HasPlan(long campaignId)
    {
        using SqliteStatement any = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM experiments WHERE campaign_id = ?1)");
        any.Bind(1, campaignId).Read();
        return any.Integer(0) != 0;
    }

    /// <summary>The loading of one file.</summary>
    private sealed class OneFile(Catalog catalog, StoredCampaign campaign, string path, long size, LoadOptions options, Action<WorkProgress> progress, CancellationToken cancel)
    {
        private readonly long _loadId = NextId(catalog);
        private readonly long _setsBefore = GroupSets.LastId(catalog);
        private readonly NameComplaints _complaints = new();

        public LoadSummary Load()
        {
            Run("PRAGMA defer_foreign_keys = ON");
            Run("SAVEPOINT before_file");
            return TogetherOrNull() ?? Gathered();
        }

        /// <summary>The way for files in which the rows of an experiment come together; null where they turn out not to.</summary>
        private LoadSummary? TogetherOrNull()
        {
            using MeasurementFile file = Open(out OriginalTap tap);
            using var pieces = new OriginalPieces(catalog, _loadId);
            using var rows = new RowSource(file, tap, pieces.Add, cancel);
            using ExperimentSink sink = NewSink(rows);
            int current = -1;
            while (rows.Next() is { } batch)
            {
                if (!sink.TryTake(batch, rows.Codes, mayReturn: false, ref current))
                {
                    Run("ROLLBACK TO before_file");
                    _complaints.Clear();
                    return null;
                }

                Report(file);
                rows.Recycle(batch);
            }

            return Finish(file, tap, pieces, sink);
        }

        /// <summary>The way for files in any order.</summary>
        private LoadSummary Gathered()
        {
            using MeasurementFile file = Open(out OriginalTap tap);
            using var pieces = new OriginalPieces(catalog, _loadId);
            using var rows = new RowSource(file, tap, pieces.Add, cancel);
            var heap = new RowHeap();
            while (rows.Next() is { } batch)
            {
                heap.Add(batch);
                Report(file);
            }

            using ExperimentSink sink = NewSink(rows);
            using BatchPipe ordered = heap.InOrder(rows.Codes, cancel);
            int current = -1;
            while (ordered.Next() is { } batch)
            {
                sink.TryTake(batch, rows.Codes, mayReturn: true, ref current);
                ordered.Recycle(batch);
            }

            return Finish(file, tap, pieces, sink);
        }

        private MeasurementFile Open(out OriginalTap tap)
        {
            OriginalTap? opened = null;
            MeasurementFile file = MeasurementFile.Open(path, name => opened = new OriginalTap(name, FileOpening.Open(name)), options.Reading);
            tap = opened!;
            return file;
        }

        private LoadSummary Finish(MeasurementFile file, OriginalTap tap, OriginalPieces pieces, ExperimentSink sink)
        {
            sink.Finish();
            if (_complaints.IsEmpty && file.Problems.IsEmpty)
            {
                new NewDataRule(catalog, _loadId, _complaints).Look(() => tap.Digest.Hex);
            }

            _complaints.ReportTo(file.Problems, file.Name);
            if (!file.Problems.IsEmpty)
            {
                throw new RefusedException(
                    FormattableString.Invariant($"The file '{path}' was refused; nothing of it was loaded. Problems: {file.Problems.Count}."),
                    [.. file.Problems.Sentences()]);
            }

            FileDigest digest = tap.Digest;
            if (digest.Size != size || SizeOf(path) != size)
            {
                throw new RefusedException($"The file '{path}' changed while it was read; nothing of it was loaded. Load it again when it is finished.");
            }

            bool becomesExploratory = !campaign.Campaign.IsExploratory && !campaign.Campaign.IsSealed;
            if (becomesExploratory)
            {
                new CampaignStore(catalog).MarkExploratory(campaign.Id);
            }

            InsertLoad(file, sink, digest);
            pieces.Finish(file.Form);
            Record(file, sink, digest, becomesExploratory);
            return new LoadSummary(
                System.IO.Path.GetFileName(path), digest.Hex, file.RowCount, sink.MissingCount, sink.ExperimentCount,
                sink.NewExperimentCount, sink.Amended, file.IgnoredColumns, file.RespelledNames);
        }

        private void InsertLoad(MeasurementFile file, ExperimentSink sink, FileDigest digest)
        {
            using SqliteStatement insert = catalog.Prepare(
                """
                INSERT INTO loads (id, campaign_id, file_name, sha256, byte_count, row_count, missing_count, experiment_count, loaded_at, amendment_reason)
                VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10)
                """);
            insert.Bind(1, _loadId).Bind(2, campaign.Id).Bind(3, System.IO.Path.GetFileName(path)).Bind(4, digest.Hex).Bind(5, digest.Size)
                .Bind(6, file.RowCount).Bind(7, sink.MissingCount).Bind(8, (long)sink.ExperimentCount).Bind(9, catalog.Now)
                .Bind(10, sink.Amended.Count > 0 ? options.AmendmentReason : null).Run();
        }

        private void Record(MeasurementFile file, ExperimentSink sink, FileDigest digest, bool becameExploratory) => catalog.Record(new LedgerAct(LedgerAction.Load, campaign.Campaign.Code)
        {
            Subject = System.IO.Path.GetFileName(path),
            Reason = sink.Amended.Count > 0 ? options.AmendmentReason : null,
            Changes =
            [
                new LedgerChange("sha256", null, digest.Hex), new LedgerChange("rows", null, FormattableString.Invariant($"{file.RowCount}")),
                new LedgerChange("experiments", null, FormattableString.Invariant($"{sink.ExperimentCount}")),
                .. becameExploratory ? [new LedgerChange("exploratory", "no", "yes")] : Array.Empty<LedgerChange>(),
                .. sink.Amended.Select(e => new LedgerChange($"{e}: result", "stands", "awaits a new test")),
            ],
            Evidence =
            [
                EvidenceRegistry.Load.Of(_loadId),
                EvidenceRegistry.Original.Of(_loadId),
                .. becameExploratory ? [EvidenceRegistry.Campaign.Of(campaign.Id)] : Array.Empty<EvidenceRequest>(),
                .. GroupSets.Since(catalog, campaign.Id, _setsBefore),
            ],
        });

        private ExperimentSink NewSink(RowSource rows) => new(catalog, campaign, options, _loadId, size, rows.Labels, _complaints);

        private void Report(MeasurementFile file)
        {
            cancel.ThrowIfCancellationRequested();
            progress(new WorkProgress($"loading {file.Name}", file.Position, size, "bytes", file.RowCount));
        }

        private void Run(string sql)
        {
            using SqliteStatement statement = catalog.Prepare(sql);
            statement.Run();
        }

        private static long NextId(Catalog catalog)
        {
            using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1 FROM loads");
            next.Read();
            return next.Integer(0);
        }
    }
}

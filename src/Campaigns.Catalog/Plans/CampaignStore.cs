using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Plans;

/// <summary>Campaigns in the catalog: found, opened, sealed.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class CampaignStore(Catalog catalog)
{
    private const string Columns =
        "id, code, title, purpose, error_rate, level, correction, default_test, default_follow_up, is_exploratory, opened_at, sealed_at, plan_digest";

    /// <summary>Every campaign, in the order in which they were opened.</summary>
    public IReadOnlyList<StoredCampaign> All()
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM campaigns ORDER BY id");
        var campaigns = new List<StoredCampaign>();
        while (select.Read())
        {
            campaigns.Add(Row(select));
        }

        return [.. campaigns.Select(Complete)];
    }

    /// <summary>The campaign with a code; null where there is none.</summary>
    public StoredCampaign? Find(string code)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM campaigns WHERE code = ?1");
        return select.Bind(1, code).Read() ? Complete(Row(select)) : null;
    }

    /// <summary>The campaign with a code.</summary>
    /// <exception cref="RefusedException">There is none; the message names the nearest.</exception>
    public StoredCampaign Get(string code) => Find(code) ?? throw NotFound(code);

    /// <summary>Opens a campaign.</summary>
    /// <exception cref="RefusedException">The code is taken.</exception>
    public StoredCampaign Open(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return catalog.Change(() =>
        {
            if (Find(campaign.Code) is not null)
            {
                throw new RefusedException($"There is a campaign '{campaign.Code}' already; choose another code.");
            }

            using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1 FROM campaigns");
            next.Read();
            long id = next.Integer(0);
            next.Reset();
            using SqliteStatement insert = catalog.Prepare($"INSERT INTO campaigns ({Columns}) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, NULL, NULL)");
            insert.Bind(1, id).Bind(2, campaign.Code).Bind(3, campaign.Title).Bind(4, campaign.Purpose)
                .Bind(5, campaign.ErrorRate.Word()).Bind(6, campaign.Level.Value).Bind(7, campaign.Correction)
                .Bind(8, campaign.DefaultTest).Bind(9, campaign.DefaultFollowUp)
                .Bind(10, campaign.IsExploratory ? 1L : 0L).Bind(11, catalog.Now).Run();
            if (campaign.Online is { } online)
            {
                new OnlineSettingsStore(catalog).Add(id, online);
            }

            catalog.Record(new LedgerAct(LedgerAction.Start, campaign.Code)
            {
                Changes =
                [
                    new LedgerChange("title", null, campaign.Title), new LedgerChange("error rate", null, campaign.ErrorRate.Word()), new LedgerChange("level", null, campaign.Level.ToString()),
                    new LedgerChange("correction", null, campaign.Correction), new LedgerChange("usual test", null, campaign.DefaultTest), new LedgerChange("usual follow-up", null, campaign.DefaultFollowUp),
                ],
                Evidence = [EvidenceRegistry.Campaign.Of(id)],
            });
            return Get(campaign.Code);
        });
    }

    /// <summary>Marks an open campaign as one whose experiments come from its data.</summary>
    internal void MarkExploratory(long id)
    {
        if (new FamilyStore(catalog).Read(id).Count > 0)
        {
            throw new RefusedException("Families were registered for this campaign and no plan: register the plan that names them before loading, or open a new campaign to explore without a plan.");
        }

        using SqliteStatement update = catalog.Prepare("UPDATE campaigns SET is_exploratory = 1 WHERE id = ?1");
        update.Bind(1, id).Run();
    }

    /// <summary>Fixes the plan: level, correction and family stay as they are from here on.</summary>
    /// <returns>The sealed campaign.</returns>
    /// <exception cref="RefusedException">Sealed already, without experiments, or with families that do not fit.</exception>
    public StoredCampaign Seal(string code) => catalog.Change(() =>
    {
        StoredCampaign stored = Get(code);
        if (stored.Campaign.IsSealed)
        {
            throw new RefusedException(FormattableString.Invariant($"The campaign '{code}' is sealed already, since {stored.Campaign.SealedAt:yyyy-MM-dd HH:mm:ss} UTC."));
        }

        // An exploratory campaign has data, and so experiments, and no plan to digest.
        IReadOnlyList<PlannedExperiment> plan = stored.Campaign.IsExploratory ? [] : new PlanStore(catalog).Read(stored.Id);
        if (plan.Count == 0 && !stored.Campaign.IsExploratory)
        {
            throw new RefusedException($"The campaign '{code}' has no experiments to seal; register them with 'campaigns plan {code} FILE', or load measurements to explore without a plan.");
        }

        OnlineVerdict.RefuseFamilies(stored.Campaign, plan);
        Campaign campaign = stored.Campaign with { Families = new FamilyStore(catalog).Settle(stored, plan) };
        string digest = PlanDigest.Of(campaign, plan);
        using SqliteStatement update = catalog.Prepare("UPDATE campaigns SET sealed_at = ?2, plan_digest = ?3 WHERE id = ?1");
        update.Bind(1, stored.Id).Bind(2, catalog.Now).Bind(3, digest).Run();
        var evidence = new List<EvidenceRequest> { EvidenceRegistry.Campaign.Of(stored.Id) };
        if (OnlineVerdict.ProcedureOf(stored.Campaign) is { } procedure)
        {
            evidence.Add(EvidenceRegistry.Stream.Of(new StreamStore(catalog).StartFirst(stored, procedure)));
        }

        catalog.Record(new LedgerAct(LedgerAction.Seal, code)
        {
            Changes = [new LedgerChange("plan digest", null, digest), new LedgerChange("experiments", null, FormattableString.Invariant($"{new FamilyReader(catalog).FamilySize(stored.Id)}"))],
            Evidence = evidence,
        });

        return Get(code);
    });

    private RefusedException NotFound(string code)
    {
        string[] codes = [.. All().Select(c => c.Campaign.Code)];
        string hint = codes.Length == 0 ? "the catalog holds none yet"
            : Nearest.Of(code, codes) is { } near ? $"'{near}' may be meant"
            : "'campaigns list' shows those there are";
        return new RefusedException($"There is no campaign '{code}' in the catalog '{catalog.Path}'; {hint}.");
    }

    private StoredCampaign Complete(StoredCampaign stored) => stored with
    {
        Campaign = stored.Campaign with
        {
            Families = new FamilyStore(catalog).Read(stored.Id),
            Online = new OnlineSettingsStore(catalog).Read(stored.Id),
            Streams = OnlineVerdict.ProcedureOf(stored.Campaign) is null ? [] : new StreamStore(catalog).Read(stored.Id),
        },
    };

    private static StoredCampaign Row(SqliteStatement row) => new(row.Integer(0), new Campaign
    {
        Code = row.Text(1),
        Title = row.Text(2),
        Purpose = row.Text(3),
        ErrorRate = ErrorRateWords.Parse(row.Text(4)) ?? throw new CatalogException("The catalog holds an error rate that this program does not know."),
        Level = new SignificanceLevel(row.Real(5)),
        Correction = row.Text(6),
        DefaultTest = row.Text(7),
        DefaultFollowUp = row.Text(8),
        IsExploratory = row.Integer(9) != 0,
        OpenedAt = Instants.FromMicroseconds(row.Integer(10)),
        SealedAt = row.NullableInteger(11) is { } at ? Instants.FromMicroseconds(at) : null,
        PlanDigest = row.NullableText(12),
    });
}

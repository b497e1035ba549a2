using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>What campaigns say of their online procedure before the seal.</summary>
internal sealed class OnlineSettingsStore(Catalog catalog)
{
    private const string Columns = "horizon, shape, initial_wealth, lambda, tau";

    /// <summary>A campaign's settings; null where it says nothing.</summary>
    public OnlineOptions? Read(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM online_settings WHERE campaign_id = ?1");
        return select.Bind(1, campaignId).Read()
            ? new OnlineOptions((int?)select.NullableInteger(0), select.NullableText(1), select.NullableReal(2), select.NullableReal(3), select.NullableReal(4))
            : null;
    }

    /// <summary>Stores a campaign's settings; inside a transaction, before the seal.</summary>
    public void Add(long campaignId, OnlineOptions options)
    {
        using SqliteStatement insert = catalog.Prepare($"INSERT INTO online_settings (campaign_id, {Columns}) VALUES (?1, ?2, ?3, ?4, ?5, ?6)");
        insert.Bind(1, campaignId).Bind(2, (long?)options.Horizon).Bind(3, options.Shape).Bind(4, options.InitialWealth).Bind(5, options.Lambda).Bind(6, options.Tau).Run();
    }
}

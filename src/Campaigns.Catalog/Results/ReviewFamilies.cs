using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>The families as reviews found them; a review of a campaign of one family has none.</summary>
internal sealed class ReviewFamilies(Catalog catalog)
{
    private const string Columns = "name, correction, level, family_size, planned_count, tested_count, survivor_count, is_open";

    /// <summary>Keeps the families of a review; inside its transaction.</summary>
    public void Add(long reviewId, IReadOnlyList<FamilyStanding> families)
    {
        using SqliteStatement insert = catalog.Prepare($"INSERT INTO review_families (review_id, position, {Columns}) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10)");
        for (int i = 0; i < families.Count; i++)
        {
            FamilyStanding f = families[i];
            insert.Bind(1, reviewId).Bind(2, i + 1L).Bind(3, f.Name).Bind(4, f.Correction).Bind(5, f.Level.Value).Bind(6, (long)f.Size)
                .Bind(7, (long)f.Planned).Bind(8, (long)f.Tested).Bind(9, (long)f.Survivors).Bind(10, f.IsOpen ? 1L : 0L).Run();
        }
    }

    /// <summary>The families of a review, in the plan's order.</summary>
    public IReadOnlyList<FamilyStanding> Read(long reviewId)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM review_families WHERE review_id = ?1 ORDER BY position");
        select.Bind(1, reviewId);
        var families = new List<FamilyStanding>();
        while (select.Read())
        {
            families.Add(new FamilyStanding(
                select.Text(0), select.Text(1), new SignificanceLevel(select.Real(2)), (int)select.Integer(3), (int)select.Integer(4), (int)select.Integer(5), (int)select.Integer(6))
            {
                IsOpen = select.Integer(7) != 0,
            });
        }

        return families;
    }
}

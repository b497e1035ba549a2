using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>survivors: the experiments that survive, with effect.</summary>
internal sealed class SurvivorsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("survivors", Describe("The experiments that survive the campaign's correction, the smallest adjusted p first, with the widest gap between group means in its unit, and the comparisons inside them that are claimed, with their intervals.",
        "survivors PRIMERS"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        Print(session, Read(catalog, session.Get(_code), int.MaxValue));
        return ExitCode.Done;
    }

    /// <summary>What is shown of the survivors of a campaign.</summary>
    /// <param name="Rows">A row a survivor.</param>
    /// <param name="Claims">The comparisons claimed inside them; for people, below.</param>
    /// <param name="Overview">The campaign in figures.</param>
    public sealed record Survivors(RowTable Rows, RowTable Claims, CampaignOverview Overview);

    /// <summary>Prints the survivors: for people with the comparisons claimed inside them as a second table.</summary>
    public static void Print(Session session, Survivors survivors)
    {
        session.Print(survivors.Rows);
        if (session.Format == RowFormat.Table && (survivors.Claims.Rows.Any() || survivors.Claims.Below.Count > 0))
        {
            session.Host.Out.WriteLine();
            session.Print(survivors.Claims);
        }
    }

    /// <summary>The survivors, ranked by p.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="code">The campaign.</param>
    /// <param name="most">Survivors to list.</param>
    public static Survivors Read(Catalog.Catalog catalog, string code, int most)
    {
        SurvivorData data = SurvivorData.Read(catalog, code, most);
        return new Survivors(SurvivorTables.Rows(data), SurvivorTables.Claims(data), data.Overview);
    }
}

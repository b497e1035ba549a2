using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Catalog.Tests;

/// <summary>Takes a campaign that ships through the stores.</summary>
internal static class ShippedCampaign
{
    public static string Folder(string name) => Path.Combine(ReferenceTable.Folder(), "..", "..", "campaigns", name);

    /// <summary>What the command that runs a folder does, step by step.</summary>
    public static CampaignStanding Run(TestCatalog test, string name)
    {
        string folder = Folder(name);
        var known = new KnownKeys([.. GroupTestRegistry.All.Select(t => t.Key)], FollowUpKeys.All, [.. CorrectionRegistry.All.Select(c => c.Key)]);
        CampaignFileResult file = CampaignFile.Read(Path.Combine(folder, "campaign.json"), known);
        Assert.Empty(file.Problems.Sentences());
        CampaignDescription description = file.Campaign!;
        test.Campaigns.Open(new Campaign
        {
            Code = name,
            ErrorRate = description.ErrorRate,
            Level = description.Level,
            Correction = description.Correction,
            OpenedAt = test.Clock.GetUtcNow(),
        });
        PlanFileResult plan = PlanFile.Read(Path.Combine(folder, "plan.csv"), DelimitedFileOptions.Default, new PlanDefaults(description.Test, description.FollowUp), known);
        Assert.Empty(plan.Problems.Sentences());
        new PlanStore(test.Catalog).Register(name, plan.Experiments);
        test.Campaigns.Seal(name);
        foreach (string measurements in Directory.EnumerateFiles(Path.Combine(folder, "measurements")).Order(NaturalOrder.Instance))
        {
            new MeasurementLoader(test.Catalog).Load(name, measurements, new LoadOptions(DelimitedFileOptions.Default), _ => { }, default);
        }

        new TestRunner(test.Catalog).Run(name, includeIncomplete: false, _ => { }, default);
        ReviewHead review = new ReviewStore(test.Catalog).Take(name, testedOnly: false).Review;
        CampaignStanding standing = new StandingReader(test.Catalog).Read(name);
        Assert.Equal(standing.SurvivorCount, review.SurvivorCount);
        Assert.Equal((review.SurvivorCount, review.TestedCount, review.FamilySize), Overview(test, name));
        return standing;
    }

    private static (int, int, int) Overview(TestCatalog test, string name)
    {
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> survivors) = new OverviewReader(test.Catalog).ReadSurvivors(name, int.MaxValue);
        IEnumerable<ExperimentResult> expected = new StandingReader(test.Catalog).Read(name).Experiments.Where(e => e.Survives == true).OrderBy(e => e.P);
        Assert.Equal(expected.Select(e => (e.Plan.Code, e.P, e.AdjustedP)), survivors.Select(e => (e.Plan.Code, e.P, e.AdjustedP)));
        return (overview.SurvivorCount, overview.TestedCount, overview.FamilySize);
    }
}

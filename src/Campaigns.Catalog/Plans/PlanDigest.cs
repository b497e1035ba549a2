using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>The SHA-256 of a plan: what the sealed record can be held against.</summary>
/// <remarks>
/// Every field goes in as its length and its UTF-8 text, after a word that names what follows, so that no two different plans share an encoding.
/// An exploratory campaign has no plan; its digest covers level, correction and tests alone.
/// </remarks>
internal static class PlanDigest
{
    /// <param name="campaign">The campaign.</param>
    /// <param name="experiments">Its plan; empty for an exploratory campaign.</param>
    public static string Of(Campaign campaign, IReadOnlyList<PlannedExperiment> experiments)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        Add(hash, "campaigns plan 1");
        Add(hash, campaign.Code);
        Add(hash, campaign.Title);
        Add(hash, campaign.Purpose);
        Add(hash, campaign.ErrorRate.Word());
        Add(hash, Number(campaign.Level.Value));
        Add(hash, campaign.Correction);
        Add(hash, campaign.DefaultTest);
        Add(hash, campaign.DefaultFollowUp);
        Add(hash, campaign.IsExploratory ? "exploratory" : "planned");
        AddFamilies(hash, campaign);
        AddOnline(hash, campaign.Online);
        foreach (PlannedExperiment experiment in experiments)
        {
            Add(hash, experiment);
        }

        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }

    private static void AddFamilies(IncrementalHash hash, Campaign campaign)
    {
        foreach (Family family in campaign.Families)
        {
            Add(hash, "family");
            Add(hash, family.Name);
            Add(hash, family.Correction ?? "");
            Add(hash, Number(family.Level?.Value));
            Add(hash, family.OpensAfter ?? "");
            Add(hash, family.Gate == FamilyGate.AllSurvive ? "all" : "any");
        }
    }

    private static void AddOnline(IncrementalHash hash, OnlineOptions? online)
    {
        if (online is not null)
        {
            Add(hash, "online");
            Add(hash, FormattableString.Invariant($"{online.Horizon}"));
            Add(hash, online.Shape ?? "");
            Add(hash, Number(online.InitialWealth));
            Add(hash, Number(online.Lambda));
            Add(hash, Number(online.Tau));
        }
    }

    private static void Add(IncrementalHash hash, PlannedExperiment experiment)
    {
        Add(hash, "experiment");
        Add(hash, experiment.Code);
        Add(hash, experiment.Title);
        Add(hash, experiment.Response);
        Add(hash, experiment.Unit);
        Add(hash, FormattableString.Invariant($"{experiment.Groups.Count}"));
        foreach (string group in experiment.Groups)
        {
            Add(hash, group);
        }

        Add(hash, experiment.Control ?? "");
        Add(hash, experiment.Test);
        Add(hash, experiment.FollowUp);
        Add(hash, FormattableString.Invariant($"{experiment.Replicates}"));
        Add(hash, Number(experiment.SmallestEffect));
        Add(hash, Number(experiment.AssumedStandardDeviation));
        Add(hash, Number(experiment.Weight));
        Add(hash, experiment.Family ?? "");

        // Fields that came later go in, with their names, only where they say something: the digests of earlier plans stay as they are.
        AddIfSaid(hash, "confirms", experiment.Confirms);
        AddIfSaid(hash, "shared control", experiment.SharedControl);
    }

    private static void AddIfSaid(IncrementalHash hash, string name, string? text)
    {
        if (text is not null)
        {
            Add(hash, name);
            Add(hash, text);
        }
    }

    private static string Number(double? value) => FormattableString.Invariant($"{value:R}");

    private static void Add(IncrementalHash hash, string text)
    {
        byte[] bytes = Encoding.UTF8.GetBytes(text);
        Span<byte> length = stackalloc byte[8];
        BinaryPrimitives.WriteInt64LittleEndian(length, bytes.Length);
        hash.AppendData(length);
        hash.AppendData(bytes);
    }
}

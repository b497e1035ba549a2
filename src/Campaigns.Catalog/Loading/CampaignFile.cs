using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads a campaign's own file (campaign.json): one JSON object of texts and a level.</summary>
public static class CampaignFile
{
    /// <summary>The largest file that is read, in bytes.</summary>
    public const int LargestSize = 1 << 20;

    /// <summary>The most characters of a title.</summary>
    public const int LongestTitle = 200;

    /// <summary>The most characters of a purpose.</summary>
    public const int LongestPurpose = 10_000;

    /// <summary>The keys of the object; only the first is required.</summary>
    public static IReadOnlyList<string> Keys { get; } = ["code", "title", "purpose", "errorRate", "level", "correction", "test", "followUp", .. CampaignOnline.Keys];

    /// <summary>Reads the file, and collects everything that is wrong with it.</summary>
    /// <param name="path">The file.</param>
    /// <param name="known">The keys of procedures that it may name.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static CampaignFileResult Read(string path, KnownKeys known)
    {
        ArgumentNullException.ThrowIfNull(known);
        ImportProblems problems = new();
        string name = Path.GetFileName(path);
        if (!TryReadText(path, name, problems, out byte[] text))
        {
            return new CampaignFileResult(null, problems);
        }

        CampaignJson json = new(name, text, problems);
        if (!json.TryReadObject(Keys))
        {
            return new CampaignFileResult(null, problems);
        }

        ErrorRate errorRate = ErrorRateOf(json);
        string code = CodeOf(json);
        double level = json.Number("level", 0.05, n => n is > 0 and < 1, "a level lies between 0 and 1, both excluded, such as 0.05");
        string correction = json.Key("correction", "correction", known.Corrections, errorRate == ErrorRate.Familywise ? "holm" : "bh");
        CampaignDescription description = new()
        {
            Code = code,
            Title = json.Line("title", LongestTitle),
            Purpose = json.Text("purpose", LongestPurpose),
            ErrorRate = errorRate,
            Level = new SignificanceLevel(level),
            Correction = correction,
            Online = CampaignOnline.Read(json, correction, new SignificanceLevel(level)),
            Test = json.Key("test", "test", known.Tests, "f"),
            FollowUp = json.Key("followUp", "follow-up", known.FollowUps, "none"),
        };
        return new CampaignFileResult(problems.IsEmpty ? description : null, problems);
    }

    private static bool TryReadText(string path, string name, ImportProblems problems, out byte[] text)
    {
        text = [];
        using Stream bytes = FileOpening.Open(path);
        try
        {
            using SourceText source = new(bytes);
            byte[] buffer = new byte[LargestSize + 1];
            int length = source.ReadAtLeast(buffer, buffer.Length, throwOnEndOfStream: false);
            if (length > LargestSize)
            {
                problems.Add(new ImportProblem(name, 0, "", "file-too-large", "is larger than 1 MiB: a campaign's file is a few lines of JSON."));
            }
            else if (source.Fault is SourceFault fault)
            {
                problems.Add(new ImportProblem(name, fault.Line, "", fault.Code, fault.Text));
            }
            else if (length == 0)
            {
                problems.Add(new ImportProblem(name, 0, "", "empty-file", "is empty: write at least {\"code\": \"...\"}."));
            }

            text = buffer[..length];
        }
        catch (Exception e) when (FileOpening.IsOfTheWorld(e))
        {
            throw FileOpening.Explain(path, e);
        }

        return problems.IsEmpty;
    }

    private static ErrorRate ErrorRateOf(CampaignJson json) =>
        json.Key("errorRate", "error rate", ["familywise", "false-discovery"], "false-discovery") == "familywise" ? ErrorRate.Familywise : ErrorRate.FalseDiscovery;

    private static string CodeOf(CampaignJson json)
    {
        string code = json.Line("code", 60);
        if (!json.Has("code"))
        {
            json.Refuse("", "missing-code", "has no \"code\": give the campaign a short name.");
        }
        else if (json.IsText("code") && !IsCode(code))
        {
            json.Refuse("code", "bad-code", $"{ShownText.Quote(code)} is no code: use 1 to 60 letters (a to z), digits, hyphens, underscores and points, a letter or digit first.");
        }

        return code;
    }

    private static bool IsCode(string code) =>
        code.Length is > 0 and <= 60 && char.IsAsciiLetterOrDigit(code[0]) && code.All(c => char.IsAsciiLetterOrDigit(c) || c is '-' or '_' or '.');
}

using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Statistics.Corrections;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class CampaignFileTests
{
    private static readonly KnownKeys Known = new(["f", "welch"], ["none", "dunnett"], ["holm", "bh", "by"]);

    [Fact]
    public void Every_key_is_read()
    {
        CampaignDescription campaign = Accepted("""
            {
              "code": "Primer-2026.1", "title": "Primers", "purpose": "Line one\nline two",
              "errorRate": "familywise", "level": 0.01, "correction": "by", "test": "welch", "followUp": "dunnett"
            }
            """);

        Assert.Equal(("Primer-2026.1", "Primers", "Line one\nline two"), (campaign.Code, campaign.Title, campaign.Purpose));
        Assert.Equal((ErrorRate.Familywise, 0.01, "by", "welch", "dunnett"), (campaign.ErrorRate, campaign.Level.Value, campaign.Correction, campaign.Test, campaign.FollowUp));
    }

    [Theory]
    [InlineData("{\"code\":\"x\"}", ErrorRate.FalseDiscovery, "bh")]
    [InlineData("{\"code\":\"x\",\"errorRate\":\"false-discovery\"}", ErrorRate.FalseDiscovery, "bh")]
    [InlineData("\uFEFF{\"code\":\"x\",\"errorRate\":\"familywise\"}", ErrorRate.Familywise, "holm")]
    public void What_is_not_said_has_its_default(string json, ErrorRate errorRate, string correction)
    {
        CampaignDescription campaign = Accepted(json);
        Assert.Equal((errorRate, 0.05, correction, "f", "none", ""), (campaign.ErrorRate, campaign.Level.Value, campaign.Correction, campaign.Test, campaign.FollowUp, campaign.Title));
    }

    [Theory]
    [InlineData("", "empty-file@0")]
    [InlineData("{}", "missing-code@0")]
    [InlineData("[]", "not-an-object@1:1")]
    [InlineData("\n  \"x\"", "not-an-object@2:3")]
    [InlineData("{\"code\":\"x\",\n \"levle\":0.1}", "unknown-key@2:2")]
    [InlineData("{\"code\":\"x\",\n \"code\":\"y\"}", "duplicate-key@2:2")]
    [InlineData("{\"code\":\"x\",\n \"level\":\"0.05\"}", "wrong-type@2:10")]
    [InlineData("{\"code\":\"x\",\"title\":\"ä\u20AC\",\"level\":[0.05]}", "wrong-type@1:34")]
    [InlineData("{\"code\":5}", "wrong-type@1:9")]
    [InlineData("{\"code\":null}", "wrong-type@1:9")]
    [InlineData("{\"code\":\"x\",\"title\":{\"a\":[1]}}", "wrong-type@1:21")]
    [InlineData("{\"code\":\"x\",\"level\":0}", "out-of-range@1:21")]
    [InlineData("{\"code\":\"x\",\"level\":1}", "out-of-range@1:21")]
    [InlineData("{\"code\":\"x\",\"level\":1e999}", "out-of-range@1:21")]
    [InlineData("{\"code\":\"x\",\"correction\":\"hb\"}", "unknown-correction@1:26")]
    [InlineData("{\"code\":\"x\",\"test\":\"anova\"}", "unknown-test@1:20")]
    [InlineData("{\"code\":\"x\",\"followUp\":\"dunnet\"}", "unknown-follow-up@1:24")]
    [InlineData("{\"code\":\"x\",\"errorRate\":\"fdr\"}", "unknown-error-rate@1:25")]
    [InlineData("{\"code\":\"\"}", "bad-code@1:9")]
    [InlineData("{\"code\":\"a b\"}", "bad-code@1:9")]
    [InlineData("{\"code\":\"-a\"}", "bad-code@1:9")]
    [InlineData("{\"code\":\"../a\"}", "bad-code@1:9")]
    [InlineData("{\"code\":\"x\",\"title\":\"a\\u001bb\"}", "control-character@1:21")]
    [InlineData("{\"code\":\"x\",\"title\":\"\\ud800\"}", "bad-text@1:21")]
    [InlineData("{\"code\":\"x\",}", "bad-json@1:13")]
    [InlineData("{\"code\":\"x\"} {}", "bad-json@1:14")]
    [InlineData("{\"code\":\"x\" // no\n}", "bad-json@1:13")]
    [InlineData("{\"code\":\n\"x\"", "bad-json@2:4")]
    [InlineData("{\"code\":'x'}", "bad-json@1:9")]
    [InlineData("{\"code\":\"x\"\0}", "nul-byte@1")]
    public void What_is_wrong_is_told_with_line_and_column(string json, string expected)
    {
        CampaignFileResult result = Read(Encoding.UTF8.GetBytes(json));
        Assert.Null(result.Campaign);
        Assert.Equal([expected], Outcome.Codes(result.Problems));
    }

    [Fact]
    public void All_problems_are_collected()
    {
        CampaignFileResult result = Read("{\"level\":2,\n\"test\":\"g\",\n\"x\":1,\n\"title\":7}"u8.ToArray());
        Assert.Equal(["unknown-key@3:1", "missing-code@0", "out-of-range@1:10", "wrong-type@4:9", "unknown-test@2:8"], Outcome.Codes(result.Problems));
    }

    [Fact]
    public void A_mistyped_key_is_told_with_the_nearest()
    {
        string sentence = Assert.Single(Read("{\"code\":\"x\",\"errorrate\":\"familywise\"}"u8.ToArray()).Problems.Sentences());
        Assert.Contains("did you mean \"errorRate\"?", sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void Size_length_and_depth_are_bounded()
    {
        byte[] large = [.. "{\"code\":\"x\",\"purpose\":\""u8, .. Enumerable.Repeat((byte)'x', CampaignFile.LargestSize), .. "\"}"u8];
        Assert.Equal(["file-too-large@0"], Outcome.Codes(Read(large).Problems));
        Assert.Equal(["bad-code@1:9"], Outcome.Codes(Read(Encoding.UTF8.GetBytes($"{{\"code\":\"{new string('x', 61)}\"}}")).Problems));
        Assert.Equal(["text-too-long@1:21"], Outcome.Codes(Read(Encoding.UTF8.GetBytes($"{{\"code\":\"x\",\"title\":\"{new string('x', 201)}\"}}")).Problems));
        Assert.Equal("bad-json", Assert.Single(Read(Encoding.UTF8.GetBytes("{\"code\":" + new string('[', 100_000))).Problems.Kept).Code);
        Assert.Equal(new string('x', 60), Accepted($"{{\"code\":\"{new string('x', 60)}\"}}").Code);
    }

    private static CampaignDescription Accepted(string json)
    {
        CampaignFileResult result = Read(Encoding.UTF8.GetBytes(json));
        Assert.Empty(result.Problems.Sentences());
        return Assert.IsType<CampaignDescription>(result.Campaign);
    }

    private static CampaignFileResult Read(byte[] content)
    {
        using TestFile file = new(content, "campaign.json");
        return CampaignFile.Read(file.Path, Known);
    }
}

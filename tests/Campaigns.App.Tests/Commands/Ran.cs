namespace Campaigns.App.Tests.Commands;

/// <summary>What a run of the program left: its exit code and its two streams.</summary>
internal sealed record Ran(int Code, string Out, string Error)
{
    /// <summary>Asserts an end without error.</summary>
    public Ran Well()
    {
        Assert.True(Code == 0, $"exit {Code}: {Error}{Out}");
        return this;
    }

    /// <summary>Asserts a refusal: the exit code, nothing on standard output, no trace of the program's inside, and the words of the sentence.</summary>
    public Ran Refused(int code, params string[] words)
    {
        Assert.True(Code == code, $"exit {Code} instead of {code}: {Error}{Out}");
        Assert.Equal("", Out);
        foreach (string word in words)
        {
            Assert.Contains(word, Error, StringComparison.Ordinal);
        }

        string[] inside = ["   at ", "Exception", "System.", "Campaigns.App", "\\u{0A}", "A fault of the program"];
        Assert.All(inside, text => Assert.DoesNotContain(text, Error, StringComparison.Ordinal));
        string first = Error.Split('\n')[0];
        Assert.True(first.EndsWith('.') && char.IsUpper(first.TrimStart('-', '\'', '/', '"')[0]) | !char.IsWhiteSpace(first[0]), $"no sentence: {first}");
        return this;
    }

    public CsvText Csv => CsvText.Read(Out);
}

using System.Diagnostics;
using System.Text.RegularExpressions;

namespace Campaigns.App.Tests.Browser;

/// <summary>Programs outside the project that read what the browser printed, and what the program wrote.</summary>
internal static partial class Paper
{
    /// <summary>The text of each page of a PDF file, by poppler's pdftotext.</summary>
    public static async Task<string[]> Pages(byte[] pdf)
    {
        Assert.Equal("%PDF"u8, pdf.AsSpan(0, 4));
        string file = Path.GetTempFileName();
        try
        {
            await File.WriteAllBytesAsync(file, pdf, TestContext.Current.CancellationToken);
            (_, string text, _) = await Run("pdftotext", "poppler-utils", "", "-layout", file, "-");
            return text.TrimEnd('\f').Split('\f');
        }
        finally
        {
            File.Delete(file);
        }
    }

    /// <summary>What HTML Tidy finds wrong with a page.</summary>
    /// <remarks>Debian's version of 2017 does not know that parts of a list of facts may be grouped, nor the attributes of pictures, which HTML allows: the groups are taken off before, and its words about pictures after.</remarks>
    public static async Task<string[]> Faults(string html)
    {
        html = FactList().Replace(html, list => list.Value.Replace("<div>", "", StringComparison.Ordinal).Replace("</div>", "", StringComparison.Ordinal));
        (_, _, string errors) = await Run("tidy", "tidy", html, "-q", "-e", "-utf8", "--show-warnings", "yes");
        return [.. errors.Split('\n', StringSplitOptions.RemoveEmptyEntries).Where(line => !line.Contains("<svg>", StringComparison.Ordinal) && !line.EndsWith("<title> proprietary attribute \"id\"", StringComparison.Ordinal)).Take(20)];
    }

    private static async Task<(int Code, string Out, string Error)> Run(string program, string package, string input, params string[] arguments)
    {
        var start = new ProcessStartInfo(program) { RedirectStandardInput = true, RedirectStandardOutput = true, RedirectStandardError = true };
        Array.ForEach(arguments, start.ArgumentList.Add);
        Process? process = null;
        try
        {
            process = Process.Start(start);
        }
        catch (System.ComponentModel.Win32Exception)
        {
            Assert.Skip($"{program} is not installed (Debian package {package}).");
        }

        using (process)
        {
            Task<string> output = process!.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken), errors = process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
            await process.StandardInput.WriteAsync(input);
            process.StandardInput.Close();
            await process.WaitForExitAsync(TestContext.Current.CancellationToken);
            return (process.ExitCode, await output, await errors);
        }
    }

    [GeneratedRegex("<dl>.*?</dl>", RegexOptions.Singleline)]
    private static partial Regex FactList();
}

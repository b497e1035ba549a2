using System.Diagnostics;

namespace Campaigns.Statistics.Tests.External;

/// <summary>Runs an R script as an outside referee. Where R is not installed, the test that asks is skipped, visibly.</summary>
internal static class RProgram
{
    private static readonly Lazy<bool> Installed = new(() =>
    {
        try
        {
            Run("cat('ready')", "");
            return true;
        }
        catch (System.ComponentModel.Win32Exception)
        {
            return false;
        }
    });

    public static void SkipIfAbsent() => Assert.SkipUnless(Installed.Value, "R is not installed (Debian package r-base-core).");

    /// <summary>Runs a script; the text is its standard input ("file('stdin')" in R).</summary>
    /// <returns>Its standard output.</returns>
    public static string Run(string script, string input)
    {
        string scriptFile = Path.Combine(Path.GetTempPath(), $"campaigns-{Environment.ProcessId}-{Stopwatch.GetTimestamp()}.R");
        File.WriteAllText(scriptFile, script);
        try
        {
            var start = new ProcessStartInfo("Rscript")
            {
                ArgumentList = { "--vanilla", scriptFile },
                RedirectStandardInput = true,
                RedirectStandardOutput = true,
                RedirectStandardError = true,
            };
            using Process process = Process.Start(start)!;
            Task<string> output = process.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken);
            Task<string> errors = process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
            process.StandardInput.Write(input);
            process.StandardInput.Close();
            process.WaitForExit();
#pragma warning disable xUnit1031 // Both streams have ended with the process.
            Assert.True(process.ExitCode == 0, errors.Result);
            return output.Result;
#pragma warning restore xUnit1031
        }
        finally
        {
            File.Delete(scriptFile);
        }
    }
}

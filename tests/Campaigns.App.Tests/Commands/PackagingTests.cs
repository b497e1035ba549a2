using System.Diagnostics;

namespace Campaigns.App.Tests.Commands;

/// <summary>The program as people install it. Needs the SDK, no network: the one source of packages is a folder.</summary>
[Trait("kind", "packaging")]
public sealed class PackagingTests : IDisposable
{
#if DEBUG
    private const string Configuration = "Debug";
#else
    private const string Configuration = "Release";
#endif

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void The_packed_tool_installs_from_a_folder_and_runs_the_demo()
    {
        string project = Path.Combine(Workplace.Repository(), "src", "Campaigns.App");
        Dotnet("pack", project, "--no-build", "--configuration", Configuration, "--output", _place.At("packages"));
        string package = Assert.Single(Directory.GetFiles(_place.At("packages"), "*.nupkg"));
        string source = _place.Write("nuget.config", $"""<configuration><packageSources><clear /><add key="here" value="{_place.At("packages")}" /></packageSources></configuration>""");
        string version = Path.GetFileNameWithoutExtension(package)["Campaigns.".Length..];
        Dotnet("tool", "install", "Campaigns", "--version", version, "--tool-path", _place.At("tool"), "--configfile", source);

        string program = _place.At("tool", OperatingSystem.IsWindows() ? "campaigns.exe" : "campaigns");
        Ran run = Executable.End(Executable.Start(program, _place.Catalog, ["run", Workplace.Demo, "--format", "csv"])).Well();
        Assert.Equal(14, run.Csv.Rows.Count);
        Assert.StartsWith(version, Executable.End(Executable.Start(program, _place.Catalog, ["--version"])).Well().Out, StringComparison.Ordinal);
        Assert.Equal(run.Out, _place.Run("survivors", "adhesion-screen", "--format", "csv").Well().Out);
    }

    private void Dotnet(params string[] arguments)
    {
        var start = new ProcessStartInfo("dotnet", arguments) { RedirectStandardOutput = true, RedirectStandardError = true, WorkingDirectory = _place.Folder };
        start.Environment["DOTNET_CLI_TELEMETRY_OPTOUT"] = "1";
        start.Environment["MSBUILDDISABLENODEREUSE"] = "1";
        start.Environment["DOTNET_CLI_USE_MSBUILD_SERVER"] = "0";

        // The test host's own settings would steer the SDK's MSBuild.
        foreach (string name in start.Environment.Keys.Where(n => n.StartsWith("MSBuild", StringComparison.Ordinal) || n is "DOTNET_HOST_PATH").ToArray())
        {
            start.Environment.Remove(name);
        }

        Ran ran = Executable.End(Process.Start(start)!, 150);
        Assert.True(ran.Code == 0, $"dotnet {string.Join(' ', arguments)}: {ran.Out}{ran.Error}");
    }
}

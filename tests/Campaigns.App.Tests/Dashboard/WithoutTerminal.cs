using System.Runtime.CompilerServices;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Screens in tests must never reach for a real terminal.</summary>
internal static class WithoutTerminal
{
    /// <summary>Runs before anything of the screen library.</summary>
    [ModuleInitializer]
    internal static void Set() => Environment.SetEnvironmentVariable("DisableRealDriverIO", "1");
}

/// <summary>Tests of screens run one after another: the library keeps schemes and settings for the whole process.</summary>
[CollectionDefinition(Name, DisableParallelization = true)]
public sealed class ScreenTests
{
    /// <summary>The group's name.</summary>
    public const string Name = "screens";
}

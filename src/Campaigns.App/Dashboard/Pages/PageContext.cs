using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Screen;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>What every page is given.</summary>
/// <param name="Model">What is shown.</param>
/// <param name="Glyphs">The signs.</param>
/// <param name="Theme">How meanings look.</param>
public sealed record PageContext(DashboardModel Model, GlyphSet Glyphs, Theme Theme);

namespace Campaigns.App.Dashboard.Model;

/// <summary>Which rows of many are seen.</summary>
public static class RowWindow
{
    /// <summary>The first row to show so that one row is seen, moved as little as can be and without blank rows at the end.</summary>
    /// <param name="top">The first row shown so far.</param>
    /// <param name="row">The row that must be seen.</param>
    /// <param name="count">Rows in all.</param>
    /// <param name="height">Rows that there is room for.</param>
    public static int Follow(int top, int row, int count, int height)
    {
        int room = Math.Max(1, height);
        int first = Math.Min(top, Math.Max(0, count - room));
        return Math.Max(0, Math.Clamp(first, Math.Max(0, row - room + 1), Math.Max(0, row)));
    }
}

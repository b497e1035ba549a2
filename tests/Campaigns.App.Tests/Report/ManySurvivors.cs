using System.Globalization;
using System.Text;
using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>A campaign of which more survives than a sheet of paper holds, some of it with long names.</summary>
internal static class ManySurvivors
{
    /// <summary>Experiments; all of them survive.</summary>
    public const int Count = 60;

    /// <summary>Its folder; its code is "many".</summary>
    public static string Folder(Workplace place)
    {
        StringBuilder plan = new("experiment,title,unit,groups,follow_up\n"), values = new("experiment,group,value\n");
        for (int e = 0; e < Count; e++)
        {
            string title = e % 3 == 0 ? "WIDE WORDS OF AN EXPERIMENT WHOSE TITLE GOES ON MUCH LONGER" : "gloss";
            plan.Append(CultureInfo.InvariantCulture, $"X{e:00},{title},mPa s,a|b,tukey-kramer\n");
            for (int i = 0; i < 6; i++)
            {
                values.Append(CultureInfo.InvariantCulture, $"X{e:00},a,{100 + i}\nX{e:00},b,{130 + e + i}\n");
            }
        }

        return place.Campaign("many", plan.ToString(), values.ToString());
    }
}

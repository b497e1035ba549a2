namespace Campaigns.Statistics.Planning;

/// <summary>The least number of replicates at which something holds that more replicates only make truer.</summary>
public static class CampaignReplicates
{
    /// <summary>Doubles the number until it suffices, then halves the gap.</summary>
    /// <param name="suffices">Whether a number of replicates, at least 2, suffices.</param>
    /// <returns>At least 2; null where <see cref="OneWayPower.MostReplicates"/> are not enough. Where the answers are simulated, a number at which the estimate suffices and one below does not.</returns>
    /// <remarks>Questions: about twice the binary logarithm of the answer.</remarks>
    public static int? Smallest(Func<int, bool> suffices)
    {
        ArgumentNullException.ThrowIfNull(suffices);
        int tooFew = 1;
        int enough = 2;
        while (!suffices(enough))
        {
            if (enough == OneWayPower.MostReplicates)
            {
                return null;
            }

            tooFew = enough;
            enough = Math.Min(OneWayPower.MostReplicates, enough * 2);
        }

        while (enough - tooFew > 1)
        {
            int middle = tooFew + ((enough - tooFew) / 2);
            (tooFew, enough) = suffices(middle) ? (tooFew, middle) : (middle, enough);
        }

        return enough;
    }
}

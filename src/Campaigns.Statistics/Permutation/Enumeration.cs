namespace Campaigns.Statistics.Permutation;

/// <summary>Looks at every arrangement of an experiment's values, once for all exchanges of groups of equal size.</summary>
/// <remarks>
/// Groups are filled in turn, the smallest first; the last takes what is left. Of groups of equal size the one with the lower first position comes first, which names each set of exchanged arrangements by one of them.
/// Cost: about 2 ns an arrangement.
/// </remarks>
internal sealed class Enumeration
{
    private readonly PermutationScores _scores;
    private readonly int[] _sizes;

    // For each group the positions that are free when its turn comes, ascending, their values, and those that it takes.
    private readonly int[][] _free;
    private readonly double[][] _values;
    private readonly int[][] _taken;
    private long _count;

    private Enumeration(PermutationScores scores)
    {
        _scores = scores;
        _sizes = scores.Design.Sizes.ToArray();
        int free = scores.Design.Count;
        _free = new int[_sizes.Length][];
        _values = new double[_sizes.Length][];
        _taken = new int[_sizes.Length][];
        for (int group = 0; group < _sizes.Length; group++)
        {
            _free[group] = new int[free];
            _values[group] = new double[free];
            _taken[group] = new int[_sizes[group]];
            free -= _sizes[group];
        }

        for (int i = 0; i < scores.Design.Count; i++)
        {
            _free[0][i] = i;
            _values[0][i] = scores.Values[i];
        }
    }

    private int LastChoice => _sizes.Length - 2;

    /// <summary>How many of all arrangements, the observed one included, give at least the observed F.</summary>
    /// <param name="scores">An experiment whose design is enumerated.</param>
    public static long CountAsExtreme(PermutationScores scores)
    {
        var enumeration = new Enumeration(scores);
        enumeration.Fill(0, 0, scores.Total);
        PermutationDesign design = scores.Design;
        return enumeration._count * (design.Arrangements!.Value / design.DistinctArrangements!.Value);
    }

    /// <summary>Goes through the choices of a group, given those of the groups before.</summary>
    /// <param name="group">The group.</param>
    /// <param name="spread">Weighted squared sums of the groups before.</param>
    /// <param name="rest">Sum of the values that are free.</param>
    private void Fill(int group, double spread, double rest)
    {
        int first = 0;
        int end = _free[group].Length - _sizes[group] + 1;
        if (_sizes[group] == _sizes[^1])
        {
            // All groups to come are of this size: this one is the one that takes the lowest free position.
            end = 1;
        }
        else if (group > 0 && _sizes[group] == _sizes[group - 1])
        {
            first = Array.BinarySearch(_free[group], _taken[group - 1][0]);
            first = first < 0 ? ~first : first;
        }

        Take(group, 0, first, end, 0, spread, rest);
    }

    /// <summary>Takes member number <paramref name="member"/> of a group in every possible way, from index <paramref name="from"/> of its free positions on.</summary>
    private void Take(int group, int member, int from, int end, double sum, double spread, double rest)
    {
        bool isLastMember = member == _sizes[group] - 1;
        if (isLastMember && group == LastChoice)
        {
            Compare(member, from, end, sum, spread, rest);
            return;
        }

        for (int i = from; i < end; i++)
        {
            _taken[group][member] = _free[group][i];
            double with = sum + _values[group][i];
            if (isLastMember)
            {
                KeepFree(group);
                Fill(group + 1, spread + (with * _scores.Weights[group] * with), rest - with);
            }
            else
            {
                Take(group, member + 1, i + 1, _free[group].Length - _sizes[group] + member + 2, with, spread, rest);
            }
        }
    }

    /// <summary>The innermost loop: the last member of the last group that has a choice.</summary>
    private void Compare(int member, int from, int end, double sum, double spread, double rest)
    {
        double[] values = _values[LastChoice];
        double weight = _scores.Weights[LastChoice];
        double lastWeight = _scores.Weights[^1];
        double low = _scores.Low;
        double high = _scores.High;
        for (int i = from; i < end; i++)
        {
            double with = sum + values[i];
            double left = rest - with;
            double s = spread + (with * weight * with) + (left * lastWeight * left);
            if (s >= low && (s >= high || IsAsExtreme(member, i)))
            {
                _count++;
            }
        }
    }

    private void KeepFree(int group)
    {
        int kept = 0;
        int taken = 0;
        for (int i = 0; i < _free[group].Length; i++)
        {
            if (taken < _taken[group].Length && _free[group][i] == _taken[group][taken])
            {
                taken++;
            }
            else
            {
                _free[group + 1][kept] = _free[group][i];
                _values[group + 1][kept++] = _values[group][i];
            }
        }
    }

    private bool IsAsExtreme(int member, int at)
    {
        _taken[LastChoice][member] = _free[LastChoice][at];
        KeepFree(LastChoice);
        int[] order = [.. _taken[..^1].SelectMany(positions => positions), .. _free[^1]];
        return _scores.IsAsExtreme(order);
    }
}

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The joint law of two counts, each thinned on its own: the experiments without and with a real effect whose p-values lie on one side of a level.</summary>
internal sealed class TwoCounts
{
    private readonly double _negligible;
    private readonly LeavingKernel _kernel;
    private double[][] _now;
    private double[][] _next;
    private int _lowA;
    private int _highA;
    private int _lowB;
    private int _highB;

    /// <summary>Two independent binomial counts.</summary>
    /// <param name="trialsA">Trials of the first.</param>
    /// <param name="a">Its probability of success, and the complement.</param>
    /// <param name="trialsB">Trials of the second.</param>
    /// <param name="b">Its probability of success, and the complement.</param>
    /// <param name="negligible">Masses at most this are left out.</param>
    public TwoCounts(int trialsA, (double Success, double Failure) a, int trialsB, (double Success, double Failure) b, double negligible)
    {
        _negligible = negligible;
        _kernel = new LeavingKernel(Math.Max(trialsA, trialsB));
        double[] first = new double[trialsA + 1];
        double[] second = new double[trialsB + 1];
        (_lowA, _highA) = BinomialMasses.Fill(trialsA, a.Success, a.Failure, negligible, first);
        (_lowB, _highB) = BinomialMasses.Fill(trialsB, b.Success, b.Failure, negligible, second);
        _now = [.. Enumerable.Range(0, trialsA + 1).Select(_ => new double[trialsB + 1])];
        _next = [.. Enumerable.Range(0, trialsA + 1).Select(_ => new double[trialsB + 1])];
        for (int row = _lowA; row <= _highA; row++)
        {
            Vectors.AddScaled(_now[row], second, first[row]);
        }
    }

    /// <summary>Whether no mass is left but where both counts are 0.</summary>
    public bool IsOver => IsEmpty || (_highA == 0 && _highB == 0);

    private bool IsEmpty => _lowA > _highA || _lowB > _highB;

    /// <summary>Each thing of the first count leaves with one probability, each of the second with another.</summary>
    public void Thin(double leaveA, double leaveB)
    {
        (int parts, double leave) = LeavingKernel.Cut(leaveA, _highA);
        for (int part = 0; part < parts && leaveA > 0; part++)
        {
            ThinA(leave);
        }

        (parts, leave) = LeavingKernel.Cut(leaveB, _highB);
        for (int part = 0; part < parts && leaveB > 0; part++)
        {
            ThinB(leave);
        }

        Trim();
    }

    /// <summary>Takes out the states with a given sum.</summary>
    /// <param name="sum">Of both counts.</param>
    /// <param name="take">Is given the first count, the second, and the mass.</param>
    public void Take(int sum, Action<int, int, double> take)
    {
        for (int a = Math.Max(_lowA, sum - _highB); a <= Math.Min(_highA, sum - _lowB); a++)
        {
            double mass = _now[a][sum - a];
            _now[a][sum - a] = 0;
            if (mass > 0)
            {
                take(a, sum - a, mass);
            }
        }
    }

    private void ThinA(double leave)
    {
        int least = _lowA;
        int width = _highB - _lowB + 1;
        _kernel.Start(_lowA, _highA, leave, _negligible);
        do
        {
            least = Math.Max(0, _lowA - _kernel.Leaving);
            int first = _kernel.First;
            ReadOnlySpan<double> weights = _kernel.Weights;
            for (int i = 0; i < weights.Length; i++)
            {
                Vectors.AddScaled(_next[first + i - _kernel.Leaving].AsSpan(_lowB, width), _now[first + i].AsSpan(_lowB), weights[i]);
            }
        }
        while (_kernel.Next());
        Swap();
        _lowA = least;
    }

    private void ThinB(double leave)
    {
        int least = _lowB;
        _kernel.Start(_lowB, _highB, leave, _negligible);
        do
        {
            least = Math.Max(0, _lowB - _kernel.Leaving);
            int first = _kernel.First;
            for (int row = _lowA; row <= _highA; row++)
            {
                Vectors.AddProducts(_next[row].AsSpan(first - _kernel.Leaving, _highB - first + 1), _kernel.Weights, _now[row].AsSpan(first), 1);
            }
        }
        while (_kernel.Next());
        Swap();
        _lowB = least;
    }

    private void Swap()
    {
        for (int row = _lowA; row <= _highA; row++)
        {
            Array.Clear(_now[row], _lowB, _highB - _lowB + 1);
        }

        (_now, _next) = (_next, _now);
    }

    private void Trim()
    {
        while (!IsEmpty && RowIsNegligible(_lowA))
        {
            Array.Clear(_now[_lowA++]);
        }

        while (!IsEmpty && RowIsNegligible(_highA))
        {
            Array.Clear(_now[_highA--]);
        }

        while (!IsEmpty && ColumnIsNegligible(_lowB))
        {
            ClearColumn(_lowB++);
        }

        while (!IsEmpty && ColumnIsNegligible(_highB))
        {
            ClearColumn(_highB--);
        }
    }

    private bool RowIsNegligible(int row) => !_now[row].AsSpan(_lowB, _highB - _lowB + 1).ContainsAnyExceptInRange(double.NegativeInfinity, _negligible);

    private bool ColumnIsNegligible(int column)
    {
        for (int row = _lowA; row <= _highA; row++)
        {
            if (_now[row][column] > _negligible)
            {
                return false;
            }
        }

        return true;
    }

    private void ClearColumn(int column)
    {
        for (int row = _lowA; row <= _highA; row++)
        {
            _now[row][column] = 0;
        }
    }
}

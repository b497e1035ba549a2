using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Blocks;

/// <summary>The normal equations of group effects, blocks eliminated, solved without a single subtraction in their matrix.</summary>
/// <remarks>
/// C = diag(n_i) - N diag(1/n_j) N' has rows that add up to 0 and nothing positive off its diagonal: a network whose nodes are the groups and whose conductances are the ties between them.
/// Eliminating a node only ever adds conductance between its neighbours, and the pivot is the sum of its conductances, so that pivots and multipliers keep all of their 32 digits however unequal the design is
/// (W. K. Grassmann, M. I. Taksar and D. P. Heyman 1985, Operations Research 33:1107; C. A. O'Cinneide 1993, Numerische Mathematik 65:109).
/// Exact integers would do as well, but grow to hundreds of digits with the number of groups, and to tens of thousands where blocks differ in size.
/// Cost: k^3/3 multiplications of 32 digits.
/// </remarks>
internal sealed class BlockElimination
{
    /// <summary>Some five units of the last of 32 digits.</summary>
    private const double RoundingShare = 1e-30;

    private readonly int _last;
    private readonly DoubleDouble[] _pivots;
    private readonly DoubleDouble[,] _multipliers;

    /// <summary>Eliminates one group after the other; the last one is left as the origin of the effects.</summary>
    /// <param name="ties">The conductances (<see cref="BlockDesign.Ties"/>) of a connected design; overwritten.</param>
    /// <exception cref="InvalidOperationException">The design is not connected.</exception>
    public BlockElimination(DoubleDouble[,] ties)
    {
        int k = ties.GetLength(0);
        _last = k - 1;
        _pivots = new DoubleDouble[k];
        _multipliers = new DoubleDouble[k, k];
        for (int p = 0; p < _last; p++)
        {
            DoubleDouble pivot = default;
            for (int i = p + 1; i < k; i++)
            {
                pivot += ties[p, i];
            }

            if (pivot.High <= 0)
            {
                throw new InvalidOperationException("Groups that no block links cannot be compared within blocks.");
            }

            _pivots[p] = pivot;
            for (int i = p + 1; i < k; i++)
            {
                if (ties[p, i].High > 0)
                {
                    Eliminate(ties, p, i);
                }
            }
        }
    }

    /// <summary>Solves for the effects.</summary>
    /// <param name="adjustedTotals">Q: of each group its total less what the means of its blocks lead one to expect; they add up to 0.</param>
    /// <returns>The effects, that of the last group 0; and Q' C^- Q, the sum of squares of groups adjusted for blocks, a sum of squares.</returns>
    public (WideReal[] Effects, WideReal SumOfSquares) Solve(WideReal[] adjustedTotals)
    {
        WideReal[] y = [.. adjustedTotals];
        var effects = new WideReal[y.Length];
        WideReal squares = WideReal.Zero;
        for (int p = 0; p < _last; p++)
        {
            effects[p] = y[p] / WideReal.From(_pivots[p]);
            squares += y[p] * effects[p];
            for (int i = p + 1; i <= _last; i++)
            {
                y[i] += WideReal.From(_multipliers[p, i]) * y[p];
            }
        }

        for (int p = _last - 1; p >= 0; p--)
        {
            for (int i = p + 1; i < _last; i++)
            {
                effects[p] += WideReal.From(_multipliers[p, i]) * effects[i];
            }
        }

        return (effects, squares);
    }

    /// <summary>Bounds on the rounding errors of the effects that <see cref="Solve"/> gives.</summary>
    /// <param name="adjustedTotals">As given to it.</param>
    /// <returns>For each effect the effect that the totals would have without their signs, times the unit of 32 digits and the number of groups: as pivots and multipliers are positive, nothing cancels in that number, and each of its terms was rounded a few times a group.</returns>
    public WideReal[] RoundingBounds(WideReal[] adjustedTotals)
    {
        WideReal share = WideReal.From(RoundingShare * adjustedTotals.Length);
        return [.. Solve([.. adjustedTotals.Select(t => t.Size)]).Effects.Select(e => e * share)];
    }

    /// <summary>The variance of the difference of every two effects, over the residual variance: the resistance of the network between two nodes.</summary>
    /// <returns>Symmetric, 0 on the diagonal; minus half of it is a generalised inverse of C.</returns>
    public double[,] DifferenceVariances()
    {
        DoubleDouble[,] inverse = Inverse();
        var variances = new double[_last + 1, _last + 1];
        for (int a = 0; a <= _last; a++)
        {
            for (int b = a + 1; b <= _last; b++)
            {
                DoubleDouble variance = inverse[a, a] - inverse[a, b] + (inverse[b, b] - inverse[a, b]);
                variances[a, b] = variances[b, a] = variance.High;
            }
        }

        return variances;
    }

    private void Eliminate(DoubleDouble[,] ties, int p, int i)
    {
        DoubleDouble multiplier = ties[p, i] / _pivots[p];
        _multipliers[p, i] = multiplier;
        for (int h = i + 1; h <= _last; h++)
        {
            if (ties[p, h].High > 0)
            {
                ties[i, h] += multiplier * ties[p, h];
            }
        }
    }

    /// <summary>The inverse of C without the last group, bordered with zeros.</summary>
    private DoubleDouble[,] Inverse()
    {
        var inverse = new DoubleDouble[_last + 1, _last + 1];
        for (int p = _last - 1; p >= 0; p--)
        {
            for (int h = p + 1; h < _last; h++)
            {
                DoubleDouble sum = default;
                for (int i = p + 1; i < _last; i++)
                {
                    sum += _multipliers[p, i] * inverse[i, h];
                }

                inverse[p, h] = inverse[h, p] = sum;
            }

            DoubleDouble own = DoubleDouble.From(1.0) / _pivots[p];
            for (int i = p + 1; i < _last; i++)
            {
                own += _multipliers[p, i] * inverse[i, p];
            }

            inverse[p, p] = own;
        }

        return inverse;
    }
}

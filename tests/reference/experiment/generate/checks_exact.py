#!/usr/bin/env python3
"""What the checks of an experiment must give, from exact rational arithmetic on the values read as doubles; tails in 40-digit arithmetic.
checks_exact.csv: Levene's test on means, the ratio of standard deviations, the two-sided p of von Neumann's ratio by the beta law with the exact moments.
run_order_layouts.csv: mean and variance of that ratio for small layouts, from the full matrices; without blocks where the column is empty.
normal_law.csv: upper tail and quantile of the normal law."""
import csv, random
from collections import OrderedDict
from fractions import Fraction as Fr
from mpf import *
from experiments_exact import load, m, one_way, fup, dw_traces
mp.dps = 40

def levene_mean(G):
    Z = [[abs(x-sum(g)/len(g)) for x in g] for g in G]; L = one_way(Z)
    if L['ssw'] == 0: return None, None
    f = m(L['ssb']/(L['k']-1)/(L['ssw']/(L['N']-L['k']))); return f, fup(f, L['k']-1, L['N']-L['k'])[0]

def beta_two_sided(d, mean, var):
    s = mean*(4-mean)/var-1; a = s*mean/4; b = s*(4-mean)/4; x = d/4
    return min(mpf(1), 2*min(mp.betainc(a, b, 0, x, regularized=True), mp.betainc(a, b, x, 1, regularized=True)))

def solve_projector(X):
    """Exact projector on the columns of X (Gram-Schmidt in rationals, dependent columns dropped)."""
    N = len(X); Q = []
    for c in range(len(X[0])):
        v = [X[i][c] for i in range(N)]
        for q, qq in Q:
            s = sum(a*b for a, b in zip(v, q))/qq; v = [a-s*b for a, b in zip(v, q)]
        vv = sum(a*a for a in v)
        if vv != 0: Q.append((v, vv))
    return [[sum(q[i]*q[j]/qq for q, qq in Q) for j in range(N)] for i in range(N)], len(Q)

def dense_moments(blocks, groups):
    N = len(groups); cols = [[Fr(int(g == l)) for g in groups] for l in sorted(set(groups))]
    if blocks is not None: cols += [[Fr(int(b == l)) for b in blocks] for l in sorted(set(blocks))]
    H, rank = solve_projector([[c[i] for c in cols] for i in range(N)]); v = N-rank
    A = [[Fr(0)]*N for _ in range(N)]
    for i in range(N-1):
        A[i][i] += 1; A[i+1][i+1] += 1; A[i][i+1] -= 1; A[i+1][i] -= 1
    M = [[Fr(int(i == j))-H[i][j] for j in range(N)] for i in range(N)]
    MA = [[sum(M[i][k]*A[k][j] for k in (j-1, j, j+1) if 0 <= k < N) for j in range(N)] for i in range(N)]
    tr = sum(MA[i][i] for i in range(N)); tr2 = sum(MA[i][j]*MA[j][i] for i in range(N) for j in range(N))
    return v, m(tr/v), m(2*(tr2-tr*tr/v)/(v*(v+2)))

if __name__ == '__main__':
    with open('checks_exact.csv', 'w', newline='') as fh:
        w = csv.writer(fh, lineterminator='\n'); w.writerow(['experiment', 'levene_mean_f', 'levene_mean_p', 'spread_ratio', 'run_order_p'])
        for nm, rows in load('experiments_data.csv').items():
            gr = OrderedDict()
            for g, o, v in rows: gr.setdefault(g, []).append((o, v))
            G = [[v for _, v in x] for x in gr.values()]; f, p = levene_mean(G); names = list(gr)
            s2 = [sum((x-sum(g)/len(g))**2 for x in g)/(len(g)-1) for g in G]
            ratio = mp.sqrt(m(max(s2)/min(s2))) if min(s2) > 0 else None
            means = {n: sum(v for _, v in x)/len(x) for n, x in gr.items()}
            res = sorted((o, v-means[g], names.index(g)) for g, o, v in rows); e = [x for _, x, _ in res]; N = len(e); df = N-len(G)
            d = m(sum((e[i+1]-e[i])**2 for i in range(N-1))/sum(x*x for x in e)); tr, tr2 = dw_traces([g for _, _, g in res], [len(g) for g in G], N)
            p2 = beta_two_sided(d, m(tr/df), m(2*(tr2-tr*tr/df)/(df*(df+2))))
            w.writerow([nm]+['' if x is None else s17(x) for x in (f, p, ratio, p2)])
    rnd = random.Random(20261201); lay = []
    for k, b in ((3, 4), (2, 6), (4, 5), (3, 8)):                       # complete blocks, in random and in block order
        cells = [(j, i) for j in range(b) for i in range(k)]
        lay.append(cells); c = cells[:]; rnd.shuffle(c); lay.append(c); lay.append([(j, i) for i in range(k) for j in range(b)])
    lay.append([(j, i) for j, p in enumerate([(0, 1), (1, 2), (2, 3), (3, 0), (0, 2), (1, 3)]) for i in p])   # incomplete pairs
    c = [(j, i) for j, p in enumerate([(0, 1, 2), (0, 1, 3), (0, 2, 3), (1, 2, 3)]) for i in p]; rnd.shuffle(c); lay.append(c)
    c = [(rnd.randrange(5), rnd.randrange(4)) for _ in range(30)]; lay.append(c)                              # unequal, repeated
    c = [(j, i) for j in range(6) for i in range(4) if (j, i) not in ((0, 0), (3, 2))]; rnd.shuffle(c); lay.append(c)
    one = [[0]*4+[1]*4+[2]*4, [0, 0, 1, 1, 2, 2, 3, 3], [0, 1]*6, [0, 1, 2]*4, [rnd.randrange(4) for _ in range(25)], [0]*9+[1], [2, 0, 0, 1, 0, 2, 2]]
    with open('run_order_layouts.csv', 'w', newline='') as fh:
        w = csv.writer(fh, lineterminator='\n'); w.writerow(['blocks', 'groups', 'df', 'mean', 'variance'])
        for bl, g in [([x for x, _ in l], [y for _, y in l]) for l in lay]+[(None, g) for g in one]:
            v, mean, var = dense_moments(bl, g); w.writerow(['' if bl is None else ' '.join(map(str, bl)), ' '.join(map(str, g)), v, s17(mean), s17(var)])
    with open('normal_law.csv', 'w', newline='') as fh:
        w = csv.writer(fh, lineterminator='\n'); w.writerow(['z', 'upper', 'probability', 'quantile'])
        for z, p in zip([-8, -3, -1, -.25, 0, .125, .5, 1, 1.5, 2, 3, 4.5, 6, 8, 12, 16, 20, 25, 30, 37],
                        [2**-60, 1e-10, 1e-5, .001, .01, .05, .1, .2, .3, .4, .45, .5, .55, .6, .75, .9, .95, .99, .999, 1-2**-30]):
            q = mp.findroot(lambda t: mp.log(mp.erfc(-t/mp.sqrt(2))/2)-mp.log(mpf(p)), -mp.sqrt(max(0, -2*mp.log(2*mpf(p)))) if p < .4 else mpf(0) if p < .7 else mp.sqrt(-2*mp.log(1-mpf(p)))/1.2)
            w.writerow([repr(z), s17(mp.erfc(mpf(z)/mp.sqrt(2))/2), repr(p), s17(q)])

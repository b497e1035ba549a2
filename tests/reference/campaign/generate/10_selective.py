"""Comparisons inside selected experiments, after Y. Benjamini and M. Bogomolov 2014, Journal of the Royal Statistical Society B 76:297-318.
Family data: 6 experiments, k groups each, group means/n/pooled MSE given; p-values from F and t laws (mpmath, 40 digits)."""
import mpmath, itertools
from common import *
mp = mpmath.mp; mp.dps = 40
mpf = mpmath.mpf
def Ibeta(a, b, x): return mpmath.betainc(a, b, 0, x, regularized=True)
def f_sf(f, d1, d2): return Ibeta(mpf(d2)/2, mpf(d1)/2, mpf(d2)/(mpf(d2)+d1*mpf(f)))
def t_two(t, d): t = mpf(t); return Ibeta(mpf(d)/2, mpf(1)/2, mpf(d)/(mpf(d)+t*t))
E = [('E1', [12.0, 15.0, 14.0], [5,5,5], 1.5), ('E2', [8.0, 8.2, 8.1, 7.9], [4,4,4,4], 0.6),
     ('E3', [30.0, 33.5, 31.0, 36.0], [6,5,6,5], 4.0), ('E4', [1.0, 1.1], [8,8], 0.09),
     ('E5', [5.0, 5.9, 5.5], [10,10,9], 0.35), ('E6', [100.0, 103.0, 99.0, 101.0, 98.0], [3,3,3,3,3], 9.0)]
q = mpf(5)/100
ex = []
for name, mu, n, mse in E:
    k = len(mu); N = sum(n); gm = mpmath.fsum(mpf(a)*b for a, b in zip(mu, n))/N
    ssb = mpmath.fsum(b*(mpf(a)-gm)**2 for a, b in zip(mu, n)); df1, df2 = k-1, N-k
    f = ssb/df1/mpf(mse); ex.append(dict(name=name, f=f, df1=df1, df2=df2, p=f_sf(f, df1, df2), mu=mu, n=n, mse=mse))
m = len(ex); o = sorted(range(m), key=lambda i: ex[i]['p'])
R = max([k+1 for k in range(m) if ex[o[k]]['p'] <= q*(k+1)/m], default=0)
bh = [None]*m; c = mpf(1)
for k in range(m-1, -1, -1): c = min(c, ex[o[k]]['p']*m/(k+1)); bh[o[k]] = c
sel = set(o[:R]); level = q*R/m
write('selective_experiments.csv', 'F tests of six experiments and their selection by Benjamini and Hochberg at 0.05; 40 digits (10_selective.py)', ['experiment','F','df1','df2','p','bh_adjusted','selected','R','m','within_level_Rq_over_m'],
      [[e['name'], float(e['f']), e['df1'], e['df2'], float(e['p']), float(bh[i]), i in sel, R, m, float(level)] for i, e in enumerate(ex)])
rows = []
for i, e in enumerate(ex):
    prs = list(itertools.combinations(range(len(e['mu'])), 2)); pp = []
    for a, b in prs:
        d = mpf(e['mu'][a])-mpf(e['mu'][b]); se = mpmath.sqrt(mpf(e['mse'])*(mpf(1)/e['n'][a]+mpf(1)/e['n'][b]))
        pp.append((d, se, t_two(d/se, e['df2'])))
    L = len(pp); oo = sorted(range(L), key=lambda j: pp[j][2]); holm = [None]*L; bhw = [None]*L; c = mpf(0)
    for k, j in enumerate(oo): c = max(c, min(mpf(1), (L-k)*pp[j][2])); holm[j] = c
    c = mpf(1)
    for k in range(L-1, -1, -1): c = min(c, pp[oo[k]][2]*L/(k+1)); bhw[oo[k]] = c
    for j, (a, b) in enumerate(prs):
        d, se, p = pp[j]
        s = i in sel
        ah = min(mpf(1), holm[j]*m/R) if s else None
        ab = min(mpf(1), bhw[j]*m/R) if s else None
        rows.append([e['name'], a+1, b+1, float(d), float(se), e['df2'], float(p), float(holm[j]), float(bhw[j]), s,
                     float(ah) if s else '', float(ab) if s else '', bool(s and holm[j] <= level), bool(s and bhw[j] <= level)])
write('selective_pairs.csv', 'All pairs of groups of these experiments: t tests with the pooled variance, adjusted inside the experiment, then for its selection (10_selective.py)', ['experiment','group_a','group_b','difference','se','df','p','holm_within','bh_within','experiment_selected',
      'bb_holm_adjusted','bb_bh_adjusted','bb_holm_reject_q0.05','bb_bh_reject_q0.05'], rows)
print('R=%d of %d, within level %s' % (R, m, mpmath.nstr(level, 10)))
for i, e in enumerate(ex): print(e['name'], mpmath.nstr(e['f'], 8), e['df1'], e['df2'], mpmath.nstr(e['p'], 8), mpmath.nstr(bh[i], 8), i in sel)

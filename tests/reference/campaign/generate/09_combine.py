"""Global-null combination p-values; mpmath 80 digits from the definitions, cross-checked with SciPy."""
import mpmath, numpy as np, warnings
from scipy import stats
from fractions import Fraction as F
from common import *
warnings.simplefilter('ignore')
mp = mpmath.mp; mp.dps = 80
mpf = mpmath.mpf
def isf(p):                                    # upper-tail normal quantile
    p = mpf(p)
    if p == mpf(1)/2: return mpf(0)
    if p > mpf(1)/2: return -isf(1-p)
    z = mpmath.sqrt(-2*mpmath.log(p))           # Newton on log survival
    for _ in range(200):
        q = mpmath.erfc(z/mpmath.sqrt(2))/2; d = mpmath.npdf(z)
        dz = (mpmath.log(q)-mpmath.log(p))*q/d
        z += dz
        if abs(dz) < mpf(10)**-70: break
    return z
def sf(z): return mpmath.erfc(z/mpmath.sqrt(2))/2
def fisher(p):
    if any(x == 0 for x in p): return mpf(0), mpmath.inf
    x = -mpmath.fsum(mpmath.log(mpf(v)) for v in p); m = len(p)
    s = mpf(0); t = mpf(1)
    for k in range(m):
        if k: t = t*x/k
        s += t
    return mpmath.exp(-x)*s, 2*x
def stouffer(p, w):
    z0, z1 = any(x == 0 for x in p), any(x == 1 for x in p)
    if z0 and z1: return mpf('nan'), mpf('nan')
    if z0: return mpf(0), mpmath.inf
    if z1: return mpf(1), -mpmath.inf
    Z = mpmath.fsum(mpf(a)*isf(x) for a, x in zip(w, p))/mpmath.sqrt(mpmath.fsum(mpf(a)**2 for a in w))
    return sf(Z), Z
def cauchy(p, w):
    if any(x == 0 for x in p): return mpf(0), mpmath.inf
    m = len(p)
    if m == 1: return mpf(p[0]), (mpmath.cot(mpmath.pi*mpf(p[0])) if p[0] != 1 else -mpmath.inf)
    W = mpmath.fsum(map(mpf, w))
    T = mpmath.fsum(mpf(a)/W*mpmath.cot(mpmath.pi*(mpf(x) if x != 1 else 1-mpf(1)/m)) for a, x in zip(w, p))
    return (mpmath.atan(1/T)/mpmath.pi if T > 0 else (mpf(1)/2 if T == 0 else 1+mpmath.atan(1/T)/mpmath.pi)), T
def simes(p):
    q = sorted(F(x) for x in p); m = len(q)
    return min(F(1), min(m*q[k]/(k+1) for k in range(m)))
def hmp(p):
    if any(x == 0 for x in p): return mpf(0)
    return len(p)/mpmath.fsum(1/mpf(x) for x in p)
rows = []
for name, p in read_pvectors().items():
    m = len(p); w1 = [1]*m; w2 = [1+(i % 3) for i in range(m)]
    s = simes(p); H = sum(F(1, k) for k in range(1, m+1))
    fp, fx = fisher(p); sp, sz = stouffer(p, w1); wp, wz = stouffer(p, w2); cp, ct = cauchy(p, w1); cwp, _ = cauchy(p, w2)
    hm = hmp(p); cons = min(mpf(1), mpmath.e*mpmath.log(m)*hm) if m >= 2 else mpf(p[0])
    rows.append([name, m, float(min(F(1), m*min(F(x) for x in p))), float(s), float(min(F(1), s*H)), float(fx), float(fp), float(sz), float(sp), float(wz), float(wp), float(ct), float(cp), float(cwp), float(hm), float(cons), float(min(mpf(1), 2*mpmath.fsum(map(mpf, p))/m))])
    if all(0 < x < 1 for x in p):
        a = stats.combine_pvalues(p, 'fisher'); b = stats.combine_pvalues(p, 'stouffer'); c = stats.combine_pvalues(p, 'stouffer', weights=w2)
        print('%-12s fisher rel %.1e  stouffer rel %.1e  weighted rel %.1e' % (name, abs(a[1]/float(fp)-1), abs(b[1]/float(sp)-1), abs(c[1]/float(wp)-1)))
write('global_combination.csv', 'global tests of the null, mpmath, 80 digits; generator: generate/09_combine.py', ['set','m','bonferroni_min_p','simes','simes_times_Hm','fisher_chi2','fisher_p','stouffer_z','stouffer_p','stouffer_z_w123','stouffer_p_w123','cauchy_T','cauchy_p','cauchy_p_w123','harmonic_mean_raw','harmonic_mean_e_ln_m','twice_mean'], rows)
for r in rows: print([x if isinstance(x, (str, int)) else '%.6g' % x for x in r])

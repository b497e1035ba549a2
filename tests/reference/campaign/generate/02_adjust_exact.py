"""Adjusted p-values in exact rational arithmetic (the input doubles are taken as exact), then
correctly rounded to double.  Sidak types: mpmath with 4000 bits.  Written from the definitions."""
from fractions import Fraction as F
import mpmath, time
from common import *
mpmath.mp.prec = 4000
ONE = F(1)

def order(p):                        # stable ascending order
    return sorted(range(len(p)), key=lambda i: (p[i], i))

def unsort(o, vals):
    r = [None]*len(o)
    for k, i in enumerate(o): r[i] = vals[k]
    return r

def stepdown(ps, raw):               # running max, cap at 1
    out, c = [], F(0)
    for x in raw:
        c = max(c, min(ONE, x)); out.append(c)
    return out

def stepup(raw):                     # running min from the right, cap at 1
    out, c = [None]*len(raw), ONE
    for k in range(len(raw)-1, -1, -1):
        c = min(c, raw[k]); out[k] = c
    return out

def simes_tails(ps):
    """a[i-1] = Simes p of the i largest p-values (exact), i=1..m ; O(m^2) by definition"""
    m = len(ps); a = []
    for i in range(1, m+1):
        a.append(min(ONE, i*min(ps[m-i+j-1]/j for j in range(1, i+1))))
    return a

def hommel_adj(ps, a):
    """closed testing with Simes: padj = min over h=0..m of max(a_{h+1}, h p), a_{m+1}=0 (binary search)."""
    m = len(ps); A = a+[F(0)]
    out = []
    for p in ps:
        lo, hi = 0, m               # find smallest h with h*p >= A[h]   (A[h] = a_{h+1})
        while lo < hi:
            mid = (lo+hi)//2
            if mid*p >= A[mid]: hi = mid
            else: lo = mid+1
        h = lo
        best = max(A[h], h*p)
        if h > 0: best = min(best, max(A[h-1], (h-1)*p))
        out.append(min(ONE, best))
    return out

def bky_adj(ps, bh):
    """min q with rejection by the BKY(2006, Def.6) two-stage procedure; q'=q/(1+q)"""
    m = len(ps); out = []
    for i in range(m):
        best = None
        lo, hi = 1, m               # smallest r with bh_(r) >= bh_(i)*(m-r)/m
        while lo < hi:
            mid = (lo+hi)//2
            if bh[mid-1] >= bh[i]*(m-mid)/m: hi = mid
            else: lo = mid+1
        cand = [lo] + ([lo-1] if lo > 1 else [])
        qp = min(max(bh[r-1], bh[i]*(m-r)/m) for r in cand)
        out.append(min(ONE, qp/(1-qp)) if qp < ONE else ONE)
    return out

def bky_decide(ps, q):
    """the two stages themselves: first-stage rejections, true nulls estimated, level of the second stage, rejections"""
    m = len(ps); qp = q/(1+q)
    reach = lambda level: max([k+1 for k in range(m) if ps[k] <= level*(k+1)/m], default=0)
    r1 = reach(qp)
    if r1 in (0, m): return r1, m-r1, None, r1
    qs = qp*m/(m-r1)
    return r1, m-r1, qs, reach(qs)

def storey_adj(ps):
    """Storey, Taylor and Siegmund 2004, lambda = 1/2: least level at which some t in [p, lambda] has (W+1)/(1-lambda) t <= level R(t); 1 above lambda"""
    L = F(1, 2); W = sum(1 for x in ps if x > L)
    est = {t: F(W+1)/(1-L)*t/sum(1 for x in ps if x <= t) for t in set(ps) if t <= L}
    least, c = {}, ONE
    for t in sorted(est, reverse=True):
        c = min(c, est[t]); least[t] = c
    return [least.get(x, ONE) for x in ps]

def sidak(x, n):                     # 1-(1-x)^n exactly rounded
    X = mpmath.mpf(x.numerator)/x.denominator
    return 1-(1-X)**n

if __name__ == '__main__':
    rows, brow = [], []
    for name, p in read_pvectors().items():
        t0 = time.time()
        m = len(p); P = [fr(x) for x in p]; o = order(P); ps = [P[i] for i in o]
        H = sum(F(1, k) for k in range(1, m+1))
        res = {}
        res['bonferroni'] = [min(ONE, m*x) for x in ps]
        res['sidak'] = [sidak(x, m) for x in ps]
        res['holm'] = stepdown(ps, [(m-k)*ps[k] for k in range(m)])
        c, hs = mpmath.mpf(0), []
        for k in range(m):
            c = max(c, sidak(ps[k], m-k)); hs.append(c)
        res['holm_sidak'] = hs
        res['hochberg'] = stepup([(m-k)*ps[k] for k in range(m)])
        a = simes_tails(ps)
        assert all(a[i] >= a[i+1] for i in range(m-1))      # a Simes p-value never rises when a larger p-value joins the tail
        res['hommel'] = hommel_adj(ps, a)
        bh = stepup([m*ps[k]/(k+1) for k in range(m)])
        res['bh'] = bh
        res['by'] = stepup([H*m*ps[k]/(k+1) for k in range(m)])
        res['bky'] = bky_adj(ps, bh)
        for q in (F(5,100), F(1,10)):
            r1, m0, qs, r2 = bky_decide(ps, q)
            assert r2 == sum(1 for x in res['bky'] if x <= q), (name, q, r2)
            brow.append((name, m, float(q), float(q/(1+q)), r1, m0, float(qs) if qs else 'all' if r1 else float(q/(1+q)), r2))
        res['hommel_any'] = [min(ONE, H*x) for x in res['hommel']]
        res['storey'] = storey_adj(ps)
        cols = ['bonferroni','sidak','holm','holm_sidak','hochberg','hommel','bh','by','bky','hommel_any','storey']
        un = {c: unsort(o, res[c]) for c in cols}
        for i in range(m):
            rows.append([name, i+1, p[i]] + [float(un[c][i]) for c in cols])
        print(name, m, '%.1fs' % (time.time()-t0), flush=True)
    write('adjust_exact.csv', 'adjusted p-values in exact rational arithmetic (Sidak and Holm-Sidak: mpmath, 4000 bits), rounded once to a double; generator: generate/02_adjust_exact.py',
          ['set','index','p']+cols, rows)
    write('bky_stages.csv', 'the two stages of Benjamini, Krieger and Yekutieli 2006, definition 6, in exact rational arithmetic; generator: generate/02_adjust_exact.py',
          ['set','m','q','q_prime','r1','m0','q_star','rejected'], brow)

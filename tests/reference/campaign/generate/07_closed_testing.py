"""Simes closed testing: brute force over all 2^m subsets (m<=10) versus the shortcut, exact rationals.
Outputs closed_testing.csv (h, bounds for stated sets), closed_testing_curve.csv, closed_testing_tail_simes.csv (Simes p-values of the tails)."""
import sys, random, time, csv
from fractions import Fraction as F
from common import *

# ---------------- shortcut (Goeman and Solari 2011; Goeman, Meijer, Krebs and Solari 2019) ----------------
def h_of(ps, al):
    """largest i with  i*p_(m-i+j) > j*alpha for all j=1..i  (binary search, valid by monotonicity); ps ascending"""
    m = len(ps)
    ok = lambda i: all(i*ps[m-i+j-1] > j*al for j in range(1, i+1))
    lo, hi = 0, m
    while lo < hi:
        mid = (lo+hi+1)//2
        if ok(mid): lo = mid
        else: hi = mid-1
    return lo
def d_bound(pS, h, al):
    """lower confidence bound on number of false nulls (true discoveries) in S"""
    s = len(pS); cnt = [0]*(s+2)
    for p in pS:
        u = max(1, -((-h*p)//al)) if isinstance(p, (int, F)) else None     # ceil(h p/alpha), at least 1
        if u <= s: cnt[u] += 1
    best = c = 0
    for u in range(1, s+1):
        c += cnt[u]; best = max(best, 1-u+c)
    return best
def tails_hull(ps):
    """a_i = Simes p of the i largest, all i, O(m log m) by a lower convex hull built from the right"""
    m = len(ps); hull = []                          # stack, leftmost point last
    out = []
    def cross(o, a, b): return (a[0]-o[0])*(b[1]-o[1])-(a[1]-o[1])*(b[0]-o[0])
    for i in range(1, m+1):
        pt = (m-i+1, ps[m-i])
        while len(hull) >= 2 and cross(pt, hull[-1], hull[-2]) <= 0: hull.pop()
        hull.append(pt)
        x0 = m-i
        lo, hi = 0, len(hull)-1                     # hull[-1-k], k=0 leftmost; slopes from (x0,0) fall then rise
        sl = lambda k: (hull[-1-k][1], hull[-1-k][0]-x0)     # numerator, denominator (>0)
        while lo < hi:
            mid = (lo+hi)//2
            a, b = sl(mid), sl(mid+1)
            if b[0]*a[1] < a[0]*b[1]: lo = mid+1
            else: hi = mid
        n, d = sl(lo)
        out.append(min(1, i*n/d) if not isinstance(n, int) else min(F(1), F(i*n, d)))
    return out
def top_curve(ps, h, al):
    """d for the k smallest p-values, k=0..m, in O(m): running max of (i+1-u_i)"""
    out = [0]
    for i, p in enumerate(ps, 1): out.append(max(out[-1], i+1-max(1, -((-h*p)//al))))
    return out
# ---------------- brute force from the definition ----------------
def brute(p, al):
    m = len(p); full = (1 << m)-1
    local = [False]*(full+1)
    for I in range(1, full+1):
        q = sorted(p[i] for i in range(m) if I >> i & 1); n = len(q)
        local[I] = any(n*q[j-1] <= j*al for j in range(1, n+1))
    rej = [False]*(full+1)
    for I in range(full, 0, -1):
        rej[I] = local[I] and all(rej[I | 1 << j] for j in range(m) if not I >> j & 1)
    t = [0]*(full+1)                                 # max size of non-rejected subset
    for S in range(1, full+1):
        t[S] = bin(S).count('1') if not rej[S] else max((t[S & ~(1 << j)] for j in range(m) if S >> j & 1), default=0)
    return rej, t
def brute_hommel(p):
    m = len(p); full = (1 << m)-1; best = [F(0)]*m
    for I in range(1, full+1):
        idx = [i for i in range(m) if I >> i & 1]; q = sorted(p[i] for i in idx); n = len(q)
        s = min(F(n)*q[j-1]/j for j in range(1, n+1))
        for i in idx: best[i] = max(best[i], s)
    return [min(F(1), x) for x in best]

if __name__ == '__main__':
    rng = random.Random(11); al0 = F(1, 20)
    nvec = nset = nhom = 0; t0 = time.time()
    budget = float(sys.argv[1]) if len(sys.argv) > 1 else 20
    import importlib; A = importlib.import_module('02_adjust_exact')
    bym = {}
    while time.time()-t0 < budget:
        m = rng.choice([1,2,3,4,5,6,7,8,9,10])
        den = rng.choice([20, 40, 100, 200, 1000, 10007])
        pw = rng.choice([1, 2, 3])
        p = [F(int(den*rng.random()**pw + rng.choice([0, 0, 1])), den) for _ in range(m)]
        p = [min(F(1), x) for x in p]
        al = rng.choice([F(1,20), F(1,10), F(1,5), F(1,100), F(1,2)])
        rej, t = brute(p, al); ps = sorted(p); h = h_of(ps, al)
        naive_h = max(i for i in range(m+1) if all(i*ps[m-i+j-1] > j*al for j in range(1, i+1)))
        assert h == naive_h
        for S in range(1, 1 << m):
            pS = [p[i] for i in range(m) if S >> i & 1]; s = len(pS)
            assert s-d_bound(pS, h, al) == t[S], (p, al, S)
            q = sorted(pS); assert rej[S] == any(h*q[j-1] <= j*al for j in range(1, s+1))
            nset += 1
        th = tails_hull(ps); assert th == A.simes_tails(ps), (ps, th)
        if m <= 8:
            hb = brute_hommel(p); o = A.order(p); ha = A.unsort(o, A.hommel_adj(ps, th)); assert ha == hb, (p, ha, hb); nhom += 1
        cv = top_curve(ps, h, al); oi = A.order(p)
        for k in range(m+1): assert cv[k] == k-t[sum(1 << i for i in oi[:k])]
        assert cv[m] == m-h
        nvec += 1; bym[m] = bym.get(m, 0)+1
    print('shortcut == brute force: %d random p-vectors (by m: %s), %d subsets; Hommel adjusted == brute closed testing on %d vectors' % (nvec, sorted(bym.items()), nset, nhom))
    # ---------------- reference output ----------------
    rows = []; hrow = []
    for name, p in read_pvectors().items():
        P = [fr(x) for x in p]; m = len(P); ps = sorted(P); o = A.order(P)
        a = tails_hull(ps)
        if m <= 100: assert a == A.simes_tails(ps)
        for i in range(m):
            if m <= 100 or i < 5 or i % 50 == 49: hrow.append([name, i+1, float(a[i])])
        for al in (fr(0.01), fr(0.05), fr(0.1), fr(0.2)):
            h = h_of(ps, al)
            sets = {'all': list(range(m)), 'top_half': o[:max(1, m//2)], 'bottom_half': o[m//2:], 'odd_index': list(range(0, m, 2)),
                    'p_le_0.05': [i for i in range(m) if p[i] <= 0.05], 'p_le_0.2': [i for i in range(m) if p[i] <= 0.2],
                    'first_10': list(range(min(10, m)))}
            for sn, idx in sets.items():
                d = d_bound([P[i] for i in idx], h, al) if idx else 0
                rows.append([name, float(al), h, sn, len(idx), d, len(idx)-d])
    write('closed_testing.csv', 'bounds of sets by closed testing with Simes tests, exact rationals; generator: generate/07_closed_testing.py', ['set','alpha','h','subset','size','d_lower_true_discoveries','t_upper_false_discoveries'], rows)
    crow = []
    for name in ('m5_hommel','m15_bh1995','m100'):
        ps = sorted(fr(x) for x in read_pvectors()[name])
        for al in (fr(0.05), fr(0.2)):
            h = h_of(ps, al)
            for k, d in enumerate(top_curve(ps, h, al)): crow.append([name, float(al), h, k, d, k-d])
    write('closed_testing_curve.csv', 'bounds of the k smallest p-values, exact rationals; generator: generate/07_closed_testing.py', ['set','alpha','h','k_smallest','d_lower_true_discoveries','t_upper_false_discoveries'], crow)
    write('closed_testing_tail_simes.csv', 'Simes p-value of the i largest p-values, exact rationals rounded once; generator: generate/07_closed_testing.py', ['set','i','a_i'], hrow)

"""Westfall-Young step-down maxT / minP, exact rational F statistics (ties are exact), and the exact
minP over independent experiments from complete enumeration."""
import itertools, random, math
from fractions import Fraction as F
from common import *

def fstat(y, lab):
    g = sorted(set(lab)); n = len(y); tot = sum(y); cf = F(tot*tot, n)
    ssb = sum(F(sum(v for v, l in zip(y, lab) if l == k)**2, lab.count(k)) for k in g)-cf
    sst = sum(v*v for v in y)-cf; ssw = sst-ssb
    return (ssb/(len(g)-1))/(ssw/(n-len(g))) if ssw else None
def allocations(lab):
    return sorted(set(itertools.permutations(lab))) if len(lab) <= 7 else list(alloc_rec(tuple(sorted(lab))))
def alloc_rec(lab):
    def rec(rem, pref):
        if not any(rem.values()): yield tuple(pref); return
        for k in sorted(rem):
            if rem[k]:
                rem[k] -= 1; pref.append(k); yield from rec(rem, pref); pref.pop(); rem[k] += 1
    cnt = {}
    for l in lab: cnt[l] = cnt.get(l, 0)+1
    yield from rec(cnt, [])
def wy(T):                       # T[b][j], b=0 observed (included), returns raw p, single/step-down maxT, single/step-down minP
    N, m = len(T), len(T[0]); t0 = T[0]
    raw = [F(sum(1 for b in range(N) if T[b][j] >= t0[j]), N) for j in range(m)]
    ssT = [F(sum(1 for b in range(N) if max(T[b]) >= t0[j]), N) for j in range(m)]
    o = sorted(range(m), key=lambda j: (-t0[j], j)); sdT = [None]*m; c = F(0)
    for k, j in enumerate(o):
        c = max(c, F(sum(1 for b in range(N) if max(T[b][l] for l in o[k:]) >= t0[j]), N)); sdT[j] = c
    P = [[None]*m for _ in range(N)]
    for j in range(m):
        srt = sorted((T[b][j] for b in range(N)), reverse=True)
        rank = {}
        for i, v in enumerate(srt): rank[v] = i+1          # last index = count >= v
        for b in range(N): P[b][j] = F(rank[T[b][j]], N)
    assert P[0] == raw
    ssP = [F(sum(1 for b in range(N) if min(P[b]) <= raw[j]), N) for j in range(m)]
    o = sorted(range(m), key=lambda j: (raw[j], j)); sdP = [None]*m; c = F(0)
    for k, j in enumerate(o):
        c = max(c, F(sum(1 for b in range(N) if min(P[b][l] for l in o[k:]) <= raw[j]), N)); sdP[j] = c
    return raw, ssT, sdT, ssP, sdP
# ---- A: one experiment, 2 groups x 4 units, 4 responses on the same units ----
Y = [[12,15,14,17, 20,19,23,18],[101,99,104,100, 103,108,105,107],[7,9,8,6, 8,10,7,9],[55,60,58,59, 57,61,56,62]]
lab = [0,0,0,0,1,1,1,1]
al = list(alloc_rec(tuple(lab))); obs = tuple(lab); al.remove(obs); al = [obs]+al
write('wy_A_data.csv', 'Four responses on the same eight units of two groups; invented. Made by 11_westfall_young.py', ['unit','group']+['y%d' % (j+1) for j in range(4)], [[i+1, lab[i]]+[Y[j][i] for j in range(4)] for i in range(8)])
out = []
T = [[fstat(y, list(a)) for y in Y] for a in al]
res = wy(T)
for j in range(4): out.append(['A_complete', len(al), 'y%d' % (j+1), float(T[0][j])]+[float(r[j]) for r in res])
rng = random.Random(3); perms = [obs]
for b in range(99):
    a = list(obs); rng.shuffle(a); perms.append(tuple(a))
write('wy_A_permutations.csv', 'Arrangement 0 is the observed one, the others are random. Made by 11_westfall_young.py', ['b']+['unit%d' % (i+1) for i in range(8)], [[b]+list(a) for b, a in enumerate(perms)])
Tm = [[fstat(y, list(a)) for y in Y] for a in perms]; res = wy(Tm)
for j in range(4): out.append(['A_montecarlo_B99_plus1', 100, 'y%d' % (j+1), float(Tm[0][j])]+[float(r[j]) for r in res])
write('wy_A_results.csv', 'Westfall-Young adjustments over all 70 arrangements and over those of wy_A_permutations.csv, exact rational F. Made by 11_westfall_young.py', ['case','N_including_observed','response','F_observed','raw_p','maxT_single','maxT_stepdown','minP_single','minP_stepdown'], out)
for r in out: print([x if isinstance(x, (str, int)) else round(x, 6) for x in r])
# ---- C: campaign of independent experiments, exact minP ----
EXP = {'E1': ([10,12,11, 14,15,13, 11,13,12], [0,0,0,1,1,1,2,2,2]),
       'E2': ([5,6,5,7, 9,8,7,10], [0,0,0,0,1,1,1,1]),
       'E3': ([20,23, 21,24, 29,30,28], [0,0,1,1,2,2,2])}
sup, p = {}, {}
rows = []
for e, (y, l) in EXP.items():
    a = list(alloc_rec(tuple(l))); f = [fstat(y, list(x)) for x in a]; fo = fstat(y, l)
    N = len(a); p[e] = F(sum(1 for v in f if v is None or v >= fo), N)
    s = sorted(set(f), reverse=True); acc = 0; S = []
    for v in s: acc += f.count(v); S.append(F(acc, N))
    sup[e] = S; rows.append([e, N, len(S), float(fo), float(p[e]), str(p[e])])
G = lambda e, x: max([s for s in sup[e] if s <= x], default=F(0))
o = sorted(EXP, key=lambda e: p[e]); c = F(0); adj = {}; single = {}; holm = {}; c2 = F(0)
for k, e in enumerate(o):
    pr = F(1)
    for l in o[k:]: pr *= 1-G(l, p[e])
    c = max(c, 1-pr); adj[e] = c
    pr = F(1)
    for l in o: pr *= 1-G(l, p[e])
    single[e] = 1-pr
    c2 = max(c2, 1-(1-p[e])**(len(o)-k)); holm[e] = c2
for r in rows: r += [float(single[r[0]]), float(adj[r[0]]), float(holm[r[0]])]
write('wy_C_results.csv', 'Exact minP over three independent experiments, from all arrangements of each, exact rational F. Made by 11_westfall_young.py', ['experiment','allocations','distinct_F','F','perm_p','perm_p_fraction','minP_single_exact','minP_stepdown_exact','holm_sidak_for_comparison'], rows)
write('wy_C_data.csv', 'Three small independent experiments; invented. Made by 11_westfall_young.py', ['experiment','unit','group','y'], [[e, i+1, l[i], y[i]] for e, (y, l) in EXP.items() for i in range(len(y))])
for r in rows: print(r)
# ---- D: random small designs with ties, several responses on the same units, with and without blocks ----
def solve(a, b):                 # Gauss-Jordan on rationals; a symmetric positive definite
    n = len(a); w = [list(map(F, a[i]))+[F(b[i])] for i in range(n)]
    for i in range(n):
        w[i] = [v/w[i][i] for v in w[i]]
        for j in range(n):
            if j != i: w[j] = [u-w[j][i]*v for u, v in zip(w[j], w[i])]
    return [r[n] for r in w]
def rss(y, cols):                # residual sum of squares of a least-squares fit with independent columns
    a = [[sum(u*v for u, v in zip(c, d)) for d in cols] for c in cols]
    b = [sum(u*v for u, v in zip(c, y)) for c in cols]; x = solve(a, b)
    return sum(v*v for v in y)-sum(u*v for u, v in zip(x, b))
def share(y, lab, blk):          # explained by groups, of what blocks (or the mean) leave
    base = [[1 if b == c else 0 for b in blk] for c in sorted(set(blk))]
    full = base+[[1 if l == k else 0 for l in lab] for k in sorted(set(lab))[1:]]
    r0, r1 = rss(y, base), rss(y, full)
    return (r0-r1)/r0
def ranks(y): return [sum(1 for v in y if v < u)*2+sum(1 for v in y if v == u)+1 for u in y]
def within(lab, blk):            # all arrangements that keep every block's own labels
    parts = []
    for c in sorted(set(blk)):
        at = [i for i, b in enumerate(blk) if b == c]
        parts.append([(at, a) for a in alloc_rec(tuple(sorted(lab[i] for i in at)))])
    for combo in itertools.product(*parts):
        new = list(lab)
        for at, a in combo:
            for i, l in zip(at, a): new[i] = l
        yield tuple(new)
DESIGNS = [('plain', [0,0,1,1,2,2], None), ('unequal', [0,0,1,1,1,2,2], None), ('two', [0,0,0,1,1,1,1], None), ('alone', [0,1,1,2,2,2], None),
           ('complete', [0,1,2,0,1,2,0,1,2], [0,0,0,1,1,1,2,2,2]), ('incomplete', [0,1,1,2,0,2,0,1,2], [0,0,1,1,2,2,3,3,3]),
           ('missing', [0,1,2,0,1,2,0,1,0,1,2], [0,0,0,1,1,1,2,2,3,3,3]), ('proportional', [0,1,1,0,0,1,1,1,1], [0,0,0,1,1,1,1,1,1])]
rng = random.Random(2026); rows = []; data = []
for name, lab, blk in DESIGNS:
    for rep in range(3):
        m = 4; Y = []
        for j in range(m):
            while True:
                y = [rng.randrange(5 if j % 2 else 1000)+(3*l if rep == 1 else 0) for l in lab]
                b = blk or [0]*len(lab)
                if rss(y, [[1 if q == c else 0 for q in b] for c in sorted(set(b))]) > 0: break
            Y.append(y)
        kinds = ['blocks' if blk and j != 3 else 'ranks' if j == 3 else 'values' for j in range(m)]
        al = list(within(lab, blk or [0]*len(lab))); obs = tuple(lab); al.remove(obs); al = [obs]+al
        Z = [ranks(y) if k == 'ranks' else y for y, k in zip(Y, kinds)]
        T = [[share(z, a, blk if k == 'blocks' else [0]*len(lab)) for z, k in zip(Z, kinds)] for a in al]
        raw, ssT, sdT, ssP, sdP = wy(T)
        for j in range(m): rows.append(['%s-%d' % (name, rep), len(al), j, kinds[j], float(T[0][j]), float(raw[j]), float(sdT[j]), float(sdP[j])])
        for i in range(len(lab)): data.append(['%s-%d' % (name, rep), lab[i], '' if blk is None else blk[i]]+[Y[j][i] for j in range(m)])
write('wy_random_data.csv', 'Random small designs with ties, four responses on the same units, some within blocks. Made by 11_westfall_young.py', ['design','group','block','y0','y1','y2','y3'], data)
write('wy_random_results.csv', 'Westfall-Young step-down adjustments of wy_random_data.csv by brute force over all arrangements (within blocks where there are any), shares of variation by least squares in exact rational arithmetic. Made by 11_westfall_young.py', ['design','arrangements','response','statistic','share','raw_p','maxT_stepdown','minP_stepdown'], rows)

"""Corrections with weights; share of true nulls and q-values (J. Storey 2002, J. Storey and R. Tibshirani 2003). Exact rationals; the smoother's constants with mpmath, 400 bits."""
from fractions import Fraction as F
import mpmath
from common import *
mpmath.mp.prec = 400
ONE = F(1)
pv = read_pvectors()
# ---------- weights: set -> weights (sum normalised to m in exact arithmetic) ----------
W = {
 'm5': [2, 1, 1, F(1,2), F(1,2)],
 'm5_edge': [1, 0, 2, 1, 1],                      # a zero weight meets p=0
 'm15_bh1995': [1]*15,
 'm15s_bh1995_shuffled': [1,2,1,2,1,2,1,2,1,2,1,2,1,2,1],
 'm100': [1 + (7*i) % 5 for i in range(100)],
}
rows = []
for name, w in W.items():
    p = [fr(x) for x in pv[name]]; m = len(p)
    w = [F(x) for x in w]; s = sum(w); w = [x*m/s for x in w]           # mean 1
    INF = None
    Q = [(p[i]/w[i]) if w[i] > 0 else INF for i in range(m)]
    key = lambda i: (Q[i] is None, Q[i] if Q[i] is not None else 0, i)
    o = sorted(range(m), key=key)
    bonf = [min(ONE, m*Q[i]) if Q[i] is not None else ONE for i in range(m)]
    holm = [None]*m; c = F(0)
    for k, i in enumerate(o):
        rest = sum(w[j] for j in o[k:])
        v = ONE if Q[i] is None else min(ONE, Q[i]*rest)
        c = max(c, v); holm[i] = c
    bh = [None]*m; c = ONE
    for k in range(m-1, -1, -1):
        i = o[k]
        v = ONE if Q[i] is None else Q[i]*m/(k+1)
        c = min(c, v); bh[i] = c if Q[i] is not None else ONE
    for i in range(m):
        rows.append([name, i+1, pv[name][i], float(w[i]), float(bonf[i]), float(holm[i]), float(bh[i])])
write('adjust_weighted.csv', 'adjusted p-values with weights of mean 1, exact rational arithmetic, rounded once; generator: generate/05_weighted_storey.py',
      ['set','index','p','weight','weighted_bonferroni','weighted_holm','weighted_bh'], rows)
# ---------- smoother constants: cubic smoothing spline, trace(S)=3, knots lambda_k=k/20,k=1..19 ----------
n = 19
h = mpmath.mpf(1)/20
Qm = mpmath.zeros(n, n-2); R = mpmath.zeros(n-2, n-2)
for j in range(n-2):
    Qm[j, j] = 1/h; Qm[j+1, j] = -2/h; Qm[j+2, j] = 1/h
    R[j, j] = 2*h/3
    if j+1 < n-2: R[j, j+1] = R[j+1, j] = h/6
K = Qm * (R**-1) * Qm.T
K = (K+K.T)/2
E, V = mpmath.eigsy(K)
E = [mpmath.mpf(0) if i < 2 else E[i] for i in range(n)]                 # two null directions (linear functions)
tr = lambda a: sum(1/(1+a*e) for e in E)
lo, hi = mpmath.mpf(10)**-12, mpmath.mpf(10)**6
for _ in range(600):
    mid = mpmath.sqrt(lo*hi)
    if tr(mid) > 3: lo = mid
    else: hi = mid
a = mpmath.sqrt(lo*hi)
S_last = [sum(V[n-1, k]*V[j, k]/(1+a*E[k]) for k in range(n)) for j in range(n)]
write('storey_smoother_constants.csv', 'value at 0.95 of the cubic smoothing spline with three degrees of freedom, as weights of its 19 points; generator: generate/05_weighted_storey.py', ['k','lambda','c_k'], [[k+1, (k+1)/20, float(S_last[k])] for k in range(n)])
print('penalty a=%s  trace=%s  sum(c)=%s' % (mpmath.nstr(a, 17), mpmath.nstr(tr(a), 20), mpmath.nstr(sum(S_last), 20)))
# ---------- Storey ----------
prow, qrow = [], []
for name in ('m5','m5_ones','m5_zeros','m15_bh1995','m100','m1000'):
    p = [fr(x) for x in pv[name]]; m = len(p)
    lam = [fr(k/20) for k in range(1, 20)]                                # doubles k/20.0
    Wl = [sum(1 for x in p if x > l) for l in lam]
    pi = [F(w, m)/(1-l) for w, l in zip(Wl, lam)]
    half = F(sum(1 for x in p if x > F(1,2)), m)*2
    plus = F(sum(1 for x in p if x > F(1,2))+1, m)*2                      # STS 2004 finite-sample version
    mn = min(pi)
    mse = [F(w,m)*(1-F(w,m))/(m*(1-l)**2) + (q-mn)**2 for w, l, q in zip(Wl, lam, pi)]
    kb = min(range(19), key=lambda k: (mse[k], k))
    smooth = sum(c*(mpmath.mpf(q.numerator)/q.denominator) for c, q in zip(S_last, pi))
    pi0 = dict(half=min(ONE, half), plus1_half_uncapped=plus, boot=min(ONE, pi[kb]))
    sm_raw = smooth; smc = min(mpmath.mpf(1), smooth)
    prow.append([name, m, float(half), float(plus), lam and float(lam[kb]), float(pi[kb]), float(sm_raw)])
    o = sorted(range(m), key=lambda i: (p[i], i))
    def qv(pi0):
        out = [None]*m; c = None
        for k in range(m-1, -1, -1):
            v = pi0*m*p[o[k]]/(k+1) if isinstance(pi0, F) else pi0*m*(mpmath.mpf(p[o[k]].numerator)/p[o[k]].denominator)/(k+1)
            c = v if c is None else min(c, v); out[o[k]] = min(c, 1)
        return out
    A, B, C, D = qv(pi0['half']), qv(plus), qv(pi0['boot']), qv(smc if smc > 0 else mpmath.mpf(0))
    for i in range(m): qrow.append([name, i+1, pv[name][i], float(A[i]), float(B[i]), float(C[i]), float(D[i])])
write('storey_pi0.csv', 'estimates of the share of true nulls, not capped at 1; generator: generate/05_weighted_storey.py', ['set','m','pi0_lambda0.5','pi0_plus1_lambda0.5_uncapped','boot_lambda','pi0_boot','pi0_smoother_uncapped'], prow)
write('storey_q.csv', 'q-values by the estimates capped at 1, and with W + 1 not capped, step-up over all p-values; generator: generate/05_weighted_storey.py', ['set','index','p','q_lambda0.5','q_plus1_lambda0.5','q_boot','q_smoother'], qrow)

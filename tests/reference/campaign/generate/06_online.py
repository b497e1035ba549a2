"""Online procedures straight from their definitions, 60-digit arithmetic (mpmath 1.3.0): spending shapes, one stream of 20 p-values
under many settings, and streams whose experiments overlap. The level is the decimal 0.05 as an exact rational."""
import mpmath, random
from functools import lru_cache
from common import *
mp = mpmath.mp; mp.dps = 60
mpf = mpmath.mpf
# ----- shapes, indexed from 1, before they are divided by their sums -----
def f_jm(j):
    j = mpf(j); return mpmath.log(max(j, mpf(2)))/(j*mpmath.exp(mpmath.sqrt(mpmath.log(j))))
def f_lg(j): return 1/(mpf(j)*mpmath.log(max(mpf(j), mpf(2)))**2)
def f_jm_s(u):                                      # integral of f_jm over [N,inf), u=log N
    s = mpmath.sqrt(u); return 2*mpmath.exp(-s)*(s**3+3*s**2+6*s+6)
N = 4000
def tail(f, integral):                              # sum_{j>=N} f(j), Euler-Maclaurin
    d1 = mpmath.diff(f, N); d3 = mpmath.diff(f, N, 3); d5 = mpmath.diff(f, N, 5)
    return integral + f(N)/2 - d1/12 + d3/720 - d5/30240
S_jm = sum(f_jm(j) for j in range(1, N)) + tail(lambda x: mpmath.log(x)/(x*mpmath.exp(mpmath.sqrt(mpmath.log(x)))), f_jm_s(mpmath.log(N)))
S_lg = sum(f_lg(j) for j in range(1, N)) + tail(lambda x: 1/(x*mpmath.log(x)**2), 1/mpmath.log(N))
SHAPE = {
 'jm': (f_jm, S_jm), 'p1.6': (lambda j: mpf(j)**(-mpf(8)/5), mpmath.zeta(mpf(8)/5)), 'p2': (lambda j: 1/mpf(j)**2, mpmath.zeta(2)),
 'log2': (f_lg, S_lg), 'uniform': (lambda j: mpf(1), None),
}
@lru_cache(None)
def total(shape, horizon): return SHAPE[shape][1] if horizon is None else sum(SHAPE[shape][0](j) for j in range(1, horizon+1))
@lru_cache(None)
def gamma(shape, horizon, j): return mpf(0) if horizon is not None and j > horizon else SHAPE[shape][0](j)/total(shape, horizon)
for s in ('jm', 'p1.6', 'p2', 'log2'): print('sum of', s, mpmath.nstr(total(s, None), 25), 'constant', mpmath.nstr(1/total(s, None), 20))
COLS = [(s, h) for s in ('jm', 'p1.6', 'p2', 'log2') for h in (None, 20)] + [('uniform', 20)]
write('online_gamma.csv', 'Made by generate/06_online.py. Spending shapes over all positions, and over 20',
      ['j']+[s+('' if h is None else '/%d' % h) for s, h in COLS],
      [[j]+[float(gamma(s, h, j)) for s, h in COLS] for j in list(range(1, 51))+[100, 1000, 10000]])

class Stream:
    """start() gives the level of the next experiment from what is known then; finish(t, p) makes its p-value known."""
    def __init__(s, kind, shape, horizon=None, w0=None, lam=None, tau=None):
        s.kind, s.g, s.w0, s.lam, s.tau = kind, (lambda j: gamma(shape, horizon, j)), w0, lam, tau
        s.al, s.p, s.rej = [], {}, []               # levels in order; p-values known by now; (t, started when it became known) of rejections, in the order known
    def start(s):
        t, a, g, k = len(s.al)+1, A, s.g, s.kind
        past = range(1, t); known = [i for i in past if i in s.p]; running = [i for i in past if i not in s.p]
        D = len(s.rej)
        if k == 'alpha-spending': v = a*g(t)
        elif k == 'online-fallback': v = a*g(t)+(s.al[-1] if any(i == t-1 for i, _ in s.rej) else 0)
        elif k == 'lond': v = a*g(t)*(D+1)
        elif k == 'lond-any': v = a*g(t)*(D+1)/sum(1/mpf(i) for i in range(1, t+1))
        elif k == 'lord':
            v = s.w0*g(t)+sum(((a-s.w0) if j == 1 else a)*g(t-r) for j, (_, r) in enumerate(s.rej, 1))
        elif k == 'saffron':
            C = lambda r: sum(1 for i in known if i > r and s.p[i] <= s.lam)
            v = s.w0*g(t-C(0))+sum(((a-s.w0) if j == 1 else a)*g(t-r-C(r)) for j, (_, r) in enumerate(s.rej, 1))
            v = min(s.lam, (1-s.lam)*v)
        elif k == 'addis':                          # printed with a sequence indexed from 0: hence + 1. One that runs counts as selected and not as a candidate.
            C = lambda r: sum(1 for i in known if i > r and s.p[i] <= s.lam)
            S = lambda last: sum(1 for i in known if i <= last and s.p[i] <= s.tau)+sum(1 for i in running if i <= last)
            v = s.w0*g(S(t-1)-C(0)+1)+sum(((a-s.w0) if j == 1 else a)*g(S(t-1)-S(r)-C(r)+1) for j, (_, r) in enumerate(s.rej, 1))
            v = min(s.lam, (s.tau-s.lam)*v)
        elif k == 'addis-spending': v = a*(s.tau-s.lam)*g(1+len(running)+sum(1 for i in known if s.lam < s.p[i] <= s.tau))
        s.al.append(v); return t, v
    def finish(s, t, p):
        s.p[t] = p; r = p <= s.al[t-1] and s.al[t-1] > 0
        if r: s.rej.append((t, len(s.al)))
        return r
P20 = [0.21,0.0003,0.74,0.018,0.00009,0.5,0.25,0.0021,0.98,0.36,0.0000007,0.044,0.0011,0.61,0.29,1.0,0.0,0.0049,0.083,0.00052]
A = mpf(1)/20
H = A/2
CONF = [(k, s, h, {}) for k in ('alpha-spending', 'online-fallback', 'lond', 'lond-any') for s in SHAPE for h in (None, 20, 12) if not (s == 'uniform' and h is None)]
CONF += [('lord', s, h, dict(w0=w)) for s in SHAPE for h in (None, 20, 12) if not (s == 'uniform' and h is None) for w in (H, A/10, A)]
CONF += [('saffron', s, h, dict(w0=w, lam=l)) for s in SHAPE for h in (None, 20, 12) if not (s == 'uniform' and h is None) for w, l in ((H, mpf(1)/2), (A/10, mpf(1)/4))]
CONF += [('addis', s, h, dict(w0=w, lam=l, tau=t)) for s in SHAPE for h in (None, 20, 12) if not (s == 'uniform' and h is None) for w, l, t in ((H, mpf(1)/4, mpf(1)/2), (H, mpf(1)/2, mpf(1)), (A/10, mpf(1)/8, mpf(3)/4))]
CONF += [('addis-spending', s, h, dict(lam=l, tau=t)) for s in SHAPE for h in (None, 20, 12) if not (s == 'uniform' and h is None) for l, t in ((mpf(1)/4, mpf(1)/2), (mpf(0), mpf(1)))]
def settings(h, kw): return ['' if h is None else h, *(float(kw[x]) if x in kw else '' for x in ('w0', 'lam', 'tau'))]
HEAD = ['method', 'shape', 'horizon', 'initial_wealth', 'lambda', 'tau']
rows = []
for kind, shape, h, kw in CONF:
    s = Stream(kind, shape, h, **kw)
    for p in P20:
        t, a = s.start(); r = s.finish(t, mpf(p))
        rows.append([kind, shape, *settings(h, kw), t, p, float(a), r])
write('online_traces.csv', 'Made by generate/06_online.py. One stream of 20 p-values, each known before the next experiment starts; level 0.05', HEAD+['t', 'p', 'alpha_t', 'reject'], rows)
# ----- overlapping experiments: up to six run at a time, in an order drawn from a fixed seed -----
rng = random.Random(20261201); rows = []
for kind, shape, h, kw in [('alpha-spending', 'jm', None, {}), ('online-fallback', 'jm', 40, {}), ('lond', 'jm', 40, {}), ('lond-any', 'p1.6', 40, {}), ('lord', 'jm', 40, dict(w0=H)), ('lord', 'log2', None, dict(w0=A/10)),
                           ('saffron', 'p1.6', 40, dict(w0=H, lam=mpf(1)/2)), ('saffron', 'uniform', 40, dict(w0=H, lam=mpf(1)/4)), ('addis', 'p1.6', 40, dict(w0=H, lam=mpf(1)/4, tau=mpf(1)/2)),
                           ('addis', 'p2', None, dict(w0=A/10, lam=mpf(1)/8, tau=mpf(3)/4)), ('addis-spending', 'p1.6', 40, dict(lam=mpf(1)/4, tau=mpf(1)/2))]:
    for schedule in range(4):
        s = Stream(kind, shape, h, **kw); waiting = []
        while len(s.p) < 40:
            if len(s.al) < 40 and (not waiting or (len(waiting) < 6 and rng.random() < .55)):
                t, a = s.start(); waiting.append(t)
                rows.append([kind, shape, *settings(h, kw), schedule, 'start', t, '', float(a), ''])
            else:
                t = waiting.pop(rng.randrange(len(waiting)))
                p = rng.choice([rng.random(), rng.random(), rng.random()**6, 10**-rng.randrange(2, 9), .25, .5, .75])
                rows.append([kind, shape, *settings(h, kw), schedule, 'finish', t, p, '', bool(s.finish(t, mpf(p)))])
write('online_overlap.csv', 'Made by generate/06_online.py. Streams of 40 experiments that overlap: levels at the start from what is known then; level 0.05', HEAD+['schedule', 'event', 't', 'p', 'alpha_t', 'reject'], rows)

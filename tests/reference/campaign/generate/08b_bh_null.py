"""Number of rejections of the Benjamini-Hochberg procedure under the global null, independent uniform p-values:
P(R=k)=C(m,k)(k q/m)^k (1-q)(1-k q/m)^(m-k-1); sums to 1 exactly, and agrees with a seeded simulation."""
import numpy as np
from fractions import Fraction as F
from math import comb
from common import *
rows = []; rng = np.random.Generator(np.random.PCG64(5))
def bhlaw(m, a):
    a = F(a); out = []
    for k in range(m+1):
        x = F(k)*a/m
        out.append(F(1) if (k == m and m == 0) else comb(m, k)*x**k*((1-a)*(1-x)**(m-k-1)))
    return out
for a, m in ((F(1,20), 1), (F(1,20), 2), (F(1,20), 10), (F(1,20), 100), (F(1,10), 20)):
    law = bhlaw(m, a); assert sum(law) == 1
    ev = sum(k*x for k, x in enumerate(law))
    for k in range(min(m, 6)+1): rows.append([float(a), m, k, float(law[k]), float(ev), float(a/(1-a)**2)])
    n = 200000 if m <= 20 else 40000
    p = np.sort(rng.random((n, m)), axis=1); ok = p <= np.arange(1, m+1)*float(a)/m
    R = np.where(ok.any(1), m-np.argmax(ok[:, ::-1], axis=1), 0)
    print('BH null law m=%d a=%s: E[R] exact %.6f, simulated %.6f +- %.6f ; P(R>=1) simulated %.5f ; P(R=2) exact %.6f simulated %.6f' % (m, a, ev, R.mean(), R.std()/n**.5, (R > 0).mean(), law[2] if m > 1 else 0, (R == 2).mean()))
write('bh_null_distribution.csv', 'law of the number of rejections of Benjamini and Hochberg (1995) under the global null, exact rationals; generator: generate/08b_bh_null.py', ['q','m','k','P_R_eq_k','E_R','limit_q_over_(1-q)^2'], rows)

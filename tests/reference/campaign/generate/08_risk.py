"""Cumulative risk of a programme: risk of at least one false positive, and the binomial law of their number."""
import mpmath
from common import *
mp = mpmath.mp; mp.dps = 50
rows = []
for a in (0.01, 0.05, 0.1):
    for m in (0, 1, 2, 5, 10, 14, 20, 50, 100, 500, 1000, 10000):
        A = mpmath.mpf(a)
        unc = 1-(1-A)**m
        bon = 1-(1-A/m)**m if m else mpmath.mpf(0)
        sid = 1-(1-A)**(mpmath.mpf(1)/m) if m else None
        rows.append([a, m, float(unc), float(m*A), float(mpmath.sqrt(m*A*(1-A))), float(bon), float(A/m) if m else '', float(sid) if m else '', float(min(1, m*A))])
write('cumulative_risk.csv', 'risk of at least one false positive among m true nulls, mpmath, 50 digits; generator: generate/08_risk.py',
      ['alpha','m','fwer_independent','pfer_m_alpha','sd_false_positives_independent','fwer_bonferroni_independent','level_bonferroni','level_sidak','fwer_bound_any_dependence'], rows)
rows = []
for a, m in ((0.05, 10), (0.05, 20), (0.05, 100), (0.01, 100), (0.05, 1000)):
    A = mpmath.mpf(a); pm = [mpmath.binomial(m, k)*A**k*(1-A)**(m-k) for k in range(m+1)]
    for k in list(range(0, 13))+[50, 60, 70]:
        if k <= m: rows.append([a, m, k, float(pm[k]), float(mpmath.fsum(pm[k:]))])
write('false_positive_binomial.csv', 'binomial law of the number of false positives, mpmath, 50 digits; generator: generate/08_risk.py',
      ['alpha','m','k','P_V_eq_k','P_V_ge_k'], rows)

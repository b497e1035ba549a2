"""Intervals of selected parameters, after Y. Benjamini and D. Yekutieli 2005, Journal of the American Statistical Association 100:71-81.
Eight estimates with standard errors and degrees of freedom; selection by Benjamini and Hochberg's procedure at q; quantiles of Student's t by mpmath, 40 digits."""
import mpmath
from common import *
mp = mpmath.mp; mp.dps = 40
mpf = mpmath.mpf
def Ibeta(a, b, x): return mpmath.betainc(a, b, 0, x, regularized=True)
def t_two(t, d): t = mpf(t); return Ibeta(mpf(d)/2, mpf(1)/2, mpf(d)/(mpf(d)+t*t))
def t_ppf_two(a, d):                                  # t with P(|T|>t)=a
    return mpmath.findroot(lambda t: mpmath.log(t_two(t, d))-mpmath.log(a), mpmath.mpf(2.5))
q = mpf(5)/100
est = [2.6, 0.3, 5.1, -1.9, 0.8, -3.7, 1.2, 0.1]; se = [0.9, 0.5, 1.1, 0.8, 0.6, 1.0, 0.7, 0.4]; df = [12, 20, 18, 10, 24, 15, 30, 8]
p = [t_two(mpf(a)/mpf(b), d) for a, b, d in zip(est, se, df)]; m = 8; o = sorted(range(m), key=lambda i: p[i])
R = max([k+1 for k in range(m) if p[o[k]] <= q*(k+1)/m], default=0); sel = set(o[:R])
H = mpmath.fsum(mpf(1)/k for k in range(1, m+1))
rows = []
for i in range(m):
    un = t_ppf_two(q, df[i]); r = [i+1, est[i], se[i], df[i], float(p[i]), i in sel, R, m, float(1-R*q/m)]
    r += [float(mpf(est[i])-un*mpf(se[i])), float(mpf(est[i])+un*mpf(se[i]))]
    if i in sel:
        for a in (R*q/m, R*q/(m*H), q/m):
            t = t_ppf_two(a, df[i]); r += [float(t), float(mpf(est[i])-t*mpf(se[i])), float(mpf(est[i])+t*mpf(se[i]))]
    else: r += ['']*9
    rows.append(r)
write('fcr_intervals.csv', 'Intervals of eight estimates of which Benjamini and Hochberg at 0.05 select three: unadjusted, false coverage rate, the same under any dependence, Bonferroni; 40 digits (10b_false_coverage.py)', ['i','estimate','se','df','p','selected','R','m','fcr_level','unadj_lo','unadj_hi','t_fcr','fcr_lo','fcr_hi','t_fcr_any_dep','fcr_any_dep_lo','fcr_any_dep_hi','t_bonf','bonf_lo','bonf_hi'], rows)

#!/usr/bin/env python3
"""Chi-squared law: upper tail, lower tail and their natural logarithms, 80-digit arithmetic -> chi_squared_tail.csv.
Both tails are computed apart: the lower by its power series of positive terms, the upper by mpmath's incomplete gamma function where that is the smaller, else by complement in 80 digits.
x is the double nearest to the text; a probability may lie below the range of doubles, its logarithm is then the value to compare."""
import csv
from mpmath import mp, mpf
mp.dps = 80
def log_prefactor(a, x): return a*mp.log(x)-x-mp.loggamma(a)
def lower(a, x):
    term = 1/a; total = term; n = 0
    while term > total*mpf(10)**-75:
        n += 1; term *= x/(a+n); total += term
    return mp.exp(log_prefactor(a, x))*total
def upper(a, x):
    # Legendre's continued fraction from the far end backwards; the length is doubled until 60 digits stand still.
    n = 64; last = None
    while True:
        f = mpf(0)
        for j in range(n, 0, -1): f = j*(a-j)/(x+2*j+1-a+f)
        v = mp.exp(log_prefactor(a, x))/(x+1-a+f)
        if last is not None and abs(v-last) < v*mpf(10)**-60: return v
        last = v; n *= 2
def tails(df, x):
    a = mpf(df)/2; h = x/2
    if h < a+1:
        lo = lower(a, h); return lo, 1-lo
    up = upper(a, h); return 1-up, up
def text(v): return mp.nstr(v, 25, min_fixed=-5, max_fixed=17)
dfs = [0.5, 1, 2, 3, 4, 5, 6, 7, 9, 10, 11, 15, 17.25, 20, 31, 59, 60, 99, 250, 1000, 10000, 99999]
shares = [1e-6, 0.001, 0.01, 0.1, 0.3, 0.5, 0.7, 0.9, 0.97, 0.999, 1, 1.001, 1.03, 1.1, 1.2, 1.5, 2, 3, 5, 10, 100]
points = [1e-300, 1e-20, 0.001, 0.5, 1.75, 2, 3, 3.84, 7, 15.5, 29.26, 60, 110, 300, 700, 1300, 1440, 1e4, 1e6]
with open('chi_squared_tail.csv', 'w', newline='') as fh:
    w = csv.writer(fh, lineterminator='\n'); w.writerow(['df', 'x', 'log_upper', 'upper', 'log_lower', 'lower'])
    for df in dfs:
        for x in sorted(set(points+[df*s for s in shares])):
            lo, up = tails(df, mpf(x))
            if mpf(x)/2 >= mpf(df)/2+1:    # the lower tail is the complement: its logarithm from the upper one
                l_lo, l_up = mp.log1p(-up), mp.log(up)
            else:
                l_lo, l_up = mp.log(lo), mp.log1p(-lo)
            w.writerow([repr(df), repr(float(x)), text(l_up), text(up), text(l_lo), text(lo)])
# Spot check against mpmath's own function, which uses yet other expansions.
mp.dps = 50
for df, x in [(1, 3.84), (4, 29.26), (7, 300.0), (60, 110.0), (17.25, 15.5), (250, 1300.0)]:
    a = mp.gammainc(mpf(df)/2, mpf(x)/2, mp.inf, regularized=True); b = tails(df, mpf(x))[1]
    assert abs(a-b) < a*mpf(10)**-40, (df, x)

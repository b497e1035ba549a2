#!/usr/bin/env python3
"""Noncentral F where sums are long, tails far out or degrees of freedom fractional -> ncf_far.csv (logarithms of both tails).
Every single term in 50-digit arithmetic: beta tails from one continued fraction (DLMF 8.17.22) and recurrences that only add, Poisson weights by their recurrence, no strides and no scaling.
The first rows were also computed by summing by parts in 1200 digits (sum of T_i times the Poisson distribution function): same 12 digits."""
import csv
from mpf import *
mp.dps = 50
END = mpf(10)**-40


def tails(df1, df2, lam, f):
    df1, df2, lam, f = map(mpf, (df1, df2, lam, f))
    a, b, h, w = df2/2, df1/2, lam/2, df2+df1*f
    x, y = df2/w, df1*f/w
    def log_T(j):
        return (b+j)*mp.log(y)+a*mp.log(x)-mp.loggamma(b+j)-mp.loggamma(a)+mp.loggamma(a+b+j)-mp.log(b+j)
    # lower: downward from a j beyond which the Poisson law holds nothing
    j = int(h+20*mp.sqrt(h)+60)
    I = mp.exp(log_ibeta_pair(b+j, a, y, x)[0]); T = mp.exp(log_T(j)); P = mp.exp(-h+j*mp.log(h)-mp.loggamma(j+1))
    lower = P*I
    while j > 0:
        T = T*(b+j)/(y*(a+b+j-1)); P = P*j/h; j -= 1; I += T; lower += P*I
    # upper: upward from 0
    j = 0; V = mp.exp(log_ibeta_pair(a, b, x, y)[0]); T = mp.exp(log_T(0)); P = mp.exp(-h)
    upper = term = P*V
    while True:
        V += T; T = T*y*(a+b+j)/(b+j+1); j += 1; P = P*h/j
        last = term; term = P*V; upper += term
        if term < last and term < END*upper*(1-term/last):
            # next to 1 the other tail is the accurate one
            return (mp.log1p(-upper) if lower > 0.5 else mp.log(lower)), (mp.log1p(-lower) if upper > 0.5 else mp.log(upper)), j


ROWS = [
    ('3', '20', '100000', '1000'), ('3', '20', '100000', '20000'), ('3', '20', '100000', '35000'), ('3', '20', '100000', '60000'),
    ('3', '20', '100000', '0.5'), ('3', '10000', '100000', '32000'), ('3', '10000', '100000', '33500'), ('3', '10000', '100000', '36000'),
    ('11', '1000000', '100000', '9000'), ('11', '1000000', '100000', '9100'), ('11', '1000000', '100000', '9250'),
    ('59', '2000000', '3000', '40'), ('59', '2000000', '3000', '52'), ('59', '2000000', '3000', '70'),
    ('3', '200000', '50', '0.0078125'), ('3', '200000', '50', '17'), ('3', '200000', '50', '60'), ('3', '200000', '50', '200'),
    ('3', '200000', '5', '300'), ('1', '1000', '300', '0.0009765625'), ('1', '100', '1000', '250'), ('1', '1', '40', '2'), ('1', '1', '40', '5000'),
    ('0.5', '3.75', '12.25', '4.125'), ('4.5', '33.25', '0.0009765625', '2.75'), ('7.3125', '912.6875', '257', '12'), ('2.5', '0.75', '600', '90'),
    ('2', '12', '0.0000152587890625', '30'), ('5', '60', '255', '50'), ('5', '60', '257', '50'), ('5', '60', '255', '0.25'), ('5', '60', '257', '0.25'),
    ('3', '40', '20', '1e-300'), ('3', '40', '20', '1e-20'),
]
if __name__ == '__main__':
    with open('ncf_far.csv', 'w', newline='') as fh:
        w = csv.writer(fh, lineterminator='\n'); w.writerow(['df1', 'df2', 'ncp', 'f', 'log_lower', 'log_upper'])
        for row in ROWS:
            lo, up, n = tails(*row)
            w.writerow(list(row)+[mp.nstr(v, 20) for v in (lo, up)]); print(*row, mp.nstr(lo, 12), mp.nstr(up, 12), n, flush=True)

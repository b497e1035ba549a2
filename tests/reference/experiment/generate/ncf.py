#!/usr/bin/env python3
"""Noncentral F reference (40 digits) -> ncf.csv; power.csv, sample_size.csv, smallest_effect.csv, ncp_ci.csv."""
import csv
from mpf import *
from f_quantile import upper_quantile
mp.dps = 40
def ncf_tails(d1, d2, lam, f):
    """(P(F<=f), P(F>f)) as Poisson mixtures of central beta tails, both summed directly (all terms positive)."""
    d1 = mpf(d1); d2 = mpf(d2); lam = mpf(lam); f = mpf(f)
    if lam == 0:
        lo, up = log_f_tails(d1, d2, f); return mp.exp(lo), mp.exp(up)
    w = d2+d1*f; y = d1*f/w; x = d2/w; b = d2/2; h = lam/2
    j0 = int(h); eps = mpf(10)**(-38)
    # central terms at j0, then recurrences: I_y(a+1,b) = I_y(a,b) - T(a), T(a) = y^a x^b / (a B(a,b)), T(a+1) = T(a) y (a+b)/(a+1)
    a0 = d1/2+j0
    l, u = log_ibeta_pair(a0, b, y, x); L0 = mp.exp(l); U0 = mp.exp(u)
    T0 = mp.exp(a0*mp.log(y)+b*mp.log(x)-mp.loggamma(a0)-mp.loggamma(b)+mp.loggamma(a0+b)-mp.log(a0))
    P0 = mp.exp(-h+j0*mp.log(h)-mp.loggamma(j0+1))
    lo = P0*L0; up = P0*U0
    P, L, U, T, a, j = P0, L0, U0, T0, a0, j0
    while True:                                    # upwards
        L = L-T; U = U+T; T = T*y*(a+b)/(a+1); a += 1; j += 1; P = P*h/j
        lo += P*L; up += P*U
        if P < eps*min(lo, up)*1e-3 and j > h: break
    P, L, U, T, a, j = P0, L0, U0, T0, a0, j0
    while j > 0:                                   # downwards
        P = P*j/h; j -= 1; T = T*a/(y*(a-1+b)); a -= 1; L = L+T; U = U-T
        lo += P*L; up += P*U
        if P < eps*min(lo, up)*1e-3: break
    return lo, up
def power(k, n, f, alpha):
    N = k*n; lam = mpf(N)*mpf(f)**2; fc = upper_quantile(mpf(alpha), k-1, N-k)
    return ncf_tails(k-1, N-k, lam, fc)[1], fc, lam
def solve(fun, lo, hi, dec=True):
    """root of a monotone function by bisection+secant (illinois)"""
    a, b = mpf(lo), mpf(hi); fa, fb = fun(a), fun(b); side = 0
    for _ in range(300):
        c = (fa*b-fb*a)/(fa-fb); fc = fun(c)
        if abs(b-a) < mpf(10)**(-25)*abs(b) or fc == 0: return c
        if fc*fb > 0:
            b, fb = c, fc
            if side == -1: fa /= 2
            side = -1
        else:
            a, fa = c, fc
            if side == 1: fb /= 2
            side = 1
        if abs(fc) < mpf(10)**(-28): return c
    return c
def ncp_for(target_lower, d1, d2, f):
    """lambda with P(F<=f; lambda)=target (0 when even lambda=0 is below target)"""
    g = lambda lam: ncf_tails(d1, d2, lam, f)[0]-target_lower
    if g(mpf(0)) <= 0: return mpf(0)
    hi = mpf(10)
    while g(hi) > 0: hi *= 2
    return solve(g, 0, hi)
if __name__ == '__main__':
    W = lambda fh: csv.writer(fh, lineterminator='\n')
    with open('ncf.csv', 'w', newline='') as fh:
        w = W(fh); w.writerow(['df1', 'df2', 'ncp', 'f', 'lower', 'upper'])
        for d1 in [1, 2, 3, 5, 11]:
            for d2 in [2, 8, 20, 57, 1000]:
                for lam in ['0.1', '1', '7.5', '30', '150', '1000']:
                    for f in ['0.05', '1', '2.5', '8', '40', '400']:
                        lo, up = ncf_tails(d1, d2, mpf(float(lam)), mpf(float(f)))
                        w.writerow([d1, d2, lam, f, s17(lo), s17(up)])
    with open('power.csv', 'w', newline='') as fh:
        w = W(fh); w.writerow(['k', 'n_per_group', 'cohen_f', 'alpha', 'ncp', 'f_crit', 'power'])
        for k in [2, 3, 4, 6, 10]:
            for n in [2, 3, 5, 10, 20, 50]:
                for f in ['0.1', '0.25', '0.4', '0.8']:
                    for al in ['0.05', '0.001', '1e-05']:
                        p, fc, lam = power(k, n, float(f), float(al)); w.writerow([k, n, f, al, s17(lam), s17(fc), s17(p)])
    with open('sample_size.csv', 'w', newline='') as fh, open('smallest_effect.csv', 'w', newline='') as fe:
        w = W(fh); w.writerow(['k', 'cohen_f', 'alpha', 'target_power', 'n_per_group', 'power_at_n', 'power_at_n_minus_1'])
        e = W(fe); e.writerow(['k', 'n_per_group', 'alpha', 'target_power', 'smallest_cohen_f', 'ncp'])
        for k in [2, 3, 4, 6, 10]:
            for f in ['0.1', '0.25', '0.4', '1']:
                for al in ['0.05', '0.005']:
                    for tp in ['0.8', '0.9', '0.95']:
                        lo, hi = 1, 2
                        while power(k, hi, float(f), float(al))[0] < float(tp): lo, hi = hi, hi*2
                        while hi-lo > 1:
                            m = (lo+hi)//2
                            if power(k, m, float(f), float(al))[0] < float(tp): lo = m
                            else: hi = m
                        w.writerow([k, f, al, tp, hi, s17(power(k, hi, float(f), float(al))[0]), '' if hi == 2 else s17(power(k, hi-1, float(f), float(al))[0])])
            for n in [2, 4, 8, 20]:
                for al in ['0.05', '0.001']:
                    for tp in ['0.8', '0.95']:
                        N = k*n; fc = upper_quantile(mpf(float(al)), k-1, N-k)
                        lam = ncp_for(1-mpf(float(tp)), k-1, N-k, fc); e.writerow([k, n, al, tp, s17(mp.sqrt(lam/N)), s17(lam)])
    with open('ncp_ci.csv', 'w', newline='') as fh:
        w = W(fh); w.writerow(['f_obs', 'df1', 'df2', 'n_total', 'confidence', 'ncp_low', 'ncp_high', 'cohen_f_low', 'cohen_f_high', 'eta2pop_low', 'eta2pop_high'])
        for F, d1, d2 in [('4.846', 2, 27), ('1.18046237440255', 4, 20), ('34.702282055513496', 5, 66), ('0.3', 3, 40), ('2.5', 3, 40), ('1000', 8, 100), ('9.59', 2, 12), ('0.01', 3, 40)]:
            for c in ['0.9', '0.95', '0.99']:
                al = 1-mpf(float(c)); N = d1+d2+1; f = mpf(float(F))
                L = ncp_for(1-al/2, d1, d2, f); U = ncp_for(al/2, d1, d2, f)
                w.writerow([F, d1, d2, N, c]+[s17(v) for v in (L, U, mp.sqrt(L/N), mp.sqrt(U/N), L/(L+N), U/(U+N))])

#!/usr/bin/env python3
"""The greatest t with t = q (pi0 t + pi1 G(t)), G the power of the F test at level t: root finding in 40-digit arithmetic (mpmath). Prints the values that stand in the tests."""
import mpmath as mp
mp.mp.dps = 40
def upper(f, d1, d2, lam):
    """upper tail of noncentral F: Poisson mixture of beta tails, all terms positive"""
    a, b, x, h = mp.mpf(d2)/2, mp.mpf(d1)/2, d2/(d2+d1*f), mp.mpf(lam)/2
    s, w, j = mp.mpf(0), mp.e**(-h), 0
    while True:
        t = w*mp.betainc(a, b+j, 0, x, regularized=True); s += t
        if j > h and j > 20 and t < s*mp.mpf(10)**-35: return s
        j += 1; w *= h/j
def isf(p, d1, d2):
    a, b = mp.mpf(d2)/2, mp.mpf(d1)/2
    g = lambda lx: mp.log(mp.betainc(a, b, 0, mp.e**lx, regularized=True))-mp.log(p)
    x = mp.e**mp.findroot(g, (mp.log(p)/a, mp.log(p)/a+mp.mpf('0.5')), solver='secant', tol=mp.mpf(10)**-60, maxsteps=200, verify=False)
    return d2*(1-x)/(d1*x)
for k, n, f, pi1, start in ((4, 10, '0.25', '0.1', '1.2518e-13'), (4, 10, '0.25', '0.3', '1.1672e-7'), (6, 10, '0.25', '0.1', '1.1168e-8')):
    pi1, f, q, d1, d2 = mp.mpf(pi1), mp.mpf(f), mp.mpf('0.05'), k-1, k*n-k
    h = lambda lt: mp.log(q*((1-pi1)*mp.e**lt+pi1*upper(isf(mp.e**lt, d1, d2), d1, d2, k*n*f*f)))-lt
    lt = mp.log(mp.mpf(start))
    print(k, n, f, pi1, mp.nstr(mp.e**mp.findroot(h, (lt, lt*mp.mpf('1.001')), solver='secant', tol=mp.mpf(10)**-50, maxsteps=60, verify=False), 17))

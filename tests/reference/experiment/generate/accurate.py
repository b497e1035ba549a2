#!/usr/bin/env python3
"""ln(1+x), e^x-1, ln(1-e^x), ln(1+x)-x and the error of Stirling's formula in 50-digit arithmetic (mpmath's own functions) -> accurate.csv.
x is the double nearest to the text."""
import csv
from mpmath import mp, mpf
mp.dps = 60
small = ['1e-320', '1e-300', '1e-17', '1.1e-16', '3e-16', '1e-10', '1e-8', '1e-5', '0.001', '0.01', '0.1', '0.2', '0.3', '0.41', '0.49', '0.5', '0.51', '0.6', '0.69', '0.7', '0.9', '0.999']
def out(w, name, f, xs):
    for x in xs:
        v = f(mpf(float(x)))
        w.writerow([name, x, mp.nstr(v, 25, min_fixed=-5, max_fixed=17)])
with open('accurate.csv', 'w', newline='') as fh:
    w = csv.writer(fh, lineterminator='\n'); w.writerow(['function', 'x', 'expected'])
    both = small+['-'+x for x in small]
    out(w, 'log1p', mp.log1p, both+['-0.9999999', '1', '1.5', '3', '10', '1e5', '1e16', '1e300'])
    out(w, 'expm1', mp.expm1, both+['1', '-1', '1.5', '-1.5', '5', '-5', '-40', '100', '700', '-800'])
    mp.dps = 400
    out(w, 'log1mexp', lambda x: mp.log(-mp.expm1(x)), ['-'+x for x in small]+['-1', '-2', '-10', '-37', '-50', '-700'])
    mp.dps = 60
    out(w, 'log1pminus', lambda x: mp.log1p(x)-x, [x for x in both if abs(float(x)) > 1e-100]+['1', '5', '1000'])
    stirling = lambda z: mp.loggamma(z)-((z-0.5)*mp.log(z)-z+mp.log(2*mp.pi)/2)
    mp.dps = 80
    out(w, 'stirling', stirling, ['1e-5', '0.01', '0.25', '0.5', '0.75', '0.9', '1', '1.5', '2', '2.5', '3', '4.3', '5', '7.5', '10', '12.25', '15', '15.9', '16', '17', '20', '50', '123.456', '1000', '1e5', '1e8'])

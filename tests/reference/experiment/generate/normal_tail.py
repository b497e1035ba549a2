#!/usr/bin/env python3
"""Normal upper tails and their logarithms, 60 digits (mpmath erfc) -> normal_tail.csv. Arguments are doubles, written in full."""
import csv
import mpmath as mp
mp.mp.dps = 60
z = [i / 16 for i in range(-160, 321)] + [i / 7 for i in range(-30, 140)] + [1e-300, 1e-17, 1e-8, 11.999999, 12.0, 12.000001, 25.3, 30.1, 37.5, 38.4, 50.7, 123.456, 1e4, 1e8]
with open('normal_tail.csv', 'w', newline='') as f:
    w = csv.writer(f, lineterminator='\n'); w.writerow(['z', 'upper', 'log_upper'])
    for x in z:
        m = mp.mpf(x)
        log = mp.log(mp.erfc(m / mp.sqrt(2)) / 2)
        w.writerow([repr(x), mp.nstr(mp.exp(log), 20), mp.nstr(log, 20)])

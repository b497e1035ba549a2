"""1 - (1 - p)^m for p from 1e-300 to 1e-3 and m up to the largest 32-bit integer, 4000 bits, rounded once."""
import random
import mpmath
from common import write
mpmath.mp.prec = 4000
random.seed(20260407)
rows = []
for m in (2, 3, 5, 100, 1000, 123457, 10**6, 2147483647):
    for e in (-300, -90, -60, -40, -30, -26, -20, -16, -12, -9, -7, -5, -3):
        p = random.random()*10.0**e
        rows.append((m, p, float(1-(1-mpmath.mpf(p))**m)))
write('sidak_wide.csv', 'adjusted p-values of Sidak, 1 - (1 - p)^m, mpmath, 4000 bits, rounded once to a double; generator: generate/02b_sidak_wide.py', ['m', 'p', 'sidak'], rows)

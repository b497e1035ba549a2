"""Shared helpers: 17-digit output, exact rational input, CSV writing."""
import csv, math, os
from fractions import Fraction
HERE = os.path.dirname(os.path.dirname(os.path.abspath(__file__)))     # the tables lie one folder up

def g17(x):
    if x is None: return ''
    if isinstance(x, bool): return '1' if x else '0'
    if isinstance(x, int): return str(x)
    x = float(x)
    if math.isnan(x): return 'NaN'
    if math.isinf(x): return 'Infinity' if x > 0 else '-Infinity'
    return '%.17g' % x

def fr(x):                      # double -> exact rational
    return Fraction(x)

def write(name, note, header, rows):
    with open(os.path.join(HERE, name), 'w', newline='') as f:
        f.write('# '+note+'\n')
        w = csv.writer(f, lineterminator='\n')
        w.writerow(header)
        for r in rows:
            w.writerow([c if isinstance(c, str) else g17(c) for c in r])

def read_pvectors():
    d = {}
    with open(os.path.join(HERE, 'pvectors.csv')) as f:
        for row in csv.DictReader(line for line in f if not line.startswith('#')):
            d.setdefault(row['set'], []).append(float(row['p']))
    return d

#!/usr/bin/env python3
"""Levene's test about medians and about means by SciPy -> levene_scipy.csv. The first value of each experiment is subtracted from all, exactly in most cases, so that SciPy does not lose digits to an offset."""
import csv, sys
import numpy as np, scipy
from scipy.stats import levene, bartlett
from collections import OrderedDict
d = OrderedDict()
for path in ('experiments_data.csv', 'worked_examples_data.csv'):
    for r in csv.DictReader(open(path)): d.setdefault(r['experiment'], []).append((r['group'], float(r['value'])))
with open('levene_scipy.csv', 'w', newline='') as fh:
    w = csv.writer(fh, lineterminator='\n'); w.writerow(['experiment', 'median_f', 'median_p', 'mean_f', 'mean_p', 'bartlett_k2', 'bartlett_p'])
    for nm, rows in d.items():
        g = OrderedDict()
        for a, v in rows: g.setdefault(a, []).append(v-rows[0][1])
        G = [np.array(x) for x in g.values()]; r = []
        for f in (lambda: levene(*G, center='median'), lambda: levene(*G, center='mean'), lambda: bartlett(*G)):
            s, p = f(); r += [repr(float(s)), repr(float(p))]
        w.writerow([nm]+r)
print('SciPy', scipy.__version__, file=sys.stderr)

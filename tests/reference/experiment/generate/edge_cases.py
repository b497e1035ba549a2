#!/usr/bin/env python3
"""Edge-case experiments -> edge_cases_data.csv and edge_cases_expected.csv (status decided from the typed values: fewer than two non-empty groups, no replication, all values equal, all groups constant; F and p from exact rational arithmetic)."""
import csv
from fractions import Fraction as Fr
from mpf import *
from experiments_exact import one_way, fup, m
C = {
 'one_group': {'a': '1 2 3'}, 'no_data': {}, 'empty_third_group': {'a': '1 2 3', 'b': '2 4 6', 'c': ''},
 'single_value_group': {'a': '1 2 3', 'b': '2 4 6', 'c': '9'}, 'no_replication': {'a': '1', 'b': '2', 'c': '5'}, 'two_values': {'a': '1', 'b': '1'},
 'zero_within_means_differ': {'a': '0.1 0.1 0.1', 'b': '0.3 0.3 0.3'}, 'zero_within_representable': {'a': '1 1', 'b': '2 2'},
 'all_equal': {'a': '0.1 0.1 0.1', 'b': '0.1 0.1 0.1'}, 'equal_means': {'a': '1 3', 'b': '2 2', 'c': '0 4'}, 'one_group_constant': {'a': '5 5 5', 'b': '4 6 8', 'c': '1 2 3'},
 'offset_1e8': {'a': '100000000.1 100000000.2 100000000.3', 'b': '100000000.4 100000000.5 100000000.6'}, 'offset_1e15': {'a': '1000000000000001 1000000000000002 1000000000000003', 'b': '1000000000000004 1000000000000006 1000000000000005'},
 'huge': {'a': '1e300 2e300 3e300', 'b': '4e300 5e300 6e300'}, 'tiny': {'a': '1e-300 2e-300 3e-300', 'b': '4e-300 5e-300 6e-300'}, 'mixed_magnitude': {'a': '1e-8 2e-8', 'b': '1e8 2e8'},
 'negative': {'a': '-1 -2 -3', 'b': '-2 -4 -6'}, 'perfect_split': {'a': '1 1.0000000001', 'b': '2 2.0000000001'}, 'nan_value': {'a': '1 NaN 3', 'b': '2 4 6'}, 'infinite_value': {'a': '1 2 Infinity', 'b': '2 4 6'},
}
with open('edge_cases_data.csv', 'w', newline='') as f, open('edge_cases_expected.csv', 'w', newline='') as g:
    w = csv.writer(f, lineterminator='\n'); w.writerow(['experiment', 'group', 'value']); x = csv.writer(g, lineterminator='\n')
    x.writerow(['experiment', 'status', 'k_used', 'n_total', 'df_between', 'df_within', 'ss_between', 'ss_within', 'f', 'p', 'log_p', 'f_from_decimal_text'])
    for nm, gs in C.items():
        for a, t in gs.items():
            for v in t.split(): w.writerow([nm, a, v])
            if not t: pass
        vals = [t.split() for t in gs.values() if t.split()]
        if any(v in ('NaN', 'Infinity') for t in vals for v in t): x.writerow([nm, 'rejected-non-finite']+['']*10); continue
        k = len(vals); N = sum(map(len, vals))
        if k < 2: x.writerow([nm, 'too-few-groups', k, N]+['']*8); continue
        if N == k: x.writerow([nm, 'no-replication', k, N, k-1, 0]+['']*6); continue
        A = one_way([[Fr(float(v)) for v in t] for t in vals]); B = one_way([[Fr(v) for v in t] for t in vals])
        base = [k, N, k-1, N-k, s17(m(A['ssb'])), s17(m(A['ssw']))]
        if B['ssw'] == 0: x.writerow([nm, 'constant-response' if B['ssb'] == 0 else 'zero-within-variance']+base[:4]+[s17(m(A['ssb'])), '0', 'NaN' if B['ssb'] == 0 else 'Infinity', '1' if B['ssb'] == 0 else '0', '0' if B['ssb'] == 0 else '-Infinity', '']); continue
        F = m(A['ssb']/(k-1)/(A['ssw']/(N-k))); p, lp = fup(F, k-1, N-k); x.writerow([nm, 'ok']+base+[s17(F), s17(p), s17(lp), s17(m(B['ssb']/(k-1)/(B['ssw']/(N-k))))])

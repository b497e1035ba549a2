#!/usr/bin/env python3
"""Far tails of the studentized range in quadruple precision (quadref.cpp) beside what R's ptukey and SciPy's studentized_range.sf give -> srange_others.csv.
Build the helper first: g++ -O2 -o quadref quadref.cpp -lquadmath -fext-numeric-literals"""
import csv, subprocess, sys
import scipy
from scipy.stats import studentized_range
points = [(3, 20, q) for q in (5, 8, 12, 14, 18, 24, 30, 45, 60, 110, 150)] + [(5, 45, q) for q in (4, 8, 10, 12, 14, 18, 22, 26, 35)] + [(4, 5, q) for q in (4, 10, 60, 500, 10000, 1000000)] + [(3, 2, 10), (3, 2, 10000)]
quad = subprocess.run([sys.argv[1] if len(sys.argv) > 1 else './quadref', 'tukey', '0.1', '0.06'], input='\n'.join('%s %d %s' % (q, k, df) for k, df, q in points), capture_output=True, text=True, check=True).stdout.split()
r = subprocess.run(['Rscript', '--vanilla', '-e', 'd <- read.table(file("stdin")); cat(sprintf("%.17g\\n", ptukey(d[,3], d[,1], d[,2], lower.tail = FALSE)), sep = ""); cat(as.character(getRversion()))'], input='\n'.join('%d %d %s' % p for p in points), capture_output=True, text=True, check=True).stdout.split()
with open('srange_others.csv', 'w', newline='') as f:
    f.write('# R %s, SciPy %s\n' % (r[-1], scipy.__version__))
    w = csv.writer(f, lineterminator='\n'); w.writerow(['k', 'df', 'q', 'upper', 'r', 'scipy'])
    for (k, df, q), t, a in zip(points, quad, r): w.writerow([k, df, q, '%.17g' % float(t), a, repr(float(studentized_range.sf(q, k, df)))])

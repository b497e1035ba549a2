"""Corrected p-values of statsmodels' two-stage procedure (multipletests, method fdr_tsbky): right only as decisions at the alpha that was passed in."""
import warnings
import numpy as np, statsmodels
from statsmodels.stats.multitest import multipletests
from common import *
warnings.simplefilter('ignore')
rows = []
for name, p in read_pvectors().items():
    r = multipletests(np.array(p), alpha=0.05, method='fdr_tsbky')[1]
    rows += [[name, i+1, x, r[i]] for i, x in enumerate(p)]
write('bky_statsmodels.csv', 'two-stage procedure of statsmodels %s at alpha 0.05, to be compared as decisions at 0.05 only; generator: generate/04_bky_statsmodels.py' % statsmodels.__version__,
      ['set','index','p','fdr_tsbky'], rows)

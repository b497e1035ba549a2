"""Input p-vectors (fixed seeds; order is deliberately NOT sorted for m100, m1000, m15s)."""
import numpy as np
from common import write
BH95 = [0.0001,0.0004,0.0019,0.0095,0.0201,0.0278,0.0298,0.0344,0.0459,0.3240,0.4262,0.5719,0.6528,0.7590,1.0000]
S = {}
S['m1'] = [0.03]; S['m1_zero'] = [0.0]; S['m1_one'] = [1.0]
S['m2'] = [0.04, 0.01]; S['m2_tie'] = [0.03, 0.03]; S['m2_tiny'] = [1e-300, 1.0]
S['m3_halfrank'] = [0.02, 0.02, 0.05]
S['m5'] = [0.01, 0.02, 0.03, 0.04, 0.05]
S['m5_tie'] = [0.04]*5
S['m5_edge'] = [1.0, 0.0, 1e-300, 0.5, 1.0]
S['m5_denorm'] = [5e-324, 2.2250738585072014e-308, 1e-16, 1e-17, 0.9999999999999999]
S['m5_ones'] = [1.0]*5
S['m5_zeros'] = [0.0]*5
S['m5_hommel'] = [0.011, 0.021, 0.024, 0.030, 0.2]
S['m15_bh1995'] = BH95
S['m15s_bh1995_shuffled'] = [BH95[i] for i in [9,0,14,3,7,1,12,5,10,2,13,8,4,11,6]]
rng = np.random.Generator(np.random.PCG64(20240501))
a = rng.random(70)
b = rng.beta(0.15, 8.0, 30)
v = np.concatenate([np.round(a, 2), b]); rng.shuffle(v)
v[3] = 0.0; v[17] = 1.0; v[41] = 1e-300; v[42] = 1e-12; v[77] = v[78] = 0.001
S['m100'] = [float(x) for x in v]
a = rng.random(800); b = rng.beta(0.08, 12.0, 200)
v = np.concatenate([a, b]); rng.shuffle(v)
v[100:140] = np.round(v[100:140], 1)            # heavy ties incl. exact 0 and 1 possible
v[0] = 0.0; v[1] = 1.0; v[2] = 1e-300; v[3] = 5e-324; v[4] = 1e-17; v[5] = 0.9999999999999999
v[6] = v[7] = v[8] = 0.0125
S['m1000'] = [float(x) for x in v]
write('pvectors.csv', 'p-vectors of the correction tables: fixed by hand or from numpy PCG64 with fixed seeds; generator: generate/01_pvectors.py',
      ['set','index','p'], [(k, i+1, p) for k, ps in S.items() for i, p in enumerate(ps)])
print({k: len(v) for k, v in S.items()})

#!/usr/bin/env python3
"""The generator SFC64 as NumPy implements it -> random_sfc64.csv. Seeded as PractRand seeds it with three words: the words, counter 1, 18 outputs thrown away; the third word is 0 here."""
import csv
import numpy as np

with open("random_sfc64.csv", "w", newline="") as f:
    w = csv.writer(f, lineterminator="\n")
    w.writerow(["seed", "stream", "skipped", "output"])
    for seed, stream in [(0, 0), (1, 0), (1, 1), (2, 0), (20261201, 97), (2**64 - 1, 2**64 - 1), (0x9E3779B97F4A7C15, 123456789)]:
        generator = np.random.SFC64()
        state = generator.state
        state["state"]["state"] = np.array([seed, stream, 0, 1], dtype=np.uint64)
        state["has_uint32"] = 0
        generator.state = state
        outputs = generator.random_raw(18 + 1001)[18:]
        for skipped in [0, 1, 2, 3, 10, 1000]:
            w.writerow([seed, stream, skipped, outputs[skipped]])

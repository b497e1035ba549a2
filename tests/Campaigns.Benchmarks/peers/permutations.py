#!/usr/bin/env python3
"""Milliseconds, median of three, of permutation F tests of experiments with 4 groups of 6 values in NumPy, scaled to the work that the program times.

permute-one      10,000,000 arrangements for one experiment: rows permuted all at once, group sums
permute-shared   200,000 arrangements shared by 200 experiments: one-hot matrix products
permute-max-t    10,000 arrangements of 200 responses, step-down by the largest share of variation: one-hot matrix products
permute-min-p    the same by the smallest p: sorted columns
"""
import statistics
import time
import numpy as np

GROUPS, SIZE, EXPERIMENTS = 4, 6, 200
rng = np.random.default_rng(1)
values = np.round(rng.normal(50, 2, (GROUPS * SIZE, EXPERIMENTS)), 4)
values -= values.mean(0)
observed = (values.reshape(GROUPS, SIZE, -1).sum(1) ** 2).sum(0) * (1 - 1e-9)
labels = np.repeat(np.arange(GROUPS), SIZE)


def one(draws):
    x = values[:, 0]
    count = 0
    for _ in range(0, draws, 50_000):
        rows = rng.permuted(np.tile(x, (50_000, 1)), axis=1)
        count += ((rows.reshape(-1, GROUPS, SIZE).sum(2) ** 2).sum(1) >= observed[0]).sum()
    return (count + 1) / (draws + 1)


def shared(draws):
    count = np.zeros(EXPERIMENTS)
    for _ in range(0, draws, 2_000):
        arrangements = rng.permuted(np.tile(labels, (2_000, 1)), axis=1)
        spread = 0
        for group in range(GROUPS):
            spread = spread + ((arrangements == group).astype(float) @ values) ** 2
        count += (spread >= observed).sum(0)
    return (count + 1) / (draws + 1)


def shares(draws):
    total = (values ** 2).sum(0) * SIZE
    arrangements = np.vstack([labels, rng.permuted(np.tile(labels, (draws, 1)), axis=1)])
    spread = 0
    for group in range(GROUPS):
        spread = spread + ((arrangements == group).astype(float) @ values) ** 2
    return spread / total


def step_down(evidence):
    order = np.argsort(-evidence[0], kind="stable")
    ordered = evidence[:, order]
    reached = np.maximum.accumulate(ordered[:, ::-1], axis=1)[:, ::-1] >= ordered[0] - 1e-12
    return np.maximum.accumulate(reached.mean(0))


def max_t(draws):
    return step_down(shares(draws))


def min_p(draws):
    evidence = np.round(shares(draws), 12)
    for j in range(EXPERIMENTS):
        column = np.sort(evidence[:, j])
        evidence[:, j] = np.searchsorted(column, evidence[:, j]) / len(column) - 1
    return step_down(evidence)


def milliseconds(work, draws):
    times = []
    for _ in range(3):
        start = time.perf_counter()
        work(draws)
        times.append(time.perf_counter() - start)
    return statistics.median(times) * 1000


print(f"permute-one {milliseconds(one, 500_000) * 20:.1f}")
print(f"permute-shared {milliseconds(shared, 20_000) * 10:.1f}")
print(f"permute-max-t {milliseconds(max_t, 10_000):.1f}")
print(f"permute-min-p {milliseconds(min_p, 10_000):.1f}")

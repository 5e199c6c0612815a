"""Seconds that scipy needs for two parts of a comparison: python3 compare_scipy.py TASKS METHODS SEEDS.

For each method on each task a BCa bootstrap of the mean score (10,000 resamples), and for all but one a paired
permutation test against the first (20,000 resamples), both vectorized over the methods of a task.
"""

import sys
import time

import numpy
from scipy import stats

tasks, methods, seeds = map(int, sys.argv[1:])
scores = numpy.random.default_rng(1).gamma(2.0, 0.1, (tasks, methods, seeds))


def mean(values, axis):
    return numpy.mean(values, axis=axis)


start = time.perf_counter()
for task in scores:
    stats.bootstrap((task,), mean, axis=1, n_resamples=10_000, batch=1_000, method="BCa", vectorized=True)
    differences = task[1:] - task[0]
    stats.permutation_test(
        (differences,),
        mean,
        axis=1,
        permutation_type="samples",
        n_resamples=20_000,
        batch=1_000,
        vectorized=True,
    )
print(time.perf_counter() - start)

#!/usr/bin/python3
"""The BCa interval of the gap at one cutoff, 9,999 bootstrap samples, by
scipy.stats.bootstrap with a vectorised statistic: seconds of the fastest batch
size. Run from testdata/bench:  python3 cutoff.py"""
import time

import numpy as np
from scipy.special import ndtr
from scipy.stats import bootstrap

x = np.loadtxt("scores.csv", skiprows=1)


def gap(y, axis=-1):
    mean = y.mean(axis=axis)
    sd = y.std(axis=axis, ddof=1)
    return ndtr((mean - 60) / sd) - (y >= 60).mean(axis=axis)


best = None
for batch in (100, 1000, None):
    start = time.perf_counter()
    bootstrap((x,), gap, vectorized=True, n_resamples=9999, batch=batch, method="BCa", random_state=1)
    seconds = time.perf_counter() - start
    best = min(best or (seconds, batch), (seconds, batch), key=lambda b: b[0])
print(f"batch-{best[1]} {best[0]}")

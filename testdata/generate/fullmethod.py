#!/usr/bin/python3
"""The whole ghost-studentised interval and the simultaneous band, resampling
included, for a few cutoffs: writes interval/full.json.

Rows are drawn by index, 20,000 times, under five seeds; the mean and SD of the
five quantiles say how far another engine may be from them by chance alone.
Every cell is an upper tail, P(X >= c) or P(X > c): a lower side has the same
T*, and its interval by complement and sign. Under a given curve T* is scaled by
the sample's own standard error, norms from norm_n people are drawn again with
every resample, and the interval and the band are the limits of interval.py.

Run from testdata:  python3 generate/fullmethod.py
"""
import json
import math
import sys

import numpy as np
from scipy.special import ndtr

sys.dont_write_bytecode = True
from interval import given_curve, read_column, second_interval, t_quantile

REPLICATES, SEEDS = 20000, (1, 2, 3, 4, 5)


class Fit:
    """What every threshold needs, for a whole matrix of counts at once: one row
    a sample, one column a distinct score."""

    def __init__(self, values, counts, given=None):
        self.n = counts.sum(axis=1, keepdims=True)
        self.m = counts @ values[:, None] / self.n
        moment = lambda r: np.einsum("ij,ij->i", counts, (values - self.m) ** r)[:, None] / self.n
        self.m2, self.m3, self.m4 = moment(2), moment(3), moment(4)
        self.s = np.sqrt(self.m2 * self.n / (self.n - 1))
        assert self.s.min() > 0
        self.given = given
        above = lambda w: np.concatenate([np.cumsum(w[:, ::-1], axis=1)[:, ::-1], np.zeros((len(w), 1))], axis=1)
        u = values - self.m
        self.K, self.U, self.UU = above(counts), above(counts * u), above(counts * u * u)

    def tail(self, i, d):
        """P(X >= d) by the curve, its two derivatives, and the count, sum and
        sum of squares (about the mean) of the scores from the i-th up."""
        mean, sd = self.given or (self.m, self.s)
        z = (d - mean) / sd
        f = 0 * z if self.given else np.exp(-z * z / 2) / math.sqrt(2 * math.pi)
        share = ndtr(-z) + 0 * self.m
        return share, f / sd + 0 * self.m, f * z / (2 * sd**2) + 0 * self.m, self.K[:, i], self.U[:, i], self.UU[:, i]

    def judge(self, cells, w):
        """E, v, D, k for cells; a cell is (i, d, c) or, a stretch, a pair of them."""
        share, a, b, k, U, UU = self.tail(cells["i"], cells["d"])
        ghosts = [cells["c"]]
        if "j" in cells:
            over = self.tail(cells["j"], cells["d2"])
            share, a, b, k, U, UU = (p - q for p, q in zip((share, a, b, k, U, UU), over))
            ghosts.append(cells["c2"])
        A = a * U + b * (UU - k * self.m2)
        g = sum(a * (c - self.m) + b * ((c - self.m) ** 2 - self.m2) for c in ghosts) / len(ghosts)
        v = self.n / (self.n - 1) * (a * a * self.m2 + 2 * a * b * self.m3 + b * b * (self.m4 - self.m2**2))
        D = (A + g) / (k + 1) - (g - A) / (self.n - k + 1)
        return share - w * k / self.n, share, v, w * w - 2 * w * D, k

    def unseen(self, x, cells, w):
        """What a person beyond either end of x adds to n times the variance,
        for the lower and for the upper limit: below, above."""
        below, above = 0.0, 0.0
        if self.given:
            return below, above
        _, a, b, k, _, _ = self.tail(cells["i"], cells["d"])
        if "j" in cells:
            _, a2, b2, k2, _, _ = self.tail(cells["j"], cells["d2"])
            a, b, k = a - a2, b - b2, k - k2
        for at in places(x):
            beyond = lambda c, strict: np.where(strict, at > c, at >= c)
            inside = beyond(cells["c"], cells["strict"])
            if "j" in cells:
                inside = inside & ~beyond(cells["c2"], cells["strict2"])
            psi = (a * (at - self.m) + b * ((at - self.m) ** 2 - self.m2) - w * (inside - k / self.n))[0]
            below = below + np.where(psi < 0, psi**2, 0) / len(x)
            above = above + np.where(psi > 0, psi**2, 0) / len(x)
        return below, above


def places(x):
    """Where an unseen person stands below and above the scores x."""
    x, n = np.sort(x), len(x)
    outermost = min(max(5, -(-n // 10)), n - 1)
    excess = lambda y: y[:outermost].mean() - y[outermost]
    return x[0] + 24**0.25 * excess(x), x[-1] + 24**0.25 * excess(x[::-1])


def draws(values, x, seed, rows=500):
    """Count matrices of resamples, drawn by row index."""
    rng = np.random.default_rng(seed)
    place = np.searchsorted(values, x)
    n, size = len(x), len(values)
    for _ in range(REPLICATES // rows):
        drawn = place[rng.integers(0, n, (rows, n))] + size * np.arange(rows)[:, None]
        yield np.bincount(drawn.ravel(), minlength=rows * size).reshape(rows, size).astype(float)


def norms_again(given, norm_n, seed, rows=500):
    """The mean and SD that as many other norm people would have."""
    rng = np.random.default_rng((seed, 1))
    while True:
        if norm_n is None:
            yield given
            continue
        mean = given[0] + given[1] / math.sqrt(norm_n) * rng.standard_normal((rows, 1))
        yield mean, given[1] * np.sqrt(rng.chisquare(norm_n - 1, (rows, 1)) / (norm_n - 1))


def variance_of_norms(cells, given, norm_n):
    if norm_n is None:
        return 0.0
    z = (cells["d"] - given[0]) / given[1]
    slope = np.exp(-z * z / 2) / math.sqrt(2 * math.pi)
    return slope**2 / norm_n + (z * slope) ** 2 / (2 * (norm_n - 1))


def run(x, cells, w, given, level, norm_n=None):
    """The sample's own terms and, for each seed, T* of each cell and its sup."""
    values = np.unique(x)
    counts = np.array([[(x == v).sum() for v in values]], dtype=float)
    fit = Fit(values, counts, given)
    E, share, v, raw, k = (q[0] for q in fit.judge(cells, w))
    below, above = fit.unseen(x, cells, w)
    n = len(x)
    p = (k + 2) / (n + 4)
    spread = p * (1 - p)
    kappa = np.maximum(raw, -0.95 * v / spread)
    se2 = (v + kappa * spread) / n
    if given:
        se2 = se2 + variance_of_norms(cells, given, norm_n)
    quantiles, sup = [], []
    for seed in SEEDS:
        T = []
        for c, norms in zip(draws(values, x, seed), norms_again(given, norm_n, seed)):
            e, _, vs, ks, _ = Fit(values, c, norms).judge(cells, w)
            V = n * se2 if given else np.maximum(vs + ks * spread, 0.05 * n * se2)
            T.append(np.abs(e - E) / np.sqrt((V + np.where(e > E, below, above)) / n))
        T = np.concatenate(T)
        quantiles.append(np.quantile(T, level, axis=0))
        sup.append(np.quantile(T.max(axis=1), level))
    return dict(E=E, share=share, v=v, kappa=kappa, k=k, se=np.sqrt(se2), se_below=np.sqrt(se2 + below / n), se_above=np.sqrt(se2 + above / n), q=np.array(quantiles), sup=np.array(sup))


def tail_cells(values, thresholds, strict, shift):
    """Cells for >= c (or > c) at each threshold, the curve read shift away."""
    side = "right" if strict else "left"
    slack = 1e-9 * max(1.0, np.abs(values).max())  # thresholds made by adding steps
    i = np.searchsorted(values, thresholds + (slack if strict else -slack), side=side)
    return dict(i=i, d=thresholds + shift, c=thresholds, strict=np.full(len(thresholds), strict))


def case(dataset, column, step, cutoff, side, half, w=1.0, given=None, level=0.95, norm_n=None):
    x = read_column(dataset, column)
    values = np.unique(x)
    n, t = len(x), t_quantile(level, len(x) - 1)
    strict, lower = side in (">", "<="), side in ("<=", "<")
    shift = 0.0 if not half else step / 2 if strict else -step / 2
    r = run(x, tail_cells(values, np.array([cutoff]), strict, shift), w, given, level, norm_n)
    q = max(t, r["q"].mean())
    E, se, k = r["E"][0], r["se"][0], r["k"][0]
    low, high = E - q * r["se_below"][0], E + q * r["se_above"][0]
    hull = not given and min(k, n - k) < 10
    if hull:
        z = (cutoff + shift - x.mean()) / x.std(ddof=1)
        terms = dict(n=n, k=k, v=r["v"][0], kappa=r["kappa"][0])
        low2, high2, _ = second_interval(terms, t, r["share"][0], z, None, w)
        low, high = min(low, low2), max(high, high2)
    if lower:
        E, low, high = 1 - w - E, 1 - w - high, 1 - w - low
    # the band's grid: all attainable scores and one step more at both ends,
    # or, without a step, both sides of every jump
    if step:
        grid = values[0] + step * np.arange(-1, round((values[-1] - values[0]) / step) + 2)
        cells = tail_cells(values, grid, strict, shift)
    else:
        a, b = tail_cells(values, values, False, 0.0), tail_cells(values, values, True, 0.0)
        cells = {key: np.concatenate([a[key], b[key]]) for key in a}
    band = run(x, cells, w, given, level, norm_n)
    if given:
        asked = dict(cutoff=cutoff, side=side, half_step=half, norm_n=norm_n, weight=w)
        limits = given_curve(x, step or 0, asked, *given, level)
        E, low, high = (limits[name] / 100 for name in ("difference_points", "low_points", "high_points"))
        one = given_curve(x, step or 0, asked, *given, 1 - 2 * float(ndtr(-band["sup"].mean())))
        more = dict(band_low_points=one["low_points"], band_high_points=one["high_points"])
    else:
        below, above = (band["sup"].mean() * r[name][0] for name in (("se_above", "se_below") if lower else ("se_below", "se_above")))
        more = dict(band_low_points=100 * min(low, E - below), band_high_points=100 * max(high, E + above))
    return dict(dataset=dataset, column=column, step=step, cutoff=cutoff, side=side, half_step=half, weight=w,
                given_mean=given and given[0], given_sd=given and given[1], norm_n=norm_n, level=level, replicates=REPLICATES, seeds=len(SEEDS),
                n=n, counted=int(n - k if lower else k), difference_points=100 * E, se_points=100 * se, se_below_points=100 * r["se_below"][0], se_above_points=100 * r["se_above"][0], t=t,
                quantile_mean=r["q"].mean(), quantile_sd=r["q"].std(ddof=1), q=q, takes_hull=bool(hull), low_points=100 * low, high_points=100 * high,
                band_thresholds=len(cells["i"]), band_q_mean=band["sup"].mean(), band_q_sd=band["sup"].std(ddof=1), **more)


def stretch(dataset, column, step, start, stop, half):
    x = read_column(dataset, column)
    values = np.unique(x)
    shift = step / 2 if half else 0.0
    lo = tail_cells(values, np.array([start]), False, -shift)
    hi = tail_cells(values, np.array([stop]), True, shift)
    r = run(x, dict(lo, j=hi["i"], d2=hi["d"], c2=hi["c"], strict2=hi["strict"]), 1.0, None, 0.95)
    t = t_quantile(0.95, len(x) - 1)
    q, E, se = max(t, r["q"].mean()), r["E"][0], r["se"][0]
    low, high = E - q * r["se_below"][0], E + q * r["se_above"][0]
    return {"dataset": dataset, "column": column, "step": step, "from": start, "to": stop, "half_step": half, "level": 0.95, "replicates": REPLICATES,
            "seeds": len(SEEDS), "n": len(x), "counted": int(r["k"][0]), "gap_points": 100 * E, "se_points": 100 * se, "t": t,
            "quantile_mean": r["q"].mean(), "quantile_sd": r["q"].std(ddof=1), "q": q, "low_points": 100 * low, "high_points": 100 * high}


CASES = [
    ("pima", "glu", 1, 200, ">=", False),  # nobody there
    ("pima", "glu", 1, 200, ">=", True),
    ("pima", "age", 1, 21, "<=", True),  # the floor of the scale
    ("pima", "bmi", 0.1, 40, ">", True),
    ("cd4", "oneyear", 0.01, 6.5, ">=", False),  # n = 20, nobody there
    ("cd4", "baseline", 0.01, 5, ">=", True),  # n = 20, one there
    ("newcomb", "time", 1, 0, "<=", False),  # two gross outliers
    ("newcomb", "time", 1, 24, "<", True),
    ("mathexam", "tests", 1, 20, ">=", True),  # many on both sides
    ("mathexam", "nsolved", 1, 1, "<=", True),
    ("faithful", "eruptions", None, 4.5, ">=", False),  # no step, two humps
    ("mathexam", "tests", 1, 24, ">=", False, 1.2),  # N - 1.2 S
    ("pima", "age", 1, 60, ">=", True, 0.8),
    ("pima", "bp", 1, 90, ">=", True, 1.0, (72, 12)),  # a given curve
    ("cd4", "oneyear", 0.01, 5.5, ">=", True, 1.0, (4.1, 1.2)),
    ("mathexam", "tests", 1, 20, ">=", True, 1.0, None, 0.8),  # other levels
    ("mathexam", "tests", 1, 20, ">=", True, 1.0, None, 0.9),
    ("mathexam", "tests", 1, 20, ">=", True, 1.0, None, 0.99),
    ("newcomb", "time", 1, 0, "<=", False, 1.0, None, 0.8),
    ("newcomb", "time", 1, 0, "<=", False, 1.0, None, 0.99),
    ("pima", "bp", 1, 90, ">=", True, 1.0, (72, 12), 0.8),
    ("pima", "bp", 1, 90, "<", True, 1.0, (72, 12), 0.99),
    ("pima", "bp", 1, 90, ">=", True, 1.0, (72, 12), 0.95, 20),  # norms from 20 people
    ("pima", "bp", 1, 90, ">=", True, 1.2, (72, 12), 0.95, 870),
    ("mathexam", "nsolved", 1, 1, "<=", True, 1.0, (7.3, 3), 0.8, 200),
    ("mathexam", "nsolved", 1, 1, "<=", True, 1.0, (7.3, 3), 0.99, 200),
    ("faithful", "eruptions", None, 4.5, ">=", False, 1.0, (3.5, 1.1), 0.9, 870),
]
STRETCHES = [("pima", "glu", 1, 126, 139, True), ("newcomb", "time", 1, -44, 0, False), ("cd4", "baseline", 0.01, 3, 4, True)]


def plain(o):
    return o.item() if isinstance(o, np.generic) else o


def write(path, **lists):
    body = ",\n".join(f'"{name}": [\n' + ",\n".join(json.dumps({k: plain(v) for k, v in r.items()}) for r in records) + "]" for name, records in lists.items())
    with open(path, "w") as f:
        f.write('{"made_by": "generate/fullmethod.py",\n' + body + "}\n")


if __name__ == "__main__":
    write("interval/full.json", cutoffs=[case(*c) for c in CASES], stretches=[stretch(*s) for s in STRETCHES])

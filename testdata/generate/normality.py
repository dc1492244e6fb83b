#!/usr/bin/python3
"""Writes worked/normality.json: published critical values of the Anderson-
Darling and Lilliefors tests with mean and SD estimated, each beside the same
quantile of 100,000 simulated samples, which must agree within the tolerance.

"seen" says how the published number was come by: "source" (read in the source
named) or "quoted" (read where another work quotes it).

Run from testdata:  python3 generate/normality.py   (about a minute)
"""
import json

import numpy as np
from scipy.special import log_ndtr, ndtr

random = np.random.default_rng(1986)


def statistics(n, samples=100_000):
    """A* and D of each of so many normal samples."""
    a, d = [], []
    ranks = np.arange(1, n + 1)
    for _ in range(10):
        x = np.sort(random.standard_normal((samples // 10, n)), axis=1)
        z = (x - x.mean(1, keepdims=True)) / x.std(1, ddof=1, keepdims=True)
        a2 = -n - ((2 * ranks - 1) * (log_ndtr(z) + log_ndtr(-z[:, ::-1]))).mean(1)
        a.append(a2 * (1 + 0.75 / n + 2.25 / n**2))
        p = ndtr(z)
        d.append(np.maximum(ranks / n - p, p - (ranks - 1) / n).max(1))
    return np.concatenate(a), np.concatenate(d)


simulated = {n: statistics(n) for n in (5, 10, 20, 30, 100)}
sections = dict(anderson_darling=[], lilliefors=[])


def add(section, n, levels, published, tolerance, source, seen):
    values = simulated[n][section == "lilliefors"]
    computed = [float(np.quantile(values, 1 - level)) for level in levels]
    assert np.abs(np.array(published) - computed).max() <= tolerance, (section, n, published, computed)
    sections[section].append(dict(n=n, levels=levels, published=published, computed=[round(c, 4) for c in computed], tolerance=tolerance, source=source, seen=seen))


STEPHENS = "Stephens (1986) in D'Agostino & Stephens (eds), Goodness-of-Fit Techniques, Table 4.7, mean and SD unknown"
add("anderson_darling", 100, [0.5, 0.25, 0.15, 0.1, 0.05, 0.025, 0.01, 0.005], [0.341, 0.47, 0.561, 0.631, 0.752, 0.873, 1.035, 1.159], 0.02, STEPHENS, "quoted")
LEVELS = [0.2, 0.15, 0.1, 0.05, 0.01]
MOLIN = "Molin & Abdi (1998) New tables and numerical approximation for the Kolmogorov-Smirnov/Lilliefors/Van Soest test of normality"
for n, values in ((5, [0.2893, 0.3027, 0.3188, 0.3427, 0.3959]), (10, [0.2171, 0.2273, 0.241, 0.2616, 0.3037]),
                  (20, [0.1589, 0.1666, 0.1764, 0.192, 0.2226]), (30, [0.1315, 0.1378, 0.146, 0.159, 0.1848])):
    add("lilliefors", n, LEVELS, values, 0.0015, MOLIN, "quoted")
DALLAL = "Dallal & Wilkinson (1986) An analytic approximation to the distribution of Lilliefors's test statistic for normality, Am. Statistician 40:294-296"
for n, values in ((5, [0.289, 0.303, 0.319, 0.343, 0.397]), (10, [0.217, 0.228, 0.241, 0.262, 0.304]), (20, [0.159, 0.166, 0.176, 0.192, 0.223]),
                  (30, [0.131, 0.138, 0.146, 0.159, 0.185]), (100, [0.074, 0.077, 0.082, 0.089, 0.104])):
    add("lilliefors", n, LEVELS, values, 0.0015, DALLAL, "quoted")
root = 100**0.5
add("lilliefors", 100, LEVELS, [round(c / root, 5) for c in (0.736, 0.768, 0.805, 0.886, 1.031)], 0.0015,
    "Lilliefors (1967) JASA 62:399-402, Table 1, c/sqrt(n) above n = 30", "quoted")
add("lilliefors", 100, LEVELS, [round(c / ((0.83 + 100) / root - 0.01), 5) for c in (0.741, 0.775, 0.819, 0.895, 1.035)], 0.0015,
    "Abdi & Molin (2007) Lilliefors/Van Soest's test of normality, c/((0.83+n)/sqrt(n)-0.01) above n = 50", "quoted")

with open("worked/normality.json", "w") as out:
    json.dump(sections, out, indent=1)
    out.write("\n")

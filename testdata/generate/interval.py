#!/usr/bin/python3
"""Recomputes every number of interval/interval.json and interval/norms.json
another way and stops with an error where one differs by more than 1e-11
(relative, or absolute below 1e-4; in norms.json points below 1, and limits of
the noncentral t by more than 1e-7).

What is done differently from interval.R: sums by math.fsum; a lower side is
the upper side of the reflected scores (x -> -x) rather than a complement; the
variances are means of squared influence values rather than formulas in the
moments; I2's roots are bracketed and bisected, with y(1-y) cut to 0 outside
0..1, rather than solved as a quadratic (the quadratic only decides where the
stated fallback applies); z, shares and quantiles come from SciPy. Wilson's
formula checks I2 for a given curve, and expected/ what it has too. For a given
curve Clopper and Pearson's limits are bisected from binomial tail sums, and
those of a curve from norms from the approximate and from the exact distribution
of a standardised distance, the latter by quadrature over the norms' SD.

Run from testdata:  python3 generate/interval.py
"""
import csv
import json
import math
import sys

import numpy as np
from scipy import stats
from scipy.optimize import brentq
from scipy.special import betainc, ndtr

TOLERANCE = 1e-11


def mean_of(values):
    return math.fsum(values) / len(values)


def read_column(dataset, column):
    with open(f"open/{dataset}.csv") as f:
        return np.array([float(row[column]) for row in csv.DictReader(f) if row[column] != ""])


def t_quantile(level, df):
    """The two-sided quantile of Student's t from the incomplete beta function;
    SciPy 1.10's own t.ppf is right to 1e-9 only."""
    return brentq(lambda t: betainc(df / 2, 0.5, df / (df + t * t)) - (1 - level), 0.1, 100, xtol=1e-15, rtol=1e-15)


class Curve:
    """The normal curve read at d, and what one score adds to P(X >= d)."""

    def __init__(self, x, given=None):
        self.x, self.given = x, given
        self.m = mean_of(x)
        self.deviation = x - self.m
        self.m2 = mean_of(self.deviation**2)
        n = len(x)
        self.mean, self.sd = given or (self.m, math.sqrt(self.m2 * n / (n - 1)))

    def share(self, d):
        return float(ndtr(-(d - self.mean) / self.sd))

    def influence(self, d):
        """h: what one score at y adds to P(X >= d), to first order, times n."""
        if self.given:
            return lambda y: 0.0 * y
        z = (d - self.mean) / self.sd
        f = stats.norm.pdf(z)
        return lambda y: f * ((y - self.m) / self.sd + z / 2 * ((y - self.m) ** 2 - self.m2) / self.sd**2)


def variance(h, x):
    """n/(n-1) times the mean square of h (whose mean over x is 0)."""
    n = len(x)
    return float(n / (n - 1) * mean_of(h(x) ** 2))


def ghost_terms(x, beyond, h, g, w=1.0, v=None):
    n, k = len(x), int(beyond.sum())
    v = variance(h, x) if v is None else v
    A = math.fsum(h(x)[beyond])
    rest = math.fsum(h(x)[~beyond])
    D = (A + g) / (k + 1) - (g + rest) / (n - k + 1)
    p = (k + 2) / (n + 4)
    spread = p * (1 - p)
    kappa = max(w * w - 2 * w * D, -0.95 * v / spread)
    return dict(n=n, k=k, v=v, D=D, p_tilde=p, kappa=kappa, kappa_floored=w * w - 2 * w * D < -0.95 * v / spread,
                se=math.sqrt((v + kappa * spread) / n))


def root(p, V, lam, direction):
    """The point furthest in a direction (-1, +1) where (y-p)^2 = V + lam y(1-y);
    second value: whether the stated fallback was used."""
    distance = lambda y: (y - p) ** 2 - V - lam * max(0.0, y * (1 - y))
    outside = p * p <= V if direction < 0 else (1 - p) ** 2 <= V
    discriminant = (2 * p + lam) ** 2 - 4 * (1 + lam) * (p * p - V)
    if not outside and (discriminant < 0 or 1 + lam < 0.05):
        return p + direction * math.sqrt(max(0.0, V + lam * p * (1 - p))), True
    start = p
    if distance(p) == 0:  # p is one root: is there another further out?
        start = p + direction * 1e-9
        if distance(start) >= 0:
            return p, False
    assert distance(start) < 0, "both roots on one side"
    return brentq(distance, start, p + direction * (2 + math.sqrt(V)), xtol=1e-16, rtol=1e-15, maxiter=500), False


def second_interval(e, t, N, z, given, w=1.0):
    if given:
        low = high = N
    else:
        zeta = math.asinh(z / math.sqrt(2))
        se = math.sqrt(e["v"] / e["n"]) / (stats.norm.pdf(z) * math.sqrt(2 + z * z))
        low, high = (float(ndtr(-math.sqrt(2) * math.sinh(zeta + sign * t * se))) for sign in (1, -1))
    p, lam = e["k"] / e["n"], t * t * e["kappa"] / (w * w * e["n"])
    upper, f1 = root(p, (N - low) ** 2 / (w * w), lam, +1)
    lower, f2 = root(p, (high - N) ** 2 / (w * w), lam, -1)
    return N - w * upper, N - w * lower, int(f1) + int(f2)


def at_cutoff(x, step, r, given=None, w=1.0):
    c, side = r["cutoff"], r["side"]
    if side in ("<=", "<"):
        x, c = -x, -c
        given = given and (-given[0], given[1])
    strict = side in (">", "<")
    beyond = x > c if strict else x >= c
    d = c + (0.0 if not r["half_step"] else step / 2 if strict else -step / 2)
    curve = Curve(x, given)
    h, N = curve.influence(d), curve.share(d)
    e = ghost_terms(x, beyond, h, h(c), w, 0.0 if given else None)
    n, k = e["n"], e["k"]
    z = (d - curve.mean) / curve.sd
    t = t_quantile(r["level"], n - 1)
    low, high, fallbacks = second_interval(e, t, N, z, given, w)
    S = k / n
    # the influence value before centring: h with u^2-1 in place of u^2-(n-1)/n
    psi = h(x) - (beyond - S) - stats.norm.pdf(z) * z / 2 / n
    gap = 100 * (N - w * S)
    return dict(z=-z if side in ("<=", "<") else z, curve_share=N, counted=k, counted_share=S, gap_points=gap, difference_points=gap,
                v=e["v"], D=e["D"], p_tilde=e["p_tilde"], kappa=e["kappa"], kappa_floored=e["kappa_floored"],
                se_points=100 * e["se"], t=t, i2_low_points=100 * low, i2_high_points=100 * high, i2_fallback_roots=fallbacks,
                takes_hull=min(k, n - k) < 10, influence_se_points=100 * math.sqrt(mean_of(psi**2) / n))


def at_stretch(x, step, r):
    shift = step / 2 if r["half_step"] else 0.0
    curve = Curve(x)
    start, stop = r["from"] - shift, r["to"] + shift
    ha, hb = curve.influence(start), curve.influence(stop)
    h = lambda y: ha(y) - hb(y)
    inside = (x >= r["from"]) & (x <= r["to"])
    e = ghost_terms(x, inside, h, (h(r["from"]) + h(r["to"])) / 2)
    N, S = curve.share(start) - curve.share(stop), e["k"] / e["n"]
    return dict(z_from=(start - curve.mean) / curve.sd, z_to=(stop - curve.mean) / curve.sd, curve_share=N, counted=e["k"], counted_share=S,
                gap_points=100 * (N - S), v=e["v"], D=e["D"], p_tilde=e["p_tilde"], kappa=e["kappa"], kappa_floored=e["kappa_floored"],
                se_points=100 * e["se"], t=t_quantile(r["level"], e["n"] - 1))


def summary(x):
    n, m = len(x), mean_of(x)
    m2, m3, m4 = (mean_of((x - m) ** r) for r in (2, 3, 4))
    return dict(n=n, min=x.min(), max=x.max(), distinct=len(set(x)), mean=m, sd=math.sqrt(m2 * n / (n - 1)), m2=m2, m3=m3, m4=m4,
                skewness=m3 / m2**1.5, excess_kurtosis=m4 / m2**2 - 3,
                adjusted_skewness=float(stats.skew(x, bias=False)), adjusted_excess_kurtosis=float(stats.kurtosis(x, bias=False)))


def wilson(k, n, z):
    """Wilson's score interval (1927) in its textbook form."""
    p = k / n
    middle = (p + z * z / (2 * n)) / (1 + z * z / n)
    half = z / (1 + z * z / n) * math.sqrt(p * (1 - p) / n + z * z / (4 * n * n))
    return middle - half, middle + half


def binomial_limits(k, n, miss):
    """The shares at which so few, and so many, as k have the probability miss."""
    at_least = lambda p: betainc(k, n - k + 1, p) - miss
    at_most = lambda p: betainc(n - k, k + 1, 1 - p) - miss
    solve = lambda f: brentq(f, 0.0, 1.0, xtol=1e-16, rtol=1e-15, maxiter=500)
    return (0.0 if k == 0 else solve(at_least)), (1.0 if k == n else solve(at_most))


def approximate_t(t, df, ncp):
    """P(T <= t) of the noncentral t distribution (Johnson & Welch 1940)."""
    return ndtr((t * (1 - 1 / (4 * df)) - ncp) / math.sqrt(1 + t * t / (2 * df)))


NODES, WEIGHTS = np.polynomial.legendre.leggauss(400)


def exact_t(t, df, ncp):
    """The same by integrating over the SD that t is scaled by."""
    low, high = (math.sqrt(stats.chi2.isf(p, df) / df) for p in (1 - 1e-15, 1e-15))
    s = low + (high - low) * (NODES + 1) / 2
    density = stats.chi2.pdf(df * s * s, df) * 2 * df * s
    return float((high - low) / 2 * np.sum(WEIGHTS * density * ndtr(t * s - ncp)))


def z_limits(z, n, miss, distribution):
    t, root_n = math.sqrt(n) * z, math.sqrt(n)
    reach = 15 * (1 + abs(z)) * root_n
    solve = lambda p: brentq(lambda ncp: distribution(t, n - 1, ncp) - p, t - reach, t + reach, xtol=1e-14, rtol=1e-14) / root_n
    return solve(1 - miss), solve(miss)


def given_curve(x, step, r, mean, sd, level):
    """N - wS with its limits and the band's standard error, where the curve is
    given: known, or from norm_n people."""
    n, n0, w = len(x), r["norm_n"], r.get("weight", 1.0)
    half = step / 2 if r["half_step"] else 0.0
    miss = (1 - level) / 2
    if "side" not in r:
        ends = [(r["from"] - half - mean) / sd, (r["to"] + half - mean) / sd]
        k = int(((x >= r["from"]) & (x <= r["to"])).sum())
        N = float(stats.norm.cdf(ends[1]) - stats.norm.cdf(ends[0]))
        slopes = [(stats.norm.pdf(z), z * stats.norm.pdf(z)) for z in ends]
        by_mean, by_sd = (slopes[0][i] - slopes[1][i] for i in (0, 1))
    else:
        c, side = r["cutoff"], r["side"]
        k = int({">=": x >= c, ">": x > c, "<=": x <= c, "<": x < c}[side].sum())
        z = (c + (half if side in (">", "<=") else -half) - mean) / sd
        z = -z if side in ("<=", "<") else z  # the share beyond z, on the reflected scale
        N, by_mean, by_sd = float(ndtr(-z)), stats.norm.pdf(z), z * stats.norm.pdf(z)
    variance = 0.0 if n0 is None else by_mean**2 / n0 + by_sd**2 / (2 * n0 - 2)
    if n0 is None:
        N_low = N_high = N
    elif "side" in r:
        z_low, z_high = z_limits(z, n0, miss, approximate_t)
        N_low, N_high = float(ndtr(-z_high)), float(ndtr(-z_low))
    else:
        margin = t_quantile(level, n0 - 1) * math.sqrt(variance) / (N * (1 - N))
        N_low, N_high = (N * math.exp(m) / (1 - N + N * math.exp(m)) for m in (-margin, margin))
    S, (S_low, S_high) = k / n, binomial_limits(k, n, miss)
    p = (k + 2) / (n + 4)
    low = N - w * S - math.hypot(N - N_low, w * (S_high - S))
    high = N - w * S + math.hypot(N_high - N, w * (S - S_low))
    return dict(curve_share=N, counted=k, difference_points=100 * (N - w * S), se_points=100 * math.sqrt(variance + w * w * p * (1 - p) / n), low_points=100 * low, high_points=100 * high)


def check_norms():
    data, checked = json.load(open("interval/norms.json")), 0
    for c in data["columns"]:
        x = read_column(c["dataset"], c["column"])
        for r in c["cutoffs"] + c["stretches"]:
            for i, level in enumerate(data["levels"]):
                theirs = dict(r, low_points=r["low_points"][i], high_points=r["high_points"][i])
                own = given_curve(x, c["step"], r, c["mean"], c["sd"], level)
                compare(f"{c['dataset']}.{c['column']} {r} at {level}", theirs, own, 1.0)
                checked += 1
    for r in data["noncentral_t"]:
        low, high = z_limits(r["z"], r["norm_n"], (1 - r["level"]) / 2, exact_t)
        for name, own in (("low", low), ("high", high)):
            assert abs(r[name] - own) < 1e-7, (r, own)
        checked += 1
    return checked


worst = {}


def difference(a, b, least=1e-4):
    return abs(a - b) / max(abs(a), abs(b), least) if a != b else 0.0


def compare(where, record, own, least_points=1e-4):
    for name, theirs in record.items():
        if name not in own:
            continue
        d = difference(float(theirs), float(own[name]), least_points if name.endswith("_points") else 1e-4)
        if d >= worst.get(name, (-1,))[0]:
            worst[name] = (d, where)


def compare_with_expected(name, c):
    """The shares, gaps and influence standard errors of expected/ once more."""
    for e in json.load(open(f"expected/{name}.json"))["cutoffs"]:
        for side, code in ((">=", "ge"), ("<=", "le")):
            for half, suffix in ((False, "raw"), (True, "cc")):
                if f"normal_{code}_{suffix}" not in e:
                    continue
                r = next(r for r in c["cutoffs"] if (r["cutoff"], r["side"], r["half_step"], r["level"]) == (e["cutoff"], side, half, 0.95))
                theirs = dict(curve_share=e[f"normal_{code}_{suffix}"], gap_points=e[f"diff_pp_{code}_{suffix}"], counted=e[f"count_{code}"],
                              influence_se_points=e["bootstrap_normal_minus_observed"][f"{code}_{suffix}"]["delta_se_pp"])
                compare(f"{name} {side}{e['cutoff']} in expected/", theirs, r)


def main():
    data = json.load(open("interval/interval.json"))
    checked = check_norms()
    for c in data["columns"]:
        x, step, name = read_column(c["dataset"], c["column"]), c["step"], f"{c['dataset']}.{c['column']}"
        compare(name, c, summary(x))
        given = (c["given_curve"]["mean"], c["given_curve"]["sd"])
        for r in c["cutoffs"]:
            compare(f"{name} {r['side']}{r['cutoff']}", r, at_cutoff(x, step, r))
        for r in c["stretches"]:
            compare(f"{name} {r['from']}..{r['to']}", r, at_stretch(x, step, r))
        for r in c["combinations"]:
            compare(f"{name} {r['side']}{r['cutoff']} w={r['weight']}", r, at_cutoff(x, step, r, w=r["weight"]))
        for r in c["given_curve"]["cutoffs"]:
            where = f"{name} {r['side']}{r['cutoff']} given"
            compare(where, r, at_cutoff(x, step, r, given))
            low, high = wilson(r["counted"], c["n"], r["t"])
            compare(where + " Wilson", dict(i2_low_points=r["i2_low_points"], i2_high_points=r["i2_high_points"]),
                    dict(i2_low_points=100 * (r["curve_share"] - high), i2_high_points=100 * (r["curve_share"] - low)))
        compare_with_expected(name, c)
        checked += 1 + sum(len(c[k]) for k in ("cutoffs", "stretches", "combinations")) + len(c["given_curve"]["cutoffs"])
    for name, (d, where) in sorted(worst.items(), key=lambda item: -item[1][0]):
        print(f"{d:8.1e}  {name:26s} {where}")
    bad = [name for name, (d, _) in worst.items() if not d <= TOLERANCE]
    print(checked, "records,", "DIFFER: " + ", ".join(bad) if bad else f"all within {TOLERANCE:g}")
    sys.exit(1 if bad else 0)


if __name__ == "__main__":
    main()

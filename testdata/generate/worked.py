#!/usr/bin/python3
"""Writes worked/values.json: published values of the normal distribution, of
binomial intervals and of the half-step, each beside what SciPy and mpmath
compute, which must agree within the stated tolerance.

"seen" says how the published number was come by: "source" (read in the source
named), "quoted" (read where another work quotes it) or "recalled" (the
original not seen: the number is safe, its page or table number is not).

Run from testdata:  python3 generate/worked.py
"""
import json
import math

from mpmath import erfc, mp, mpf, npdf, sqrt
from scipy import stats

mp.dps = 40
sections = dict(normal_share=[], normal_quantile=[], proportion_interval=[], binomial_stretch=[])


def add(section, given, published, computed, tolerance, source, seen):
    """published: texts by name; computed: numbers by the same names."""
    for name, text in published.items():
        assert abs(mpf(text) - mpf(computed[name])) <= mpf(tolerance), (section, given, name)
    sections[section].append(dict(**given, published={k: float(v) for k, v in published.items()}, published_text=published,
                                  computed={k: float(v) for k, v in computed.items()}, tolerance=float(tolerance), source=source, seen=seen))


def below(x):
    return erfc(-mpf(x) / sqrt(2)) / 2


def quantile(p):
    x = mpf(float(stats.norm.ppf(float(p))))
    for _ in range(8):  # Newton
        x -= (below(x) - mpf(p)) / npdf(x)
    return x


ABRAMOWITZ = "Abramowitz & Stegun (eds), Handbook of Mathematical Functions, NBS AMS 55, 1964, Table 26.1"
GSL = "GNU Scientific Library, cdf/test.c, test_ugaussian"
for x, p, tolerance in (("0.1", "0.539827837277029", "6e-16"), ("0.2", "0.579259709439103", "6e-16"), ("0.3", "0.617911422188953", "6e-16"),
                        ("0.4", "0.655421741610324", "6e-16"), ("0.5", "0.691462461274013", "6e-16"), ("1.0", "0.841344746068543", "6e-16"),
                        ("2.0", "0.977249868051821", "6e-16"), ("3.0", "0.9986501020", "6e-11"), ("4.0", "0.9999683288", "6e-11"), ("5.0", "0.9999997133", "6e-11")):
    add("normal_share", dict(x=float(x)), dict(below=p), dict(below=below(x)), tolerance, ABRAMOWITZ, "quoted")
for x, p, tolerance in (("-0.5", "0.3085375387259868962622953894", "1e-17"), ("-0.7", "0.2419636522230730147493504282", "1e-17"),
                        ("-5", "0.0000002866515718791939116737523329", "1e-23"), ("-10", "7.619853024160526065973343257e-24", "1e-40"),
                        ("-30", "4.906713927148187059533809288e-198", "1e-214")):
    add("normal_share", dict(x=float(x)), dict(below=p), dict(below=below(x)), tolerance, GSL, "source")
for p, z, tolerance in (("0.25", "-0.6744897501960817", "6e-16"), ("0.001", "-3.090232306167814", "6e-16"), ("1e-20", "-9.262340089798408", "5e-15")):
    add("normal_quantile", dict(p=float(p)), dict(z=z), dict(z=quantile(p)), tolerance,
        "Wichura (1988) Algorithm AS 241, Applied Statistics 37(3):477-484, test values", "quoted")
add("normal_quantile", dict(p=0.975), dict(z="1.959963984540054"), dict(z=quantile("0.975")), "6e-16", "any 16-digit table of the normal distribution", "recalled")

NEWCOMBE = "Newcombe (1998) Two-sided confidence intervals for the single proportion, Statist. Med. 17:857-872, Table I"
for k, n, wilson, exact in ((81, 263, (".2553", ".3662"), (".2527", ".3676")), (15, 148, (".0624", ".1605"), (".0578", ".1617")),
                            (0, 20, ("0", ".1611"), ("0", ".1684")), (1, 29, (".0061", ".1718"), (".0009", ".1776"))):
    for method, name, (low, high), seen in (("wilson", "Wilson", wilson, "quoted"), ("exact", "Clopper-Pearson", exact, "recalled")):
        ci = stats.binomtest(k, n).proportion_ci(0.95, method)
        add("proportion_interval", dict(count=k, n=n, method=name, level=0.95), dict(low=low, high=high), dict(low=ci.low, high=ci.high), "5.1e-5", NEWCOMBE, seen)

FELLER = "Feller (1968) An Introduction to Probability Theory and Its Applications, vol. I, 3rd ed., ch. VII"
for n, p, start, stop, exact, normal, tolerance in ((200, 0.5, 95, 105, ".56325", ".56331", "1.5e-5"), (500, 0.1, 50, 55, ".317573", ".3235", "1e-4"),
        (100, 0.3, 12, 14, ".00015", ".00033", "6e-6"), (100, 0.3, 15, 17, ".00201", ".00283", "6e-6"), (100, 0.3, 21, 23, ".05907", ".05895", "6e-6"),
        (100, 0.3, 24, 26, ".14887", ".14447", "6e-6"), (100, 0.3, 27, 29, ".23794", ".23405", "6e-6"), (100, 0.3, 31, 33, ".23013", ".23405", "6e-6"),
        (100, 0.3, 34, 36, ".14086", ".14447", "6e-6"), (100, 0.3, 37, 39, ".05889", ".05895", "6e-6"), (100, 0.3, 43, 45, ".00343", ".00283", "6e-6"),
        (100, 0.3, 46, 48, ".00049", ".00033", "6e-6")):
    mean, sd = n * p, math.sqrt(n * p * (1 - p))
    computed = dict(exact=stats.binom.cdf(stop, n, p) - stats.binom.cdf(start - 1, n, p),
                    half_step_normal=stats.norm.cdf((stop + 0.5 - mean) / sd) - stats.norm.cdf((start - 0.5 - mean) / sd))
    add("binomial_stretch", {"n": n, "p": p, "from": start, "to": stop, "mean": mean, "sd": sd}, dict(exact=exact, half_step_normal=normal), computed, tolerance, FELLER, "recalled")

with open("worked/values.json", "w") as f:
    body = ",\n".join(f'"{name}": [\n' + ",\n".join(json.dumps(r) for r in records) + "]" for name, records in sections.items())
    f.write("{" + body + "}\n")
print({name: len(records) for name, records in sections.items()})

#!/usr/bin/python3
"""Parses nist/*.dat, checks certified values with 60-digit arithmetic, writes nist/certified.json and nist/CHECK.md. run from testdata"""
import json, os, re, math, numpy as np
from mpmath import mp, mpf
mp.dps = 60
import subprocess
def parse(p):
    L = open(p, encoding="latin-1").read().splitlines(); cert = {}
    for k, pat in (("mean", r"Sample Mean"), ("sd", r"Sample Standard Dev"), ("lag1_autocorrelation", r"Autocorrelation")):
        l = [x for x in L if re.search(pat, x) and re.search(r":\s*-?[\d.]+", x)][0]; cert[k] = re.findall(r"-?\d[\d.]*", l.rsplit(":", 1)[1])[0]
    i = max(j for j, x in enumerate(L) if re.fullmatch(r"\s*-{3,}\s*", x)); d = [x.strip() for x in L[i+1:] if x.strip()]
    return cert, d
out = {}; md = ["# NIST StRD univariate: certified values against exact recomputation", "",
 "Exact = mpmath, 60 digits, on the decimal strings in the file. LRE = -log10 relative error of plain float64 arithmetic: numpy two-pass (mean, then deviations) and naive one-pass sum of squares.", "",
 "| dataset | n | quantity | certified | exact (16 digits) | agrees to certified digits | LRE numpy two-pass | LRE naive one-pass |", "|---|---|---|---|---|---|---|---|"]
lre = lambda c, e: 15.0 if c == e else (0.0 if e == 0 else min(15.0, float(-mp.log10(abs((mpf(c)-e)/e)))) if math.isfinite(c) else float("nan"))
for nm in ("PiDigits", "Lottery", "Lew", "Mavro", "Michelso", "NumAcc1", "NumAcc2", "NumAcc3", "NumAcc4"):
    cert, d = parse(f"nist/{nm}.dat"); x = [mpf(s) for s in d]; n = len(x)
    m = sum(x)/n; ss = sum((v-m)**2 for v in x); sd = mp.sqrt(ss/(n-1)); r1 = sum((x[i]-m)*(x[i+1]-m) for i in range(n-1))/ss
    f = np.array([float(s) for s in d]); fm = f.mean(); fs = f.std(ddof=1); fr = ((f[:-1]-fm)*(f[1:]-fm)).sum()/((f-fm)**2).sum()
    v1 = ((f*f).sum()-n*fm*fm)/(n-1); ns = math.sqrt(v1) if v1 >= 0 else float("nan")
    out[nm] = dict(n=n, certified={k: float(v) for k, v in cert.items()}, certified_text=cert, exact={k: mp.nstr(v, 20) for k, v in (("mean", m), ("sd", sd), ("lag1_autocorrelation", r1))})
    for k, e, a, b in (("mean", m, fm, None), ("sd", sd, fs, ns), ("lag1_autocorrelation", r1, fr, None)):
        c = mpf(cert[k]); dg = len(cert[k].lstrip("-").replace(".", "").lstrip("0")); ok = abs(c-e) <= mpf(10)**(-(len(cert[k].split(".")[1]) if "." in cert[k] else 0))*mpf("0.6")
        md.append(f"| {nm} | {n} | {k} | {cert[k]} | {mp.nstr(e, 16)} | {'yes' if ok else 'NO'} | {lre(float(a), e):.1f} | {'' if b is None else ('nan' if math.isnan(b) else format(lre(b, e), '.1f'))} |")
json.dump(out, open("nist/certified.json", "w"), indent=1); open("nist/CHECK.md", "w").write("\n".join(md)+"\n")

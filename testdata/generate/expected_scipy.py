#!/usr/bin/python3
"""Adds scipy/statsmodels values to the R values and writes expected/<dataset>.<column>.json
and expected/CROSSCHECK.md.  Run: python3 generate/expected_scipy.py  (run from testdata)"""
import csv, json, math, os, sys, warnings
import numpy as np, scipy
from scipy import stats
from scipy.special import ndtr, ndtri
import statsmodels
from statsmodels.stats.diagnostic import lilliefors, normal_ad
from statsmodels.stats.proportion import proportion_confint
warnings.simplefilter("ignore")
RAW = os.environ.get("REFS_RAW", "raw"); SEED = 20240502; NB = 20000

def rd(a, b):
    if a is None or b is None or not (math.isfinite(a) and math.isfinite(b)): return None
    d = abs(a-b); return d/max(abs(a), abs(b)) if max(abs(a), abs(b)) > 0 else 0.0

def col(ds, c):
    with open(f"open/{ds}.csv") as f:
        return np.array([float(r[c]) for r in csv.DictReader(f) if r[c] != ""])

def my_boot(x, fn, rng, nb=NB):
    """ordinary bootstrap of a vector statistic on rows of an index matrix, in blocks"""
    n = len(x); out = []; block = max(1, int(2e7//n)); left = nb
    while left:
        k = min(block, left); out.append(fn(x[rng.integers(0, n, (k, n))])); left -= k
    return np.concatenate(out, axis=1)

def jack(x, fn):
    n = len(x); out = []; block = max(1, int(2e7//n))
    for s in range(0, n, block):
        idx = np.arange(s, min(n, s+block)); m = np.tile(np.arange(n-1), (len(idx), 1)); m += (m >= idx[:, None])
        out.append(fn(x[m]))
    return np.concatenate(out, axis=1)

def run(path):
    e = json.load(open(path)); x = col(e["dataset"], e["column"]); n = len(x)
    h = e["half_step"]; m = x.mean(); s = x.std(ddof=1)
    ks = lilliefors(x, dist="norm", pvalmethod="table"); ka = lilliefors(x, dist="norm", pvalmethod="approx")
    adp = normal_ad(x); k2 = stats.normaltest(x); jb = stats.jarque_bera(x); sw = stats.shapiro(x); an = stats.anderson(x, "norm")
    sp = dict(mean=float(m), sd=float(s), skew_g1=float(stats.skew(x)), skew_G1=float(stats.skew(x, bias=False)),
              exkurt_g2=float(stats.kurtosis(x)), exkurt_G2=float(stats.kurtosis(x, bias=False)),
              shapiro_W=float(sw[0]), shapiro_p=float(sw[1]), anderson_A2=float(an.statistic), ad_p_statsmodels=float(adp[1]),
              lilliefors_D_statsmodels=float(ks[0]), lilliefors_p_statsmodels_table=float(ks[1]), lilliefors_p_statsmodels_approx=float(ka[1]),
              jarque_bera=float(jb[0]), jarque_bera_p=float(jb[1]), dagostino_K2=float(k2[0]), dagostino_K2_p=float(k2[1]))
    t, S = e["tests"], e["summary"]
    pairs = dict(mean=(S["mean"], sp["mean"]), sd=(S["sd"], sp["sd"]), skew_g1=(S["skew_g1"], sp["skew_g1"]), skew_G1=(S["skew_G1"], sp["skew_G1"]),
                 exkurt_g2=(S["exkurt_g2"], sp["exkurt_g2"]), exkurt_G2=(S["exkurt_G2"], sp["exkurt_G2"]),
                 shapiro_W=(t["shapiro_wilk"]["W"], sp["shapiro_W"]), shapiro_p=(t["shapiro_wilk"]["p"], sp["shapiro_p"]),
                 anderson_A2=(t["anderson_darling"]["A2"], sp["anderson_A2"]), ad_p=(t["anderson_darling"]["p"], sp["ad_p_statsmodels"]),
                 lilliefors_D=(t["lilliefors"]["D"], sp["lilliefors_D_statsmodels"]), lilliefors_p_table=(t["lilliefors"]["p"], sp["lilliefors_p_statsmodels_table"]),
                 lilliefors_p_approx=(t["lilliefors"]["p"], sp["lilliefors_p_statsmodels_approx"]),
                 jarque_bera=(t["jarque_bera"]["JB"], sp["jarque_bera"]), jarque_bera_p=(t["jarque_bera"]["p"], sp["jarque_bera_p"]),
                 dagostino_K2=(t["dagostino_k2"]["K2"], sp["dagostino_K2"]), dagostino_K2_p=(t["dagostino_k2"]["p"], sp["dagostino_K2_p"]))
    rel = {k: rd(*v) for k, v in pairs.items()}
    # cutoffs: shares and intervals, deterministic
    worst = 0.0; cuts = [c["cutoff"] for c in e["cutoffs"]]
    for c in e["cutoffs"]:
        q = c["cutoff"]; kg = int((x >= q).sum()); kl = int((x <= q).sum())
        assert kg == c["count_ge"] and kl == c["count_le"], (path, q)
        chk = [(c["z"], (q-m)/s), (c["normal_ge_raw"], stats.norm.sf(q, m, s)), (c["normal_le_raw"], stats.norm.cdf(q, m, s))]
        if h is not None:
            chk += [(c["normal_ge_cc"], stats.norm.sf(q-h, m, s)), (c["normal_le_cc"], stats.norm.cdf(q+h, m, s))]
        for kk, nm in ((kg, "ge"), (kl, "le")):
            b = stats.binomtest(kk, n)
            for meth, key, sm in (("exact", "clopper_pearson95_", "beta"), ("wilson", "wilson95_", "wilson")):
                ci = b.proportion_ci(.95, meth); ci2 = proportion_confint(kk, n, .05, sm)
                chk += [(c[key+nm][0], ci.low), (c[key+nm][1], ci.high), (c[key+nm][0], ci2[0]), (c[key+nm][1], ci2[1])]
        for a, b2 in chk:
            if not math.isfinite(b2):   # statsmodels gives nan at 0 and n for "beta"
                continue
            d = abs(a-b2)
            worst = max(worst, d)
    # bootstrap, scipy's algorithm (percentile by linear interpolation, ties counted half in z0, centred jackknife)
    kinds = ["ge_raw"] + (["ge_cc"] if h is not None else [])
    C = np.array(cuts)
    def fn(y):
        mm = y.mean(axis=-1); ss = y.std(axis=-1, ddof=1); out = []
        obs = [(y >= q).mean(axis=-1) for q in cuts]
        for kd in kinds:
            for q, o in zip(cuts, obs): out.append(100*(ndtr(-((q-(h if kd == "ge_cc" else 0))-mm)/ss)-o))
        return np.array(out)
    rng = np.random.default_rng(SEED)
    T = my_boot(x, fn, rng); J = jack(x, fn); t0 = fn(x[None, :])[:, 0]; a_ = np.array([.025, .975]); za = ndtri(a_); i = 0
    for kd in kinds:
        for c in e["cutoffs"]:
            tb, th, jj = T[i], t0[i], J[i]; i += 1
            r = c["bootstrap_normal_minus_observed"][kd]
            pc = np.quantile(tb, a_); z0 = ndtri(((tb < th).sum()+(tb <= th).sum())/(2*len(tb)))
            L = jj.mean()-jj; den = (L**2).sum(); a = (L**3).sum()/(6*den**1.5) if den > 0 else float("nan")
            al = ndtr(z0+(z0+za)/(1-a*(z0+za))); bc = np.quantile(tb, al) if np.isfinite(al).all() else [None, None]
            r["scipy_algorithm"] = dict(numpy_seed=SEED, n_resamples=NB, percentile95=[float(v) for v in pc], bca95=[None if v is None else float(v) for v in bc],
                                        bca_z0=float(z0), bca_a=None if math.isnan(a) else float(a))
            se = r["boot_se_pp"]
            if r.get("percentile95") and se: r["max_gap_in_boot_se"] = dict(percentile=float(max(abs(pc[0]-r["percentile95"][0]), abs(pc[1]-r["percentile95"][1]))/se),
                    bca=(float(max(abs(bc[0]-r["bca95"][0]), abs(bc[1]-r["bca95"][1]))/se) if r.get("bca95") and bc[0] is not None else None))
    e["scipy"] = dict(scipy=scipy.__version__, numpy=np.__version__, statsmodels=statsmodels.__version__, values=sp)
    e["agreement"] = dict(relative_difference_R_vs_scipy=rel, cutoffs_max_abs_difference=worst)
    def clean(o):
        if isinstance(o, float): return None if not math.isfinite(o) else o
        if isinstance(o, dict): return {k: clean(v) for k, v in o.items()}
        if isinstance(o, list): return [clean(v) for v in o]
        return o
    def rnd(o, k=None):   # bootstrap numbers need no more than 7 significant digits
        if isinstance(o, float): return float(f"{o:.7g}")
        if isinstance(o, dict): return {kk: rnd(v) for kk, v in o.items()}
        if isinstance(o, list): return [rnd(v) for v in o]
        return o
    for c in e["cutoffs"]:
        b = c["bootstrap_normal_minus_observed"]
        for kd in b:
            keep = {k: b[kd][k] for k in ("est_pp", "delta_se_pp", "bca_a") if k in b[kd]}
            b[kd] = {**rnd(b[kd]), **keep}
    json.dump(clean(e), open(f"expected/{e['dataset']}.{e['column']}.json", "w"), indent=1)
    return e

if __name__ == "__main__":
    os.makedirs("expected", exist_ok=True); rows = []
    for f in sorted(os.listdir(RAW)):
        e = run(os.path.join(RAW, f)); r = e["agreement"]["relative_difference_R_vs_scipy"]
        gp = [v["max_gap_in_boot_se"] for c in e["cutoffs"] for v in c["bootstrap_normal_minus_observed"].values() if "max_gap_in_boot_se" in v]
        rows.append((e, r, max(g["percentile"] for g in gp), max(g["bca"] or 0 for g in gp))); print(f, flush=True)
    with open("expected/CROSSCHECK.md", "w") as o:
        ks = list(rows[0][1])
        o.write("# R against scipy/statsmodels, by column\n\nRelative differences; blank = one side has no value. Last columns: largest absolute difference over shares and binomial intervals; "
                "largest gap between the two bootstraps' limits (percentile, BCa), in bootstrap standard errors (Monte Carlo noise of two independent 20000-draw runs included).\n\n")
        o.write("| column | n | " + " | ".join(ks) + " | shares+CI abs | boot perc gap | boot BCa gap |\n|" + "---|"*(len(ks)+5) + "\n")
        for e, r, a, b in rows:
            o.write(f"| {e['dataset']}.{e['column']} | {e['summary']['n']} | " + " | ".join("" if r[k] is None else ("0" if r[k] == 0 else f"{r[k]:.1e}") for k in ks) +
                    f" | {e['agreement']['cutoffs_max_abs_difference']:.1e} | {a:.3f} | {b:.3f} |\n")

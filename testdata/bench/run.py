#!/usr/bin/python3
"""Times tailgap beside R's boot and SciPy, natively and as WebAssembly, turn by
turn, and prints the ratios of the medians as a Markdown table. Needs R with
boot, NumPy, SciPy, node and Go.

Run from testdata/bench:  python3 run.py [rounds]"""
import re
import statistics
import subprocess
import sys
from pathlib import Path

ROUNDS = int(sys.argv[1]) if len(sys.argv) > 1 else 5
ROOT = Path(__file__).resolve().parents[2]
JUDGE = "^BenchmarkJudge$/^(1000-whole|1000000-whole|100000-distinct)$/"


def output(*command, **options):
    return subprocess.run(command, check=True, capture_output=True, text=True, **options).stdout


def build(wasm):
    """The two test programs with the benchmarks."""
    import os

    env = dict(os.environ, **({"GOOS": "js", "GOARCH": "wasm"} if wasm else {}))
    made = []
    for room in ("ask", "resample"):
        made.append(str(ROOT / "bin" / f"bench-{room}.{'wasm' if wasm else 'test'}"))
        output("go", "test", "-c", "-o", made[-1], f"./core/{room}", cwd=ROOT, env=env)
    return made


def bench(program, pattern, times):
    """Seconds by the benchmark's name."""
    runner = [program]
    if program.endswith(".wasm"):
        goroot = output("go", "env", "GOROOT").strip()
        runner = ["node", "--stack-size=8192", f"{goroot}/lib/wasm/wasm_exec_node.js", program]
    text = output(*runner, "-test.run=^$", f"-test.bench={pattern}", f"-test.benchtime={times}x", cwd=ROOT / "core" / "ask")
    return {name: float(ns) / 1e9 for name, ns in re.findall(r"^Benchmark(\S+?)(?:-\d+)?\s+\d+\s+([\d.]+) ns/op", text, re.M)}


def main():
    (ROOT / "bin").mkdir(exist_ok=True)
    (ask, resample), (ask_wasm, _) = build(False), build(True)
    seen = {}
    for _ in range(ROUNDS):
        plain, *_, fastest = output("Rscript", "curve.R").split()
        here = {"R boot, plain": float(plain), "R boot": float(fastest), "SciPy BCa": float(output(sys.executable, "cutoff.py").split()[-1])}
        here.update(bench(ask, JUDGE, 3))
        here.update(bench(resample, "^Benchmark(OneCutoff|WholeCurve)$", 5))
        here.update({"wasm " + name: s for name, s in bench(ask_wasm, "^BenchmarkJudge$/^1000-whole$/./workers=1", 3).items()})
        for name, seconds in here.items():
            seen.setdefault(name, []).append(seconds)
    median = {name: statistics.median(values) for name, values in seen.items()}

    def of(begins, workers=None, wasm=False):
        start = ("wasm " if wasm else "") + begins
        found = [n for n in median if n.startswith(start) and (workers is None or n.endswith(f"workers={workers}"))]
        assert len(found) == 1, (begins, found, sorted(median))
        return found[0]

    def row(what, slow, fast, goal):
        times = [f"{1000 * median[n]:.0f} ms ({1000 * min(seen[n]):.0f} to {1000 * max(seen[n]):.0f})" for n in (slow, fast)]
        print(f"| {what} | {times[0]} | {times[1]} | {median[slow] / median[fast]:.1f} | {goal} |")

    print("| what | this | against this | ratio | wanted |\n| --- | --- | --- | --- | --- |")
    row("whole curve: R boot, plain vectorised, gap alone / tailgap, one core", "R boot, plain", "WholeCurve/workers=1", "30 or more")
    row("whole curve: R boot, the fastest way found, gap alone / tailgap, one core", "R boot", "WholeCurve/workers=1", "30 or more")
    row("the same / tailgap, two cores", "R boot", "WholeCurve/workers=2", "30 or more")
    row("one cutoff: SciPy BCa / tailgap, one core", "SciPy BCa", "OneCutoff/workers=1", "20 or more")
    row("the same / tailgap, two cores", "SciPy BCa", "OneCutoff/workers=2", "20 or more")
    row("1,000,000 scores / 1,000 scores, all cores", of("Judge/1000000-whole", 0), of("Judge/1000-whole/", 0), "3 or less")
    row("1,000,000 scores / 1,000 scores, one core", of("Judge/1000000-whole", 1), of("Judge/1000-whole/", 1), "3 or less")
    row("WebAssembly / native, one core", of("Judge/1000-whole/", 1, wasm=True), of("Judge/1000-whole/", 1), "3 or less")
    name = of("Judge/100000-distinct", 0)
    print(f"\n100,000 distinct scores, 10,000 replicates, all cores: {median[name]:.2f} s ({min(seen[name]):.2f} to {max(seen[name]):.2f}); wanted: under 5 s.")


if __name__ == "__main__":
    main()

"""Times the alternatives against `steelyard pool` on the same ten studies, and writes docs/performance.md.

    python3 tests/bench/alternatives/run.py path/to/steelyard [--budget SECONDS]

Each alternative gets the budget (ten minutes); one that doesn't finish in it is reported as such.
Needs python3-scipy, r-base-core, jags and r-cran-rjags (Debian); what is missing is named in the table.
"""

import argparse
import json
import math
import pathlib
import platform
import shutil
import subprocess
import sys
import time

HERE = pathlib.Path(__file__).resolve().parent
DOCUMENT = HERE.parents[2] / "docs" / "performance.md"
STUDIES = HERE / "studies.csv"
START, END = "<!-- made by tests/bench/alternatives/run.py -->", "<!-- end of alternatives -->"
MODELS = ("fixed_null", "fixed_effect", "random_null", "random_effect")


def steelyard(program):
    command = [program, "pool", str(STUDIES), "--json", "-"]
    best = math.inf
    for _ in range(5):
        start = time.time()
        text = subprocess.run(command, check=True, capture_output=True, text=True).stdout
        best = min(best, time.time() - start)
    models = {m["id"]: m for m in json.loads(text)["models"]}
    return best, {k: m["log_marginal_likelihood"] for k, m in models.items()}, max(m["abs_error"] for m in models.values())


def alternative(command, budget):
    """What it printed before it ended or the budget did, its seconds, and whether it finished."""
    start = time.time()
    try:
        done = subprocess.run(command, capture_output=True, text=True, timeout=budget)
        text, finished = done.stdout, done.returncode == 0
        reason = "" if finished else (done.stderr.strip().splitlines() or ["failed"])[-1][:120]
    except subprocess.TimeoutExpired as late:
        text, finished, reason = (late.stdout or b"").decode(), False, ""
    values = {}
    for line in text.splitlines():
        fields = line.split(",")
        if fields[0] in MODELS:
            values[fields[0]] = tuple(float(x) for x in fields[1:])
    return values, time.time() - start, finished, reason


def quadrature_row(name, command, budget, truth, ours):
    if not shutil.which(command[0]):
        return f"| {name} | – | – | – | {command[0]} is not installed |"
    values, took, finished, reason = alternative(command, budget)
    gap = max((abs(values[m][0] - truth[m]) for m in values), default=math.nan)
    done = f"{took:.1f} s" if finished else f"not finished in {budget:.0f} s"
    note = "" if finished else (reason or f"{len(values)} of 4 models done")
    return f"| {name} | {done} | {took / ours:,.0f} | {gap:.1e} | {note} |"


def sampling_row(budget, truth, ours):
    name = "JAGS, product space"
    if not shutil.which("Rscript") or not shutil.which("jags"):
        return f"| {name} | – | – | – | jags and r-cran-rjags are not installed |"
    values, took, finished, reason = alternative(
        ["Rscript", "--vanilla", str(HERE / "product_space.R"), str(STUDIES), str(0.9 * budget)], budget)
    if not finished or not values:
        return f"| {name} | not finished in {budget:.0f} s | – | – | {reason} |"
    gaps = [abs(v[0] - (truth[m] - truth["fixed_null"])) for m, v in values.items() if math.isfinite(v[0])]
    errors = [v[1] for v in values.values() if math.isfinite(v[1])]
    lost = len(values) - len(gaps)
    note = f"log Bayes factors, Monte Carlo standard error {max(errors):.1e}" + (f"; {lost} never visited" if lost else "")
    return f"| {name} | {took:.1f} s (stopped) | {took / ours:,.0f} | {max(gaps):.1e} | {note} |"


def main():
    parser = argparse.ArgumentParser()
    parser.add_argument("steelyard")
    parser.add_argument("--budget", type=float, default=600)
    options = parser.parse_args()
    ours, truth, stated = steelyard(options.steelyard)
    lines = ["", "Ten invented studies, default priors, four marginal likelihoods. Difference: the largest of the natural logs",
             "from Steelyard's. Steelyard's row is the whole process, every summary and JSON included.", "",
             "| with | time | ÷ Steelyard | largest difference | |", "|---|---|---|---|---|",
             f"| Steelyard | {ours * 1000:.1f} ms | 1 | stated error {stated:.1e} | |",
             quadrature_row("SciPy, nested `quad` over `nct`", [sys.executable, str(HERE / "quadrature.py"), str(STUDIES)],
                            options.budget, truth, ours),
             quadrature_row("R, nested `integrate` over `dt(ncp)`", ["Rscript", "--vanilla", str(HERE / "quadrature.R"), str(STUDIES)],
                            options.budget, truth, ours),
             sampling_row(options.budget, truth, ours), "",
             f"One run on {cpu()}, {time.strftime('%Y-%m-%d')}; {versions()}. Again: `python3 tests/bench/alternatives/run.py",
             "path/to/steelyard` (up to half an hour).", ""]
    write(lines)


def cpu():
    for line in open("/proc/cpuinfo"):
        if line.startswith("model name"):
            return line.split(":")[1].strip()
    return platform.processor()


def versions():
    import scipy
    parts = [f"SciPy {scipy.__version__}"]
    if shutil.which("Rscript"):
        parts.append(subprocess.run(["Rscript", "--version"], capture_output=True, text=True).stdout.split(" (")[0].strip()
                     or "R")
    return ", ".join(parts)


def write(lines):
    text = DOCUMENT.read_text() if DOCUMENT.exists() else "# Performance\n"
    if START not in text:
        text = text.rstrip() + f"\n\n## What one would otherwise write\n\n{START}\n{END}\n"
    before, rest = text.split(START)
    after = rest.split(END, 1)[1]
    DOCUMENT.write_text(before + START + "\n" + "\n".join(lines) + "\n" + END + after)


if __name__ == "__main__":
    main()

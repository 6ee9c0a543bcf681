"""Writes the tables of docs/accuracy.md: the library, Boost.Math, SciPy and R at the same points.

    python3 tests/oracle/accuracy.py BUILD        (BUILD holds the built target oracle_accuracy)

Needs SciPy, and R for its column (left out with a note when R is missing).
"""

import math
import pathlib
import shutil
import statistics
import subprocess
import sys
import warnings

HERE = pathlib.Path(__file__).resolve().parent
REFERENCE = HERE.parent / "reference"
DOCUMENT = HERE.parent.parent / "docs" / "accuracy.md"


def read(name):
    lines = [line.strip() for line in open(REFERENCE / name) if line[0] != "#"]
    return [line.split(",") for line in lines[1:]]


def output(command):
    text = subprocess.run(command, check=True, capture_output=True, text=True).stdout
    notes = [line[2:].strip() for line in text.splitlines() if line.startswith("#")]
    return notes, [line.split(",") for line in text.splitlines() if not line.startswith("#")]


def numbers(texts):
    return [float(t) if t not in ("NA", "NaN", "nan", "-nan") else math.nan for t in texts]


def scipy_density(rows):
    from scipy import stats
    return [float(stats.nct.logpdf(float(r[1]), float(r[2]), float(r[3]))) for r in rows]


def scipy_band(rows):
    from scipy import stats
    result = []
    for _, low, high, df, ncp, _ in rows:
        low, high, df, ncp = map(float, (low, high, df, ncp))
        law = stats.nct(df, ncp)
        p = law.cdf(high) if math.isinf(low) else law.sf(low) if math.isinf(high) else law.cdf(high) - law.cdf(low)
        result.append(math.log(p) if p > 0 else -math.inf)
    return result


def error(value, truth):
    """Relative, absolute where the logarithm is below one."""
    return abs(value - truth) / max(1.0, abs(truth))


def row(name, values, truths):
    errors = [error(v, t) if math.isfinite(v) else math.inf for v, t in zip(values, truths)]
    none = sum(1 for e in errors if math.isinf(e))
    given = [e for e in errors if math.isfinite(e)]
    wrong = sum(1 for e in given if e > 0.01)
    good = sum(1 for e in errors if e <= 1e-12), sum(1 for e in errors if e <= 1e-8)
    worst = f"{max(given):.1e}" if given else "–"
    median = f"{statistics.median(given):.1e}" if given else "–"
    return f"| {name} | {median} | {worst} | {good[0]} | {good[1]} | {none} | {wrong} |"


HEAD = ("| | median error | worst error | within 1e-12 | within 1e-8 | no value | off by more than 1 % |\n"
        "|---|---|---|---|---|---|---|")


def compare(title, kinds, columns, truths):
    """One table over all points, and the share of points without a usable value by kind."""
    lines = [f"{title}: {len(truths)} points.", "", HEAD]
    lines += [row(name, values, truths) for name, values in columns]
    lines += ["", "No value, or one off by more than 1 %, by kind of point:", "",
              "| kind | points | " + " | ".join(name for name, _ in columns) + " |", "|---|---|" + "---|" * len(columns)]
    for kind in sorted(set(kinds)):
        at = [i for i, k in enumerate(kinds) if k == kind]
        bad = [sum(1 for i in at if not (math.isfinite(v[i]) and error(v[i], truths[i]) <= 0.01)) for _, v in columns]
        lines.append(f"| {kind} | {len(at)} | " + " | ".join(map(str, bad)) + " |")
    return lines


def distributions(program):
    lines, boost = [], "Boost"
    for what, name, promised in (("density", "noncentral_t_density.csv", lambda r: r[0] != "wide"),
                                 ("band", "noncentral_t_band.csv", lambda r: True)):
        rows = read(name)
        notes, ours = output([program, what])
        boost = notes[0] if notes else boost
        columns = [("Steelyard", numbers([o[0] for o in ours])), (boost, numbers([o[1] for o in ours]))]
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            import scipy
            columns.append((f"SciPy {scipy.__version__}", scipy_density(rows) if what == "density" else scipy_band(rows)))
        if shutil.which("Rscript"):
            version, r = output(["Rscript", "--vanilla", str(HERE / "accuracy.R"), what, str(REFERENCE / name)])
            columns.append((version[0].replace(" version", "").split(" Patched")[0].split(" (")[0],
                            numbers([line[0] for line in r])))
        else:
            lines += ["(R is not installed here: its column is missing.)", ""]
        keep = [i for i, line in enumerate(rows) if promised(line)]
        kinds, truths = [rows[i][0] for i in keep], [float(rows[i][-1]) for i in keep]
        chosen = [(n, [v[i] for i in keep]) for n, v in columns]
        lines += ["### " + ("Log density" if what == "density" else "Log probabilities of bands and tails"), ""]
        lines += compare("All points of the promised range", kinds, chosen, truths) + [""]
        # Without a logarithmic form a probability below 1e-308 is zero: no fault of accuracy.
        seen = [i for i, t in enumerate(truths) if t > -700]
        lines += [f"Only the {len(seen)} points where the probability itself fits a double:", "", HEAD]
        lines += [row(n, [v[i] for i in seen], [truths[i] for i in seen]) for n, v in chosen] + [""]
    return lines


def integrals(program):
    lines = ["### Marginal likelihoods", "",
             "True error: against the oracle; stated error: as the library reports it. Both are absolute, of natural logs.", "",
             "| table | analyses | integrals | largest true ÷ stated | median true | median stated | largest stated | says not kept |",
             "|---|---|---|---|---|---|---|---|"]
    for name, table in (("random (b)", "meta_analyses.csv"), ("small, mpmath only (c)", "small_meta_analyses.csv"),
                        ("hard shapes", "hard_shapes.csv")):
        if not (REFERENCE / table).exists():
            continue
        _, rows = output([program, "marginals", table])
        kept = [r for r in rows if r[6] == "ok"]
        true = [abs(float(r[2]) - float(r[4])) for r in kept]
        stated = [float(r[3]) for r in kept]
        ratio = max(max(0.0, t - float(r[5]) - 1.2e-16 * abs(float(r[4]))) / s for t, s, r in zip(true, stated, kept) if s > 0)
        lines.append(f"| {name} | {len({r[0] for r in rows})} | {len(rows)} | {ratio:.2g} | {statistics.median(true):.1e} | "
                     f"{statistics.median(stated):.1e} | {max(stated):.1e} | {len(rows) - len(kept)} |")
    return lines


def write(lines):
    text = DOCUMENT.read_text()
    start, end = "<!-- made by tests/oracle/accuracy.py -->", "<!-- end -->"
    before, rest = text.split(start)
    after = rest.split(end, 1)[1]
    DOCUMENT.write_text(before + start + "\n\n" + "\n".join(lines).rstrip() + "\n\n" + end + after)


def main():
    if len(sys.argv) != 2:
        sys.exit(__doc__)
    program = str(next(pathlib.Path(sys.argv[1]).rglob("oracle_accuracy")))
    write(distributions(program) + integrals(program))


if __name__ == "__main__":
    main()

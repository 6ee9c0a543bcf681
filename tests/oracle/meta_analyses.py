"""Makes tests/reference/meta_analyses.csv: six hundred random meta-analyses and their answers.

    python3 meta_analyses.py [first last]     some cases only, printed

Finished cases are kept in a folder beside the system's temporary files, so that an interrupted run
goes on where it stopped. The numbers of a case depend on its index alone.
"""

import math
import pathlib
import random
import sys
import tempfile
import time

from case import deciding, marginal_lines, posterior_lines, prior_lines, study_line
from likelihood import Band, Exact, Normal
from marginal import Effect, Spread, _mp_cdf
from table import Stopwatch, dyadic, write_lines

COUNT = 600
INF = float("inf")
KEPT = pathlib.Path(tempfile.gettempdir()) / "steelyard-oracle-cases"


def log_uniform(rng, low, high, bits=8):
    return dyadic(low * (high / low) ** rng.random(), bits)


def effect_prior(rng):
    while True:
        location = 0.0 if rng.random() < 0.6 else dyadic(rng.uniform(-3, 3), 8)
        width = log_uniform(rng, 0.01, 100)
        name = rng.choice(["cauchy", "cauchy", "normal", "student-t", "uniform"])
        family = {"cauchy": ("cauchy", location, width), "normal": ("normal", location, width),
                  "student-t": ("student-t", location, width, rng.choice([0.5, 1.5, 3.0, 4.0, 7.0, 30.0])),
                  "uniform": ("uniform", location - width, location + width)}[name]
        direction = rng.choice(["either", "either", "either", "greater", "less"])
        if direction != "either":
            if name == "uniform":
                kept = family[2] if direction == "greater" else -family[1]
                if kept < width / 8:
                    continue
            elif _mp_cdf(family, 0, direction == "greater") < 1e-200:
                continue
        return Effect(family, direction)


def spread_prior(rng):
    scale = log_uniform(rng, 0.01, 100)
    low = rng.choice([0.0, 0.0, dyadic(scale / 4, 8)])
    return Spread(rng.choice([
        ("half-cauchy", scale), ("half-normal", scale), ("half-student-t", scale, rng.choice([2.0, 3.0, 4.0, 10.0])),
        ("inverse-gamma", rng.choice([0.5, 1.0, 1.0, 2.0, 3.0]), scale), ("inverse-gamma", 1.0, 0.15),
        ("log-normal", dyadic(math.log(scale), 8), rng.choice([0.25, 0.5, 1.0, 2.0])), ("exponential", scale),
        ("uniform", low, low + scale)]))


def count(rng):
    low, high = rng.choices([(1, 3), (4, 10), (11, 25), (26, 60)], [25, 42, 22, 11])[0]
    return rng.randint(low, high)


def studies(rng):
    k = count(rng)
    mix = rng.choices(["exact", "folded", "band", "normal"], [62, 13, 12, 13])[0]
    if mix == "band":
        k = min(k, 8)
    smallest = log_uniform(rng, 2, 2000)
    largest = min(1e5, smallest * log_uniform(rng, 1, 1000))
    mean, spread = rng.choice([0.0, 0.1, 0.3, 0.5, 0.8, 1.5, 5 * rng.random()]), rng.choice([0, 0, 0.1, 0.3, 1, 2])
    result = []
    for _ in range(k):
        size = max(2, round(smallest * (largest / smallest) ** rng.random()))
        if rng.random() < 0.6:
            df, n = 2.0 * size - 2, size / 2
        else:
            df, n = float(size - 1), float(size)
        own = mean + spread * rng.gauss(0, 1)
        t = (own * n**0.5 + rng.gauss(0, 1)) / (rng.gammavariate(df / 2, 2) / df) ** 0.5
        t = dyadic(t, 14)
        special = rng.random() < 0.4
        if mix == "band" and special:
            c = dyadic(1.96 + 2.5 / df, 10)
            result.append(Band(rng.choice([[(c, INF)], [(-INF, -c), (c, INF)], [(-c, c)], [(-INF, 1.0)],
                                           [(t, t + 0.0625)]]), df, n))
        elif mix == "normal" and (special or k > 12):
            se = dyadic(n**-0.5, 10)
            folded = rng.random() < 0.15
            estimate = dyadic(own + se * rng.gauss(0, 1), 12)
            result.append(Normal(abs(estimate) if folded else estimate, se, folded))
        else:
            folded = mix == "folded" and special
            result.append(Exact(abs(t) if folded else t, df, n, folded))
    return result


def case(index):
    rng = random.Random(1000003 * index + 17)
    effect, spread, rows = effect_prior(rng), spread_prior(rng), studies(rng)
    lines = [["case", str(index)], *prior_lines(effect, spread), *[study_line(s) for s in rows]]
    lines += marginal_lines(rows, effect, spread, second=len(rows) <= 8 or index % 4 == 0)
    if index % 8 == 0 and 3 <= len(rows) <= 15 and deciding(rows) >= 3:
        own = [0, len(rows) - 1] if index % 64 == 0 and len(rows) <= 8 and isinstance(rows[0], Exact) else []
        own = [i for i in own if not isinstance(rows[i], Band) and not rows[i].folded]
        lines += posterior_lines(rows, effect, spread, own)
    return lines


def kept(index):
    path = KEPT / f"{index:04d}.csv"
    if not path.exists():
        start = time.process_time()
        text = "".join(",".join(line) + "\n" for line in case(index))
        took = time.process_time() - start
        part = path.with_suffix(f".part{random.random()}")
        part.write_text(f"# {took:.2f}\n{text}")
        part.rename(path)
    return path.read_text()


def main():
    KEPT.mkdir(exist_ok=True)
    first, last = (int(a) for a in sys.argv[1:3]) if len(sys.argv) > 2 else (0, COUNT)
    clock, seconds, body = Stopwatch(), 0.0, []
    for index in range(first, last):
        try:
            head, text = kept(index).split("\n", 1)
        except ArithmeticError as error:
            print(index, error, flush=True)
            continue
        seconds += float(head[2:])
        body.append(text)
    if (first, last) == (0, COUNT):
        header = clock.header([
            f"{COUNT} random meta-analyses: k 1 to 60, n 2 to 1e5, effects 0 to 5, spread 0 to 2, priors of every",
            "family, direction and widths 0.01 to 100, some in conflict with the data. Natural logs.",
            "Adaptive Gauss-Legendre cubature in 80-bit arithmetic (tests/oracle/marginal.py); the last number of a",
            "marginal is how far the same integral with another rule and other nodes is off.",
            f"Processor time of all cases: {seconds:.0f} s.",
        ])
        write_lines("meta_analyses.csv", header, body)


if __name__ == "__main__":
    main()

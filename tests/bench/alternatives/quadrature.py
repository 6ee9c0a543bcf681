"""The four log marginal likelihoods with SciPy's parts: nested adaptive quadrature over its noncentral t.

    python3 quadrature.py STUDIES.csv     prints one line a model: id, natural log, seconds
"""

import csv
import math
import sys
import time
import warnings

from scipy import integrate, stats

SCALE = 1 / math.sqrt(2)


def read(path):
    rows = []
    for row in csv.DictReader(open(path)):
        n1, n2 = float(row["n1"]), float(row["n2"])
        rows.append((float(row["t"]), n1 + n2 - 2, n1 * n2 / (n1 + n2)))
    return rows


def likelihood(rows, mean, spread):
    total = 1.0
    for t, df, n in rows:
        s = math.sqrt(1 + n * spread * spread)
        total *= stats.nct.pdf(t / s, df, mean * math.sqrt(n) / s) / s
    return total


def spread_prior(spread):
    return stats.invgamma.pdf(spread, 1, scale=0.15)


def over_mean(rows, spread):
    # Split where the data are, or the adaptive rule walks past the peak.
    f = lambda mean: stats.cauchy.pdf(mean, 0, SCALE) * likelihood(rows, mean, spread)
    cuts = [-math.inf, -1.0, 0.0, 0.5, 1.0, 2.0, math.inf]
    return sum(integrate.quad(f, a, b, epsabs=0, epsrel=1e-8, limit=200)[0] for a, b in zip(cuts, cuts[1:]))


def over_spread(f):
    cuts = [0.0, 0.1, 0.3, 1.0, 3.0, math.inf]
    return sum(integrate.quad(lambda s: spread_prior(s) * f(s), a, b, epsabs=0, epsrel=1e-8, limit=200)[0]
               for a, b in zip(cuts, cuts[1:]))


def main():
    warnings.simplefilter("ignore")
    rows = read(sys.argv[1])
    for name, work in (("fixed_null", lambda: likelihood(rows, 0.0, 0.0)),
                       ("fixed_effect", lambda: over_mean(rows, 0.0)),
                       ("random_null", lambda: over_spread(lambda s: likelihood(rows, 0.0, s))),
                       ("random_effect", lambda: over_spread(lambda s: over_mean(rows, s)))):
        start = time.time()
        value = math.log(work())
        print(f"{name},{value:.12f},{time.time() - start:.3f}", flush=True)


if __name__ == "__main__":
    main()

"""Makes tests/reference/noncentral_t_density.csv: log f(t; df, ncp) to fifty digits where it hurts."""

import random

from mpmath import mp, mpf

import noncentral_t as nct
from table import Stopwatch, digits, dyadic, exact, write

DF = [1, 1.5, 2, 2.5, 3, 5, 8, 10, 20, 31.5, 100, 1000, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9]
HARD_DF = [1, 1.5, 2, 1e6, 1e9]


def log_uniform(rng, low, high):
    return dyadic(low * (high / low) ** rng.random())


def points():
    """(kind, t, df, ncp), all exactly representable in binary."""
    rng = random.Random(20240229)
    for df in HARD_DF:  # t and ncp of opposite sign: the left tail
        for t in [2.0**-10, 0.125, 0.5, 1.5, 3, 8, 30, 100, 1000, 10000]:
            for ncp in [2.0**-8, 0.25, 1, 2.5, 6, 20, 37.5, 100, 400, 1000]:
                sign = rng.choice([-1, 1])
                yield "opposite", sign * t, df, -sign * ncp
    for df in DF:
        for t in [2.0**-30, 2.0**-10, 0.125, 0.75, 1, 1.96875, 2.5, 4, 10, 40, 250, 1000, 5000, 10000]:
            yield "central", rng.choice([-1, 1]) * t, df, 0.0
        for ncp in [2.0**-30, 2.0**-10, 0.125, 0.75, 1, 1.96875, 2.5, 4, 10, 40, 250, 600, 900, 1000]:
            yield "zero_t", 0.0, df, rng.choice([-1, 1]) * ncp
        yield "central", 0.0, df, 0.0
        for ncp in [2.0**-20, 0.5, 2, 7, 25, 80, 250, 500, 800, 1000]:
            yield "far_t", 10000.0, df, ncp
            yield "far_t", -10000.0, df, ncp
    for _ in range(700):  # near the mode, where log f is small and its absolute error counts
        df = dyadic(10 ** (9 * rng.random())) if rng.random() < 0.7 else rng.choice(HARD_DF)
        ncp = rng.choice([-1, 1]) * log_uniform(rng, 2**-6, 1000)
        spread = (1 + ncp * ncp / (2 * df)) ** 0.5
        yield "near_mode", dyadic(ncp + rng.gauss(0, 1.5) * spread, 14), df, ncp
    for _ in range(1000):
        df = dyadic(10 ** (9 * rng.random()))
        yield ("scattered", rng.choice([-1, 1]) * log_uniform(rng, 2**-10, 1e4), max(df, 1.0),
               rng.choice([-1, 1]) * log_uniform(rng, 2**-10, 1e3))
    for _ in range(200):  # small df, where no large-df expansion helps
        df = 1 + dyadic(4 * rng.random(), 6)
        yield ("small_df", rng.choice([-1, 1]) * log_uniform(rng, 2**-6, 1e3), df,
               rng.choice([-1, 1]) * log_uniform(rng, 2**-6, 1e2))
    for _ in range(300):  # beyond the promised accuracy: finite, with a stated error
        df = max(1.0, dyadic(10 ** (9 * rng.random()))) if rng.random() < 0.7 else rng.choice(HARD_DF)
        yield ("wide", rng.choice([-1, 1]) * log_uniform(rng, 2**-6, 1e6), df,
               rng.choice([-1, 1]) * log_uniform(rng, 1e3, 1e6))


def check(t, df, ncp, value):
    """Two more ways to the same number, where they are cheap enough."""
    y = ncp * t / (df + t * t) ** 0.5
    if abs(ncp) < 60 and df < 2000 and abs(y) > 2.0**-9:
        for other in (nct.log_density_by_series, nct.log_density_by_hypergeometric):
            if abs(other(t, df, ncp) - value) > mpf(10) ** -50 * max(1, abs(value)):
                raise ArithmeticError(f"{other.__name__} disagrees at t={t}, df={df}, ncp={ncp}")
        return 1
    return 0


def main():
    mp.dps = 60
    clock = Stopwatch()
    rows, checked, seen = [], 0, set()
    for kind, t, df, ncp in points():
        key = (t, df, ncp)
        if key in seen:
            continue
        seen.add(key)
        value = nct.log_density(t, df, ncp)
        if len(rows) % 4 == 0:
            checked += check(t, df, ncp, value)
        rows.append([kind, exact(t), exact(df), exact(ncp), digits(value, 50)])
    header = clock.header([
        "Log density of the noncentral t distribution, 50 digits, at inputs that are exact in binary.",
        "Integral over the chi-distributed scale by the trapezoid rule in its logarithm, step halved until settled;",
        f"{checked} of the points also by power series and by the parabolic cylinder function, agreeing to 50 digits.",
        "kind wide: |ncp| > 1000 or |t| > 10000, beyond the promised accuracy.",
    ])
    write("noncentral_t_density.csv", header, ["kind", "t", "df", "ncp", "log_density"], rows)


if __name__ == "__main__":
    main()

"""Makes tests/reference/noncentral_t_band.csv: log P(low < T <= high) to thirty digits."""

import random

from mpmath import mp, mpf

import noncentral_t as nct
from table import Stopwatch, digits, dyadic, exact, write

INF = float("inf")
DF = [1, 1.5, 2, 3, 8, 20, 31.5, 100, 1000, 1e5, 1e6, 1e9]


def log_uniform(rng, low, high):
    return dyadic(low * (high / low) ** rng.random())


def any_df(rng):
    return rng.choice(DF) if rng.random() < 0.4 else max(1.0, dyadic(10 ** (9 * rng.random())))


def signed(rng, low, high):
    return rng.choice([-1, 1]) * log_uniform(rng, low, high)


def near(rng, df, ncp, deviations):
    """A t some standard deviations from the middle of the distribution."""
    return dyadic(ncp + rng.gauss(0, deviations) * (1 + ncp * ncp / (2 * df)) ** 0.5, 14)


def points():
    """(kind, low, high, df, ncp), all exactly representable in binary."""
    rng = random.Random(19910725)
    for df in DF:
        for t in [0.0, 2.0**-10, 0.5, 2, 6, 40, 1000, 10000]:
            for ncp in [0.0, 0.25, 3, 40, 1000]:
                sign = rng.choice([-1, 1])
                low, high = rng.choice([(sign * t, INF), (-INF, sign * t)])
                yield "tail", low, high, df, ncp
    for _ in range(500):
        df, ncp = any_df(rng), signed(rng, 2**-6, 1e3)
        t = near(rng, df, ncp, 3)
        yield ("tail", t, INF, df, ncp) if rng.random() < 0.5 else ("tail", -INF, t, df, ncp)
    for _ in range(300):
        t = signed(rng, 2**-6, 1e4)
        low, high = rng.choice([(t, INF), (-INF, t)])
        yield "far_tail", low, high, any_df(rng), signed(rng, 2**-6, 1e3)
    for _ in range(500):  # not significant: |T| < c; also one-sided thresholds like t < 1
        df, ncp = any_df(rng), signed(rng, 2**-6, 60)
        c = dyadic(1 + 3 * rng.random())
        yield "inside", rng.choice([-c, 0.0, -1.0]), c, df, ncp
    for _ in range(500):  # a printed t known to its rounding
        df, ncp = any_df(rng), signed(rng, 2**-6, 300)
        t = near(rng, df, ncp, 3)
        width = 2.0 ** -rng.randint(3, 14)
        yield "narrow", t, t + width, df, ncp
    for _ in range(300):  # bands deep in a tail
        df, ncp = any_df(rng), signed(rng, 2**-6, 200)
        t = dyadic(ncp + rng.choice([-1, 1]) * (8 + 40 * rng.random()))
        yield "far_band", t, t + dyadic(3 * rng.random() + 0.01), df, ncp


def value(low, high, df, ncp):
    """log P, by the complement where the probability is nearly one."""
    if low == -INF or high == INF:
        upper = high == INF
        t = low if upper else high
        direct = nct.log_tail(t, df, ncp, upper, 30)
        if direct > mpf(-0.5):
            return mp.log1p(-mp.exp(nct.log_tail(t, df, ncp, not upper, 30)))
        return direct
    direct = nct.log_band(low, high, df, ncp, 30)
    if direct > mpf(-0.5):
        outside = (mp.exp(nct.log_tail(low, df, ncp, False, 30)) + mp.exp(nct.log_tail(high, df, ncp, True, 30)))
        return mp.log1p(-outside)
    return direct


def main():
    mp.dps = 60
    clock = Stopwatch()
    rows, seen = [], set()
    for kind, low, high, df, ncp in points():
        if (low, high, df, ncp) in seen or not low < high:
            continue
        seen.add((low, high, df, ncp))
        log_p = value(low, high, df, ncp)
        rows.append([kind, exact(low), exact(high), exact(df), exact(ncp), digits(log_p, 30)])
    header = clock.header([
        "Log probability that a noncentral t lies in (low, high], 30 digits, at inputs that are exact in binary.",
        "Integral over the chi-distributed scale by the trapezoid rule in its logarithm, step halved until settled;",
        "bands as differences of the smaller tails at 60 digits; near one, by the complement.",
    ])
    write("noncentral_t_band.csv", header, ["kind", "low", "high", "df", "ncp", "log_probability"], rows)


if __name__ == "__main__":
    main()

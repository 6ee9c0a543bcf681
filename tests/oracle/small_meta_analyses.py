"""Makes tests/reference/small_meta_analyses.csv: thirty meta-analyses of up to four studies, in mpmath only.

Every density is computed from its definition (noncentral_t.py), every integral by double-exponential
substitutions and the trapezoid rule in thirty-digit arithmetic, with the step halved until the
logarithm of the integral settles: no table, no 80-bit number, no other cubature.
"""

import random
import sys
import time

from mpmath import mp, mpf

from noncentral_t import log_density, log_density_by_hypergeometric
from table import Stopwatch, digits, dyadic, exact, write_lines

COUNT = 30
DIGITS = 22


class Study:
    """log f(t / s; df, mean sqrt(n) / s) - log s."""

    def __init__(self, t, df, n):
        self.t, self.df, self.n = mpf(t), mpf(df), mpf(n)
        nu = self.df
        self.constant = (nu / 2 * mp.log(nu) - mp.log(mp.pi) / 2 - mp.loggamma(nu / 2) - (nu - 1) / 2 * mp.log(2)
                         + mp.loggamma(nu + 1))
        with mp.workdps(150):
            self.even = mp.power(2, (nu - 1) / 2) * mp.gamma((nu + 1) / 2) / mp.gamma(nu + 1)
            self.odd = mp.power(2, nu / 2) * mp.gamma(nu / 2 + 1) / mp.gamma(nu + 1)

    def at(self, spread):
        """What depends on the spread alone."""
        s = mp.sqrt(1 + self.n * spread * spread)
        t = self.t / s
        return mp.sqrt(self.n) / s, t / mp.sqrt(self.df + t * t), (
            self.constant - mp.log(s) - (self.df + 1) / 2 * mp.log(self.df + t * t))

    def log(self, mean, scaled):
        per_mean, ratio, fixed = scaled
        ncp = mean * per_mean
        y = ncp * ratio
        if abs(ncp) > 90:  # nothing is left of the integrand there
            return fixed - ncp * ncp / 2 + (y * y / 2 if y > 0 else 0)
        return fixed - ncp * ncp / 2 + self.log_integral(y)

    def log_integral(self, y):
        """log int w^df exp(-w^2/2 + y w) dw / gamma(df + 1): power series, or parabolic cylinder function."""
        if y < -1 and y * y / 2 - y * mp.sqrt(self.df) > 60:
            return y * y / 4 + mp.log(mp.pcfd(-self.df - 1, -y))
        spare = 0 if y > 0 else int((y * y / 2 - 2 * y * mp.sqrt(self.df + 1)) / 2.3) + 5
        with mp.workdps(DIGITS + spare):
            even, odd = self.even, self.odd * y
            total, j, y2 = even + odd, 0, y * y
            small = mpf(10) ** (-(DIGITS + spare))
            while abs(even) + abs(odd) > small * abs(total) or j * j < y2:
                even *= y2 * (self.df + j + 1) / ((j + 1) * (j + 2))
                odd *= y2 * (self.df + j + 2) / ((j + 2) * (j + 3))
                total += even + odd
                j += 2
            return mp.log(total)


def log_effect(family, direction):
    name, a, b = family
    a, b = mpf(a), mpf(b)
    z0 = -a / b
    if name == "cauchy":
        kept = 1 if direction == "either" else mp.atan2(1, z0 if direction == "greater" else -z0) / mp.pi
        norm = -mp.log(mp.pi * b * kept)
        return lambda x: norm - mp.log1p(((x - a) / b) ** 2)
    kept = 1 if direction == "either" else mp.erfc((z0 if direction == "greater" else -z0) / mp.sqrt(2)) / 2
    norm = -mp.log(2 * mp.pi) / 2 - mp.log(b) - mp.log(kept)
    return lambda x: norm - ((x - a) / b) ** 2 / 2


def log_spread(family):
    name, *p = family
    p = [mpf(x) for x in p]
    if name == "half-cauchy":
        return lambda x: mp.log(2 / (mp.pi * p[0])) - mp.log1p((x / p[0]) ** 2)
    if name == "half-normal":
        return lambda x: mp.log(2 / (mp.sqrt(2 * mp.pi) * p[0])) - (x / p[0]) ** 2 / 2
    if name == "inverse-gamma":
        return lambda x: p[0] * mp.log(p[1]) - mp.loggamma(p[0]) - (p[0] + 1) * mp.log(x) - p[1] / x
    return lambda x: -mp.log(p[0]) - x / p[0]  # exponential


def settle(total, first, times=5):
    """log of total(h), h halved until two agree to nine digits: the last is right to about twice as many."""
    h, last = first, total(first)
    for _ in range(times):
        h /= 2
        new = total(h)
        if abs(new - last) < mpf(10) ** -9:
            return new
        last = new
    raise ArithmeticError("the double-exponential rule did not settle")


def sum_logs(log_term, h, start):
    """log of h sum exp(log_term(j h + start)) over all integers j; both arms end when nothing is added."""
    top, total = mp.ninf, mpf(0)
    for direction in (1, -1):
        j, idle = (0 if direction == 1 else -1), 0
        while idle < 3:
            value = log_term(start + j * h)
            if value > top:
                total = total * mp.exp(top - value) + 1 if top != mp.ninf else mpf(1)
                top, idle = value, 0
            else:
                total += mp.exp(value - top)
                idle = idle + 1 if value < top - 42 else 0
            j += direction
    return top + mp.log(total * h)


class Analysis:
    def __init__(self, studies, effect, direction, spread):
        self.studies = [Study(*s) for s in studies]
        self.effect, self.direction, self.spread = log_effect(effect, direction), direction, log_spread(spread)
        self.center = sum(s.t * mp.sqrt(s.n) for s in self.studies) / sum(s.n for s in self.studies)
        self.width = 1 / mp.sqrt(sum(s.n for s in self.studies))

    def place(self, u):
        """mean(u) and log of its derivative: sinh about the data, or exp for one direction."""
        if self.direction == "either":
            return self.center + self.width * mp.sinh(u), mp.log(self.width * mp.cosh(u))
        x = mp.exp(u - mp.exp(-u))
        return (x if self.direction == "greater" else -x), mp.log(x * (1 + mp.exp(-u)))

    def start(self):
        return mpf(0) if self.direction == "either" else mp.log(max(abs(self.center), self.width))

    def log_row(self, spread, h):
        scaled = [s.at(spread) for s in self.studies]

        def log_term(u):
            mean, log_slope = self.place(u)
            return self.effect(mean) + log_slope + sum(s.log(mean, c) for s, c in zip(self.studies, scaled))

        return sum_logs(log_term, h, self.start())

    def log_null(self, spread):
        return sum(s.log(mpf(0), s.at(spread)) for s in self.studies)

    def over_spread(self, log_row, h):
        def log_term(u):
            spread = mp.exp(u - mp.exp(-u))
            return self.spread(spread) + mp.log(spread * (1 + mp.exp(-u))) + log_row(spread)

        return sum_logs(log_term, h, mpf(0))

    def marginals(self):
        yield "fixed_null", self.log_null(mpf(0))
        yield "fixed_effect", settle(lambda h: self.log_row(mpf(0), h), mpf(1) / 2)
        if len(self.studies) > 1:
            yield "random_null", settle(lambda h: self.over_spread(self.log_null, h), mpf(1) / 2)
            yield "random_effect", settle(lambda h: self.over_spread(lambda s: self.log_row(s, h), h), mpf(1) / 2)


def make(index):
    rng = random.Random(7919 * index + 3)
    k = (1, 2, 2, 3, 3, 4)[index % 6]
    mean, spread = rng.choice([0.0, 0.3, 0.8, 2.0]), rng.choice([0.0, 0.2, 1.0])
    studies = []
    for _ in range(k):
        per_group = rng.choice([2, 3, 5, 10, 15, 25, 40])
        df, n = rng.choice([(2.0 * per_group - 2, per_group / 2), (per_group - 1.0, float(per_group))])
        t = (mean + spread * rng.gauss(0, 1)) * n**0.5 + rng.gauss(0, 1)
        studies.append((dyadic(t, 10), df, n))
    effect = rng.choice([("cauchy", 0.0, 0.7071067811865476), ("normal", 0.25, 0.5), ("cauchy", -1.0, 0.125),
                         ("normal", 0.0, 8.0)])
    direction = ("either", "either", "greater", "either", "less")[index % 5]
    spread = rng.choice([("inverse-gamma", 1.0, 0.15), ("half-cauchy", 0.5), ("half-normal", 2.0), ("exponential", 0.25)])
    return studies, effect, direction, spread


def block(index):
    studies, effect, direction, spread = make(index)
    lines = [["case", f"small-{index}"], ["effect", effect[0], *map(exact, effect[1:]), direction],
             ["spread", spread[0], *map(exact, spread[1:])]]
    lines += [["study", "exact_t", *map(exact, s)] for s in studies]
    for model, value in Analysis(studies, effect, direction, spread).marginals():
        lines.append(["marginal", model, digits(value, 20), "1e-15" if model == "fixed_null" else "1e-13"])
    return "".join(",".join(line) + "\n" for line in lines)


def main():
    mp.dps = DIGITS
    clock, blocks = Stopwatch(), []
    # The parabolic cylinder function is checked against the definition first.
    for t, df, ncp in [(2, 8, 1), (-2, 8, 3), (1, 1, -5), (0.5, 78, 6)]:
        gap = log_density(t, df, ncp, 30) - log_density_by_hypergeometric(t, df, ncp, 30)
        assert abs(gap) < mpf(10) ** -18, gap
    for index in range(COUNT):
        start = time.process_time()
        blocks.append(block(index))
        print(f"{index}: {time.process_time() - start:.1f} s", flush=True)
        if "--show" in sys.argv:
            print(blocks[-1])
    header = clock.header([
        "Thirty meta-analyses of up to four studies, end to end in mpmath with 22 digits. Natural logs.",
        "Densities by the parabolic cylinder function, integrals by double-exponential rules.",
    ])
    write_lines("small_meta_analyses.csv", header, blocks)


if __name__ == "__main__":
    main()

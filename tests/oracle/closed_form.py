"""Makes tests/reference/closed_form.csv: log L(mean, spread) with the study's own effect integrated out.

The library uses closed forms (the noncentral t of scaled arguments). Here the integral over the
study's own effect,  L = int Normal(d; mean, spread^2) P(what was printed | d) dd,  is done node by
node with the likelihood from its definition, to thirty digits (bands: twenty).
"""

import random

from mpmath import mp, mpf

import noncentral_t as nct
from table import Stopwatch, digits, dyadic, exact, write

INF = float("inf")


def log_normal_density(x, mean, sd):
    return -((x - mean) / sd) ** 2 / 2 - mp.log(sd) - mp.log(2 * mp.pi) / 2


def integrate(log_integrand, low, high, width, wanted):
    """log int exp(g(d)) dd of a log-concave g(d, digits) whose mode lies between low and high."""
    mode = nct.mode_of(lambda d: log_integrand(d, 12), low, high, width / 1000)
    top = log_integrand(mode, wanted)
    step = width / 1000
    bend = -(log_integrand(mode + step, 20) + log_integrand(mode - step, 20) - 2 * log_integrand(mode, 20)) / step**2
    if not bend > 0:
        raise ArithmeticError("the integrand is not concave at its mode")
    integral = nct.trapezoid(lambda d: mp.exp(log_integrand(d, wanted) - top), mode, 1 / mp.sqrt(bend), wanted)
    return top + mp.log(integral)


def exact_t(t, df, n, mean, spread, wanted=24):
    """One signed t value."""
    root = mp.sqrt(mpf(n))
    if spread == 0:
        return nct.log_density(t, df, root * mean, 35)

    def log_integrand(d, count):
        return log_normal_density(d, mean, spread) + nct.log_density(t, df, d * root, count)

    low, high = sorted([mpf(mean), mpf(t) / root])
    width = 1 / mp.sqrt(1 / mpf(spread) ** 2 + n / (1 + mpf(t) ** 2 / df))
    return integrate(log_integrand, low - width, high + width, width, wanted)


def band_t(low, high, df, n, mean, spread, wanted=16):
    """P(low < T <= high), each node of the own effect an integral over the chi-distributed scale."""
    root = mp.sqrt(mpf(n))

    def log_integrand(d, count):
        return log_normal_density(d, mean, spread) + nct.log_band(low, high, df, d * root, max(count - 6, 6))

    ends = [mpf(e) / root for e in (low, high) if abs(e) != INF]
    low_d, high_d = min([mpf(mean), *ends]), max([mpf(mean), *ends])
    width = min(mpf(spread), 1 / root)
    return integrate(log_integrand, low_d - width, high_d + width, width, wanted)


def normal(estimate, se, mean, spread, wanted=30):
    if spread == 0:
        return log_normal_density(mpf(estimate), mean, mpf(se))

    def log_integrand(d, _):
        return log_normal_density(d, mean, spread) + log_normal_density(mpf(estimate), d, mpf(se))

    low, high = sorted([mpf(mean), mpf(estimate)])
    return integrate(log_integrand, low - spread, high + spread, mpf(min(spread, se)), wanted)


def fold(one, other):
    return max(one, other) + mp.log1p(mp.exp(-abs(one - other)))


def study(rng):
    """(t, df, n): small and large studies, effects from 0 to 5, and their noise."""
    per_group = max(2, round(2 * 5e4 ** rng.random()))
    if rng.random() < 0.5:
        df, n = 2.0 * per_group - 2, per_group / 2
    else:
        df, n = float(per_group - 1), float(per_group)
    if rng.random() < 0.1:
        df = rng.choice([1.0, 1.5, 2.0, 2.5])
    effect = rng.choice([0.0, 0.2, 0.5, 1, 2, 5]) * rng.choice([-1, 1])
    return dyadic(effect * n**0.5 + rng.gauss(0, 1), 14), df, n


def place(rng):
    """(mean, spread) anywhere a prior might look, half of them far from the data."""
    mean = rng.choice([-1, 1]) * dyadic(2**-7 * 1500 ** rng.random()) if rng.random() < 0.95 else 0.0
    spread = dyadic(2**-8 * 3000 ** rng.random()) if rng.random() < 0.95 else 0.0
    return mean, spread


def rows():
    rng = random.Random(5)
    for _ in range(1300):
        t, df, n = study(rng)
        mean, spread = place(rng)
        yield ["exact", exact(t), exact(df), exact(n), "", "", exact(mean), exact(spread),
               digits(exact_t(t, df, n, mean, spread), 30)]
    for _ in range(350):
        t, df, n = study(rng)
        mean, spread = place(rng)
        value = fold(exact_t(t, df, n, mean, spread), exact_t(-t, df, n, mean, spread))
        yield ["folded", exact(abs(t)), exact(df), exact(n), "", "", exact(mean), exact(spread), digits(value, 30)]
    for _ in range(250):
        estimate, se = dyadic(rng.gauss(0, 3)), dyadic(2**-8 * 1000 ** rng.random())
        mean, spread = place(rng)
        value = normal(estimate, se, mean, spread)
        kind = "normal"
        if rng.random() < 0.3:
            kind, estimate = "folded_normal", abs(estimate)
            value = fold(normal(estimate, se, mean, spread), normal(-estimate, se, mean, spread))
        yield [kind, exact(estimate), exact(se), "", "", "", exact(mean), exact(spread), digits(value, 30)]
    for _ in range(100):
        per_group = max(2, round(2 * 100 ** rng.random()))
        df, n = 2.0 * per_group - 2, per_group / 2
        c = dyadic(1 + 2 * rng.random())
        low, high = rng.choice([(c, INF), (-INF, -c), (-c, c), (c, c + 0.125), (-1.0, c)])
        mean, spread = dyadic(rng.gauss(0, 0.7)), dyadic(2**-6 * 100 ** rng.random())
        yield ["band", "", exact(df), exact(n), exact(low), exact(high), exact(mean), exact(spread),
               digits(band_t(low, high, df, n, mean, spread), 20)]


def main():
    mp.dps = 50
    clock = Stopwatch()
    made = list(rows())
    header = clock.header([
        "Log likelihood of one study at a mean and a spread, its own effect integrated out explicitly.",
        "Thirty digits (bands twenty): trapezoid rule over the own effect, each node from the definition.",
        "kind exact, folded: t, df, effective n; normal, folded_normal: estimate and se in the columns t and df;",
        "band: df, n, low, high.",
    ])
    write("closed_form.csv", header, ["kind", "t", "df", "n", "low", "high", "mean", "spread", "log_likelihood"],
          made)


if __name__ == "__main__":
    main()

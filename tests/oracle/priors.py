"""Makes tests/reference/priors.csv: log density, P(X <= x) and P(X > x) of every prior family, cut or not.

Each family is written down from its density alone; masses and probabilities are numerical integrals of
that density (mpmath's tanh-sinh and Gauss-Legendre rules on pieces), so no distribution function and no
normalizing constant of the cut is shared with the library.
"""

from mpmath import mp, mpf

from table import Stopwatch, digits, exact, write

INF = mp.inf


def cauchy(location, scale):
    return lambda x: 1 / (mp.pi * scale * (1 + ((x - location) / scale) ** 2))


def normal(mean, sd):
    return lambda x: mp.exp(-((x - mean) / sd) ** 2 / 2) / (sd * mp.sqrt(2 * mp.pi))


def student_t(location, scale, df):
    constant = mp.gamma((df + 1) / 2) / (mp.gamma(df / 2) * mp.sqrt(df * mp.pi) * scale)
    return lambda x: constant * (1 + ((x - location) / scale) ** 2 / df) ** (-(df + 1) / 2)


def uniform(low, high):
    return lambda x: 1 / (high - low) if low <= x <= high else mpf(0)


def doubled(density):
    return lambda x: 2 * density(x)


def inverse_gamma(shape, scale):
    return lambda x: scale**shape / mp.gamma(shape) * x ** (-shape - 1) * mp.exp(-scale / x)


def log_normal(log_mean, log_sd):
    return lambda x: normal(log_mean, log_sd)(mp.log(x)) / x


def exponential(mean):
    return lambda x: mp.exp(-x / mean) / mean


EFFECTS = [
    ("cauchy", cauchy, [(0, 0.75), (0.5, 0.125), (-3, 0.25)]),
    ("normal", normal, [(0, 1), (0.25, 0.5), (-2, 0.5), (-5, 0.125)]),
    ("student-t", student_t, [(0.375, 0.125, 3), (-1, 0.5, 2.5), (0, 1, 1000), (0, 1, 0.75), (-4, 0.25, 40)]),
    ("uniform", uniform, [(-1, 2)]),
]
SPREADS = [
    ("half-cauchy", lambda s: doubled(cauchy(0, s)), [(0.5,), (2.0**-20,)]),
    ("half-normal", lambda s: doubled(normal(0, s)), [(0.5,)]),
    ("half-student-t", lambda s, df: doubled(student_t(0, s, df)), [(0.5, 4), (0.25, 1.5)]),
    ("inverse-gamma", inverse_gamma, [(1, 0.15625), (1.75, 0.75), (0.25, 2)]),
    ("log-normal", log_normal, [(-1.25, 0.875), (-2, 3)]),
    ("exponential", exponential, [(0.25,)]),
    ("uniform", uniform, [(0, 1), (0.25, 0.75)]),
]


def piece(function, points):
    """Quadrature whose tolerance is relative: mpmath's is absolute, and tails are tiny."""
    top = max(function(a + (b - a) * k / 8) for a, b in zip(points, points[1:]) for k in range(1, 8))
    return top * mp.quad(lambda x: function(x) / top, points) if top > 0 else mpf(0)


def integral(density, low, high, landmarks):
    """Integral of the density over pieces between landmarks; open ends in x = edge +- e^u - 1."""
    points = sorted({low, high, *[p for p in landmarks if low < p < high]} - {INF, -INF})
    if not points:
        points = [mpf(0)]
    total = mpf(0)
    for a, b in zip(points, points[1:]):
        total += piece(density, [a, b])
    if high == INF:
        edge = points[-1]
        total += piece(lambda u: density(edge + mp.expm1(u)) * mp.exp(u), [mpf(0), 1, 2, 4, 8, 16, 32, 64, 128, 256])
    if low == -INF:
        edge = points[0]
        total += piece(lambda u: density(edge - mp.expm1(u)) * mp.exp(u), [mpf(0), 1, 2, 4, 8, 16, 32, 64, 128, 256])
    return total


def landmarks(center, scale, edge):
    steps = [0, 0.25, 0.5, 1, 1.5, *range(2, 50), 80, 300, 3000]
    marks = [center + s * k * scale for k in steps for s in (-1, 1)]
    # After a cut the density may fall much faster than its scale says.
    return [mpf(m) for m in marks] + [mpf(edge) + mpf(2) ** -k for k in range(-6, 30)]


def rows():
    for name, family, parameter_sets in EFFECTS:
        for parameters in parameter_sets:
            density = family(*map(mpf, parameters))
            center, scale = (parameters[0], parameters[1]) if name != "uniform" else (0.5, 0.5)
            for direction in ("either", "greater", "less"):
                low = mpf(0) if direction == "greater" else -INF
                high = mpf(0) if direction == "less" else INF
                if name == "uniform":
                    low, high = max(low, mpf(parameters[0])), min(high, mpf(parameters[1]))
                marks = landmarks(center, scale, 0)
                mass = integral(density, low, high, marks)
                places = [-30.0, -2.5, -0.625, -(2.0**-14), 0.0, 2.0**-30, 2.0**-7, 0.375, 1.0, 4.5, 200.0]
                for x in [mpf(p) for p in places]:
                    if not low <= x <= high:
                        continue
                    yield ["effect", name, " ".join(exact(p) for p in parameters), direction, exact(float(x)),
                           digits(mp.log(density(x) / mass), 22),
                           digits(integral(density, low, x, marks + [x]) / mass, 22),
                           digits(integral(density, x, high, marks + [x]) / mass, 22)]
    for name, family, parameter_sets in SPREADS:
        for parameters in parameter_sets:
            density = family(*map(mpf, parameters))
            bounds = map(mpf, parameters) if name == "uniform" else (mpf(0), INF)
            low, high = bounds
            scale = mp.exp(parameters[0]) if name == "log-normal" else parameters[-1]
            marks = [mpf(scale) * mpf(2) ** k for k in range(-40, 24)]
            for x in [mpf(p) for p in (2.0**-30, 2.0**-9, 0.0625, 0.3125, 0.5, 0.6875, 2.0, 40.0, 2.0**14)]:
                if not low <= x <= high:
                    continue
                yield ["spread", name, " ".join(exact(p) for p in parameters), "", exact(float(x)),
                       digits(mp.log(density(x)), 22),
                       digits(integral(density, low, x, marks + [x]), 22),
                       digits(integral(density, x, high, marks + [x]), 22)]


def main():
    mp.dps = 30
    clock = Stopwatch()
    made = list(rows())
    header = clock.header([
        "Priors: log density, P(X <= x) and P(X > x), 22 digits, at inputs that are exact in binary.",
        "Numerical integrals of the densities; `parameters` in the order of the grammar, separated by spaces.",
    ])
    write("priors.csv", header,
          ["what", "family", "parameters", "direction", "x", "log_density", "lower", "upper"], made)


if __name__ == "__main__":
    main()

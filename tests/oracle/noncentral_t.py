"""The noncentral t from its definition, in multiprecision arithmetic.

T = (Z + ncp) / (W / sqrt(df)) with Z standard Normal and W chi-distributed with df degrees of
freedom. Density and distribution function are integrals over W,

    f(t) = int_0^inf phi(t w / sqrt(df) - ncp) (w / sqrt(df)) p_chi(w; df) dw
    F(t) = int_0^inf Phi(t w / sqrt(df) - ncp)                p_chi(w; df) dw

done here by the trapezoid rule in u = log w, whose error falls geometrically in 1/h because the
integrands are analytic and vanish at both ends. The step is halved until two sums agree to more
than half of the wanted digits, which makes the last sum right to all of them; `by_series` and
`by_hypergeometric` give the density in two other ways, for checking.

Nothing here is shared with the library: no saddle expansion, no tables, no recurrences.
"""

import math

from mpmath import mp, mpf


def trapezoid(integrand, mode, width, digits, most_halvings=12):
    """int exp(g(u)) du / exp(g(mode)) for a unimodal g, to `digits` digits; g(mode) must be given.

    `integrand(u)` returns the integrand divided by its value at the mode.
    """
    small = mpf(10) ** (-(digits + 8))

    def arm(start, step):
        total, j = mpf(0), 0
        while True:
            term = integrand(start + j * step)
            total += term
            if term < small * total or term == 0:
                return total
            j += 1

    h = width * 7 / 10  # for a Gaussian: right to 17 digits; half of it to 70
    total = integrand(mode) + arm(mode + h, h) + arm(mode - h, -h)
    for _ in range(most_halvings):
        half = h / 2
        # The midpoints of the old grid, so that no node is evaluated twice.
        between = arm(mode + half, h) + arm(mode - half, -h)
        old, new = total * h, (total + between) * half
        total, h = total + between, half
        if abs(old - new) <= mpf(10) ** (-(digits * mpf("0.55"))) * new:
            return new
    raise ArithmeticError("the trapezoid rule did not settle")


def log_density(t, df, ncp, digits=50):
    """log f(t; df, ncp) to `digits` digits (more where |log f| is small: absolute there)."""
    with mp.workdps(digits + 35):
        t, nu, lam = mpf(t), mpf(df), mpf(ncp)
        a = 1 + t * t / nu
        b = t * lam / mp.sqrt(nu)
        # With u = log w the exponent is (nu+1) u - a w^2/2 + b w; its mode solves a w^2 - b w = nu+1.
        root = mp.sqrt(b * b + 4 * a * (nu + 1))
        w0 = (b + root) / (2 * a) if b > 0 else 2 * (nu + 1) / (root - b)
        u0 = mp.log(w0)
        width = 1 / mp.sqrt(a * w0 * w0 + nu + 1)

        def integrand(u):
            w = mp.exp(u)
            return mp.exp((nu + 1) * (u - u0) - a * (w - w0) * (w + w0) / 2 + b * (w - w0))

        integral = trapezoid(integrand, u0, width, digits + 5)
        peak = (nu + 1) * u0 - a * w0 * w0 / 2 + b * w0
        return (mp.log(integral) + peak - lam * lam / 2 - mp.log(2 * mp.pi) / 2 - mp.log(nu) / 2
                - (nu / 2 - 1) * mp.log(2) - mp.loggamma(nu / 2))


def log_density_by_series(t, df, ncp, digits=50):
    """The same by the power series in y = ncp t / sqrt(df + t^2) (all terms positive when y > 0)."""
    size = abs(ncp * t) / math.sqrt(df + t * t)
    extra = int(size * size / 2 + size * math.sqrt(df + 1)) + 40  # what cancels when y < 0, and spare
    with mp.workdps(digits + extra):
        t, nu, lam = mpf(t), mpf(df), mpf(ncp)
        y = lam * t / mp.sqrt(nu + t * t)
        even = mp.power(2, (nu - 1) / 2) * mp.gamma((nu + 1) / 2)
        odd = y * mp.power(2, nu / 2) * mp.gamma(nu / 2 + 1)
        total, j = even + odd, 0
        small = mpf(10) ** (-(digits + extra))
        while abs(even) + abs(odd) > small * abs(total):
            even *= y * y * (nu + j + 1) / ((j + 1) * (j + 2))
            odd *= y * y * (nu + j + 2) / ((j + 2) * (j + 3))
            total += even + odd
            j += 2
        return _assemble(t, nu, lam, mp.log(total))


def log_density_by_hypergeometric(t, df, ncp, digits=50):
    """The same through the parabolic cylinder function."""
    with mp.workdps(digits + 30):
        t, nu, lam = mpf(t), mpf(df), mpf(ncp)
        y = lam * t / mp.sqrt(nu + t * t)
        value = mp.gamma(nu + 1) * mp.exp(y * y / 4) * mp.pcfd(-nu - 1, -y)
        return _assemble(t, nu, lam, mp.log(value))


def _assemble(t, nu, lam, log_h):
    return (nu / 2 * mp.log(nu) - mp.log(mp.pi) / 2 - mp.loggamma(nu / 2) - (nu - 1) / 2 * mp.log(2)
            - lam * lam / 2 - (nu + 1) / 2 * mp.log(nu + t * t) + log_h)


def _log_normal_tail(z):
    """log P(Z > z)."""
    return mp.log(mp.erfc(z / mp.sqrt(2)) / 2)


def mode_of(log_integrand, low, high, near=mpf(10) ** -13):
    """The mode of a unimodal function, roughly: golden section."""
    with mp.workdps(30):
        shrink = (mp.sqrt(5) - 1) / 2
        low, high = mpf(low), mpf(high)
        x, y = high - shrink * (high - low), low + shrink * (high - low)
        fx, fy = log_integrand(x), log_integrand(y)
        for _ in range(400):
            if high - low < near:
                break
            if fx < fy:
                low, x, fx = x, y, fy
                y = low + shrink * (high - low)
                fy = log_integrand(y)
            else:
                high, y, fy = y, x, fx
                x = high - shrink * (high - low)
                fx = log_integrand(x)
        return (low + high) / 2


def log_tail(t, df, ncp, upper, digits=50):
    """log P(T > t) when `upper`, otherwise log P(T <= t); t may be infinite."""
    with mp.workdps(digits + 35):
        t, nu, lam = mpf(t), mpf(df), mpf(ncp)
        if mp.isinf(t):
            return mpf(0) if (t > 0) != upper else mpf("-inf")
        if t == 0:
            return _log_normal_tail(-lam if upper else lam)
        slope = t / mp.sqrt(nu)
        sign = 1 if upper else -1

        def log_integrand(u):
            w = mp.exp(u)
            return nu * u - w * w / 2 + _log_normal_tail(sign * (slope * w - lam))

        center = mp.log(nu) / 2
        u0 = mode_of(log_integrand, center - 45, center + 25)
        top = log_integrand(u0)
        # The curvature at the mode, from a difference wide enough not to drown at thirty digits.
        step = mpf(10) ** -6 / mp.sqrt(nu + 1)
        bend = -(log_integrand(u0 + step) + log_integrand(u0 - step) - 2 * top) / step ** 2
        width = 1 / mp.sqrt(bend) if bend > 0 else mpf(1)
        width = min(width, mpf(1))

        def integrand(u):
            return mp.exp(log_integrand(u) - top)

        integral = trapezoid(integrand, u0, width, digits + 5)
        return mp.log(integral) + top - (nu / 2 - 1) * mp.log(2) - mp.loggamma(nu / 2)


def log_band(low, high, df, ncp, digits=40):
    """log P(low < T <= high): the difference of the two smaller tails, with digits to spare."""
    spare = 30
    if mp.isinf(high):
        return log_tail(low, df, ncp, True, digits)
    if mp.isinf(low):
        return log_tail(high, df, ncp, False, digits)
    upper = mpf(low) > mpf(ncp)
    with mp.workdps(digits + spare + 35):
        first = log_tail(low, df, ncp, upper, digits + spare)
        second = log_tail(high, df, ncp, upper, digits + spare)
        large, little = (first, second) if upper else (second, first)
        return large + mp.log(-mp.expm1(little - large))

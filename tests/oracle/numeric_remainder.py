#!/usr/bin/python3
"""Writes src/numeric/remainder_table.inc: Chebyshev tables of the saddle-point remainder.

With x = 1/df and theta = (1 - y/sqrt(y^2 + 4 df))/2 the remainder of the noncentral t density is

    rho(df, theta) = log( sqrt(a/(2 pi)) * integral_{-1}^{inf} exp(df (log(1+v) - v) - w2 v^2/2) dv ),
    a = df/theta,  w2 = df (1 - theta)/theta,

and the table holds R = rho * df / theta^2, which is smooth and near 5 theta/6 - 3/4.  The integral is
done by the trapezoid rule in log(1+v) with 34 digits.  Run time: about two minutes on one core.

Layout: for df >= 16 one patch over (x, theta) in [0, 1/16] x [0, 1]; for 1 <= df < 16 a grid of
patches, because R has essential singularities at theta = 0 and theta = 1 that come close at small df.
"""

import sys

from mpmath import cos, expm1, exp, log, mp, mpf, pi, sqrt

mp.dps = 34

LARGE = dict(x=[mpf(0), mpf(1) / 16], theta=[mpf(0), mpf(1)], nx=10, nt=22)
SMALL = dict(
    x=[mpf(1) / 16, mpf(1) / 8, mpf(1) / 4, mpf(1) / 2, mpf(3) / 4, mpf(1)],
    theta=[mpf(s) for s in "0 0.03125 0.0625 0.125 0.25 0.4375 0.6875 0.84375 0.9375 1".split()],
    nx=12,
    nt=16,
)


def rho(df, theta):
    a = df / theta
    w2 = df * (1 - theta) / theta
    root = sqrt(a)
    step = mpf(1) / 8
    total = mpf(0)
    for sign in (1, -1):
        j = 0 if sign == 1 else 1
        while True:
            u = sign * j * step / root
            v = expm1(u)
            e = df * (u - v) - w2 * v * v / 2 + u
            total += exp(e)
            if e < -82:
                break
            j += 1
    return log(total * step / root * sqrt(a / (2 * pi)))


def scaled(x, theta):
    return rho(1 / x, theta) / (x * theta**2)


def nodes(lo, hi, n):
    return [(lo + hi) / 2 + (hi - lo) / 2 * cos(pi * (i + mpf(1) / 2) / n) for i in range(n)]


def patch(x_range, t_range, nx, nt):
    values = [[scaled(x, t) for t in nodes(*t_range, nt)] for x in nodes(*x_range, nx)]
    cx = [[cos(pi * p * (i + mpf(1) / 2) / nx) for i in range(nx)] for p in range(nx)]
    ct = [[cos(pi * q * (j + mpf(1) / 2) / nt) for j in range(nt)] for q in range(nt)]
    half = [[sum(values[i][j] * ct[q][j] for j in range(nt)) for q in range(nt)] for i in range(nx)]
    out = []
    for p in range(nx):
        row = []
        for q in range(nt):
            c = 4 * sum(half[i][q] * cx[p][i] for i in range(nx)) / (nx * nt)
            row.append(c / (2 if p == 0 else 1) / (2 if q == 0 else 1))
        out.append(row)
    return out


def write(out, name, spec):
    xs, ts = spec["x"], spec["theta"]
    worst = mpf(0)
    shape = f"[{len(xs) - 1}][{len(ts) - 1}][{spec['nx']}][{spec['nt']}]"
    out.write(f"inline constexpr double {name}{shape} = {{\n")
    for i in range(len(xs) - 1):
        out.write("    {\n")
        for j in range(len(ts) - 1):
            c = patch((xs[i], xs[i + 1]), (ts[j], ts[j + 1]), spec["nx"], spec["nt"])
            scale = xs[i + 1] * ts[j + 1] ** 2
            worst = max(worst, scale * max(abs(v) for v in c[-1]), scale * max(abs(r[-1]) for r in c))
            out.write("        {\n")
            for row in c:
                text = ", ".join(mp.nstr(v, 18, strip_zeros=False) for v in row)
                out.write("            {" + text + "},\n")
            out.write("        },\n")
        out.write("    },\n")
    out.write("};\n")
    print(f"{name}: largest last coefficient, as remainder: {mp.nstr(worst, 3)}", file=sys.stderr)


def main():
    path = sys.argv[1] if len(sys.argv) > 1 else "src/numeric/remainder_table.inc"
    with open(path, "w") as out:
        out.write("// Made by tests/oracle/numeric_remainder.py; do not edit.\n")
        out.write("// Coefficients of T_p(x) T_q(theta) on each patch of (x, theta), p outer, q inner.\n")
        for name, spec in (("large_df", LARGE), ("small_df", SMALL)):
            for key in ("x", "theta"):
                edges = ", ".join(mp.nstr(v, 17) for v in spec[key])
                out.write(f"inline constexpr double {name}_{key}_edges[] = {{{edges}}};\n")
            write(out, name + "_table", spec)


main()

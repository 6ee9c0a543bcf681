"""Log likelihoods of studies over arrays of (mean, spread), in 80-bit arithmetic.

The density needs log int w^df exp(-w^2/2 + y w) dw with y = ncp t / sqrt(df + t^2). Per study that
integral is done by the trapezoid rule in log w at the Chebyshev nodes of short pieces of
z = asinh(y / (2 sqrt(df))), and interpolated between them by polynomials of degree 16. Checked by
`self_check` against the fifty-digit tables; run this file to see the errors. The loops are in
likelihood.c, compiled on first use.
"""

import ctypes
import pathlib
import subprocess
import tempfile

import numpy as np
from mpmath import mp

LD = np.longdouble
TERMS = 17
PIECE = LD(0.25)
FIRST, PIECES = -32, 64


def ld(x):
    """An mpmath number as an 80-bit one, through two doubles."""
    high = float(x)
    with mp.workdps(40):
        return LD(high) + LD(float(mp.mpf(x) - mp.mpf(high)))


def _compile():
    folder = tempfile.mkdtemp(prefix="steelyard-oracle-")
    library = f"{folder}/likelihood.so"
    source = pathlib.Path(__file__).with_name("likelihood.c")
    subprocess.run(["cc", "-O2", "-ffp-contract=off", "-shared", "-fPIC", "-o", library, str(source), "-lm"], check=True)
    return ctypes.CDLL(library)


C = _compile()
LDP = ctypes.POINTER(ctypes.c_longdouble)


def pointer(array):
    return ctypes.c_void_p(array.ctypes.data)


class Table(ctypes.Structure):
    _fields_ = [("nu", ctypes.c_longdouble), ("root", ctypes.c_longdouble), ("constant", ctypes.c_longdouble), ("piece", ctypes.c_longdouble),
                ("first", ctypes.c_int), ("pieces", ctypes.c_int), ("terms", ctypes.c_int),
                ("nodes", ctypes.c_void_p), ("matrix", ctypes.c_void_p), ("coefficients", ctypes.c_void_p)]


_SCALARS = {}


def c_ld(x):
    """A scalar as C wants it, with all its bits."""
    if x not in _SCALARS:
        value = ctypes.c_longdouble()
        ctypes.memmove(ctypes.byref(value), np.array([LD(x)]).ctypes.data, 16)
        _SCALARS[x] = value
    return _SCALARS[x]


def _chebyshev(terms):
    """Chebyshev nodes on [-1, 1] and the matrix from values there to Chebyshev coefficients."""
    with mp.workdps(40):
        angle = [mp.pi * (mp.mpf(k) + mp.mpf(1) / 2) / terms for k in range(terms)]
        matrix = [[ld((2 if m else 1) * mp.cos(m * a) / terms) for a in angle] for m in range(terms)]
        return np.array([ld(mp.cos(a)) for a in angle]), np.array(matrix)


NODES, TO_COEFFICIENTS = _chebyshev(TERMS)


class Exact:
    """t known; `folded`: its sign is not."""

    def __init__(self, t, df, n, folded=False):
        self.t, self.df, self.n, self.folded = float(t), float(df), float(n), bool(folded)
        with mp.workdps(40):
            nu = mp.mpf(self.df)
            constant = ld(-mp.log(mp.pi) / 2 - mp.loggamma(nu / 2) - (nu - 1) / 2 * mp.log(2) - nu / 2
                          + nu / 2 * mp.log(nu))
        self.coefficients = np.full((PIECES, TERMS), LD("nan"))
        self.table = Table()
        for name, value in (("nu", self.df), ("root", np.sqrt(LD(self.df))), ("constant", constant), ("piece", PIECE)):
            offset = getattr(Table, name).offset
            ctypes.memmove(ctypes.addressof(self.table) + offset, np.array([LD(value)]).ctypes.data, 16)
        self.table.first, self.table.pieces, self.table.terms = FIRST, PIECES, TERMS
        self.table.nodes, self.table.matrix = NODES.ctypes.data, TO_COEFFICIENTS.ctypes.data
        self.table.coefficients = self.coefficients.ctypes.data

    def add(self, mean, spread, out):
        C.add_exact(ctypes.byref(self.table), c_ld(self.t), c_ld(self.n), int(self.folded), ctypes.c_long(out.size),
                    pointer(mean), pointer(spread), pointer(out))

    def centers(self):
        center = self.t / self.n**0.5
        return [center, -center] if self.folded else [center]

    def width(self):
        return ((1 + self.t**2 / (2 * self.df)) / self.n) ** 0.5


class Band:
    """t known to lie in a union of intervals."""

    def __init__(self, bands, df, n):
        self.df, self.n = float(df), float(n)
        self.low = np.array([float(a) for a, _ in bands])
        self.high = np.array([float(b) for _, b in bands])
        edges = np.abs(np.concatenate([self.low, self.high]))
        edge = float(np.max(edges[np.isfinite(edges)]))
        nu = self.df
        # e^u up to 15 / sqrt(df) still counts, and there the edge moves that much faster in u.
        step = 0.25 / np.sqrt(2 * nu + 2 + (edge * max(1.0, 15 / np.sqrt(nu))) ** 2)
        u = np.arange(-110 / nu - 16 / np.sqrt(2 * nu), 16 / np.sqrt(2 * nu) + 3, step)
        log_weight = nu * u - nu * np.expm1(2 * u) / 2
        keep = log_weight > -115
        weight = np.exp(log_weight[keep])
        self.ratio, self.weight = np.exp(u[keep]), weight / weight.sum()  # w / sqrt(df)

    def add(self, mean, spread, out):
        C.add_band(self.ratio.size, pointer(self.ratio), pointer(self.weight), self.low.size, pointer(self.low),
                   pointer(self.high), c_ld(self.n), ctypes.c_long(out.size), pointer(mean), pointer(spread), pointer(out))

    def centers(self):
        edges = np.concatenate([self.low, self.high])
        return [float(e) / self.n**0.5 for e in edges if np.isfinite(e)]

    def width(self):
        return (1 / self.n) ** 0.5


class Normal:
    """An estimate and its standard error."""

    def __init__(self, estimate, se, folded=False):
        self.estimate, self.se, self.folded = float(estimate), float(se), bool(folded)

    def add(self, mean, spread, out):
        C.add_normal(c_ld(self.estimate), c_ld(self.se), int(self.folded), ctypes.c_long(out.size), pointer(mean),
                     pointer(spread), pointer(out))

    def centers(self):
        return [self.estimate, -self.estimate] if self.folded else [self.estimate]

    def width(self):
        return self.se


def log_likelihood(studies, mean, spread):
    """Sum over the studies at arrays of equal (or broadcastable) shape."""
    mean, spread = np.broadcast_arrays(np.asarray(mean, dtype=LD), np.asarray(spread, dtype=LD))
    mean, spread = np.ascontiguousarray(mean), np.ascontiguousarray(spread)
    out = np.zeros(mean.shape, dtype=LD)
    for study in studies:
        study.add(mean, spread, out)
    return out


def to_mp(x):
    high = float(x)
    return mp.mpf(high) + mp.mpf(float(x - LD(high)))


def self_check():
    """The largest errors against the tables of the noncentral t: of the density relative to the size
    of the terms that cancel in it, of bands absolute, with the cancellation of narrow ones taken out."""
    import csv

    from table import REFERENCE

    mp.dps = 40
    densities = 0.0
    for row in csv.reader(line for line in open(REFERENCE / "noncentral_t_density.csv") if line[0] != "#"):
        if row[0] in ("kind", "wide"):
            continue
        t, df, ncp, truth = (mp.mpf(cell) for cell in row[1:])
        ours = log_likelihood([Exact(float(t), float(df), 1.0)], [LD(float(ncp))], [LD(0)])[0]
        error = abs(to_mp(ours) - truth)
        densities = max(densities, float(error / (1 + abs(truth) + ncp * ncp + df * (1 + abs(mp.log(df))))))
    bands = 0.0
    for row in csv.reader(line for line in open(REFERENCE / "noncentral_t_band.csv") if line[0] != "#"):
        if row[0] == "kind" or float(row[5]) < -60 or abs(float(row[4])) > 300 or row[0] == "far_tail":
            continue
        low, high, df, ncp, truth = (float(cell) for cell in row[1:])
        if max(abs(e) for e in (low, high) if np.isfinite(e)) > 50:
            continue
        ours = float(log_likelihood([Band([(low, high)], df, 1.0)], [LD(ncp)], [LD(0)])[0])
        bands = max(bands, abs(ours - truth) * min(1.0, high - low))
    return densities, bands


if __name__ == "__main__":
    print("largest scaled errors of densities and of bands: %.1e, %.1e" % self_check())

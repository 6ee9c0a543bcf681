"""Marginal likelihoods and posteriors of a meta-analysis by adaptive Gauss-Legendre cubature in 80 bits.

The plane of mean and spread is mapped to x = asinh((mean - c) / b), v = log(spread) and covered with
rectangles of n x n Gauss-Legendre nodes. A rectangle whose Legendre coefficients have not died out
is halved across the axis where they decay least, until those left over are negligible against the
whole; the error of an n-point rule then is about the square of that. `Posterior.marginal` is repeated
by the caller with another n, other c and b, and so entirely other nodes, and the difference is reported.
"""

import math

import numpy as np
from mpmath import mp

from likelihood import LD, ld, log_likelihood

INF = float("inf")


# ---- priors ---------------------------------------------------------------------------------------

def _mp_cdf(family, x, upper=False):
    """P(effect <= x), or > x, of an uncut effect prior, in multiprecision."""
    name, a, b, *rest = family
    x = mp.mpf(x)
    z = (x - mp.mpf(a)) / mp.mpf(b)
    z = -z if upper else z
    if name == "cauchy":
        return mp.atan2(1, -z) / mp.pi
    if name == "normal":
        return mp.erfc(-z / mp.sqrt(2)) / 2
    if name == "student-t":
        nu = mp.mpf(rest[0])
        tail = mp.betainc(nu / 2, 0.5, 0, nu / (nu + z * z), regularized=True) / 2
        return tail if z < 0 else 1 - tail
    raise ValueError(name)


class Effect:
    """A prior of the mean: ("cauchy", location, scale), ("normal", mean, sd),
    ("student-t", location, scale, df), ("uniform", low, high); direction either, greater or less."""

    def __init__(self, family, direction="either"):
        self.family, self.direction = family, direction
        self.low, self.high = -INF, INF
        if family[0] == "uniform":
            self.low, self.high = family[1], family[2]
        if direction == "greater":
            self.low = max(self.low, 0.0)
        if direction == "less":
            self.high = min(self.high, 0.0)
        with mp.workdps(40):
            if family[0] == "uniform":
                self.norm = ld(-mp.log(mp.mpf(self.high) - mp.mpf(self.low)))
            else:
                kept = 1 if direction == "either" else _mp_cdf(family, 0, direction == "greater")
                constant = {"cauchy": lambda: -mp.log(mp.pi), "normal": lambda: -mp.log(2 * mp.pi) / 2,
                            "student-t": lambda: (mp.loggamma((mp.mpf(family[-1]) + 1) / 2)
                                                  - mp.loggamma(mp.mpf(family[-1]) / 2)
                                                  - mp.log(mp.pi * mp.mpf(family[-1])) / 2)}[family[0]]()
                self.norm = ld(constant - mp.log(mp.mpf(family[2])) - mp.log(kept))
        self.center = family[1] if family[0] != "uniform" else (family[1] + family[2]) / 2
        self.scale = family[2] if family[0] != "uniform" else (family[2] - family[1]) / 2

    def __call__(self, x):
        name, a, b, *rest = self.family
        if name == "uniform":
            return np.full(x.shape, self.norm)
        z = (x - LD(a)) / LD(b)
        if name == "cauchy":
            return self.norm - np.log1p(z * z)
        if name == "normal":
            return self.norm - z * z / 2
        return self.norm - (LD(rest[0]) + 1) / 2 * np.log1p(z * z / LD(rest[0]))

    def places(self):
        return [self.center + self.scale * k for k in (-30, -5, -1, 0, 1, 5, 30)]


class Spread:
    """A prior of the spread: ("half-cauchy", scale), ("half-normal", scale), ("half-student-t", scale, df),
    ("inverse-gamma", shape, scale), ("log-normal", log mean, log sd), ("exponential", mean), ("uniform", low, high)."""

    def __init__(self, family):
        self.family = family
        name, a, *rest = family
        self.low, self.high = (a, rest[0]) if name == "uniform" else (0.0, INF)
        with mp.workdps(40):
            a_, b_ = mp.mpf(a), mp.mpf(rest[0]) if rest else None
            self.norm = ld({
                "half-cauchy": lambda: mp.log(2 / mp.pi) - mp.log(a_),
                "half-normal": lambda: mp.log(2) - mp.log(2 * mp.pi) / 2 - mp.log(a_),
                "half-student-t": lambda: (mp.log(2) + mp.loggamma((b_ + 1) / 2) - mp.loggamma(b_ / 2)
                                           - mp.log(mp.pi * b_) / 2 - mp.log(a_)),
                "inverse-gamma": lambda: a_ * mp.log(b_) - mp.loggamma(a_),
                "log-normal": lambda: -mp.log(2 * mp.pi) / 2 - mp.log(b_),
                "exponential": lambda: -mp.log(a_),
                "uniform": lambda: -mp.log(b_ - a_),
            }[name]())
        self.scale = {"inverse-gamma": lambda: rest[0] / (a + 1), "log-normal": lambda: math.exp(a),
                      "uniform": lambda: rest[0]}.get(name, lambda: a)()

    def __call__(self, x, log_x):
        name, a, *rest = self.family
        if name == "half-cauchy":
            return self.norm - np.log1p((x / LD(a)) ** 2)
        if name == "half-normal":
            return self.norm - (x / LD(a)) ** 2 / 2
        if name == "half-student-t":
            return self.norm - (LD(rest[0]) + 1) / 2 * np.log1p((x / LD(a)) ** 2 / LD(rest[0]))
        if name == "inverse-gamma":
            return self.norm - (LD(a) + 1) * log_x - LD(rest[0]) / x
        if name == "log-normal":
            return self.norm - log_x - ((log_x - LD(a)) / LD(rest[0])) ** 2 / 2
        if name == "exponential":
            return self.norm - x / LD(a)
        return np.full(x.shape, self.norm)


# ---- Gauss-Legendre -------------------------------------------------------------------------------

_RULES = {}


def rule(n):
    """Nodes and weights on [-1, 1], and the matrix from values to orthonormal Legendre coefficients."""
    if n not in _RULES:
        with mp.workdps(40):
            nodes, weights, rows = [], [], []
            for k in range(n):
                x = mp.cos(mp.pi * (mp.mpf(k) + mp.mpf(3) / 4) / (n + mp.mpf(1) / 2))
                for _ in range(8):
                    p, q = mp.mpf(1), x
                    for m in range(2, n + 1):
                        p, q = q, ((2 * m - 1) * x * q - (m - 1) * p) / m
                    slope = n * (x * q - p) / (x * x - 1)
                    x -= q / slope
                nodes.append(ld(x))
                weights.append(ld(2 / ((1 - x * x) * slope**2)))
        nodes, weights = np.array(nodes), np.array(weights)
        p, q = np.ones(n, dtype=LD), nodes.copy()
        for m in range(n):
            rows.append(p * weights * (2 * m + 1) / 2)
            p, q = q, ((2 * m + 3) * nodes * q - (m + 1) * p) / (m + 2)
        _RULES[n] = nodes, weights, np.array(rows)
    return _RULES[n]


class Cubature:
    """Adaptive integral of exp(g(x, v)) over rectangles; v is absent in one dimension."""

    def __init__(self, g, boxes, n, tolerance, two=True, most=60000):
        self.g, self.n, self.two = g, n, two
        self.tolerance = tolerance
        self.done = []
        self.top = LD("-inf")
        queue = np.array(boxes, dtype=LD)
        total = LD(0)
        kept_boxes, kept_values = [], []
        count = 0
        while len(queue):
            values = self.values(queue)
            count += values.size
            top = max(self.top, values.max())
            if top > self.top and np.isfinite(self.top):
                total *= np.exp(self.top - top)
            self.top = top
            mass, bad_x, bad_v = self._judge(queue, values)
            sure = total + mass.sum()
            limit = LD(tolerance) * sure
            bad = np.maximum(bad_x, bad_v) > limit
            if count > most * 256:
                raise ArithmeticError("the cubature does not settle")
            total += mass[~bad].sum()
            kept_boxes.append(queue[~bad])
            kept_values.append(values[~bad])
            queue = self._halve(queue[bad], bad_x[bad] >= bad_v[bad])
        self.boxes = np.concatenate(kept_boxes)
        self.logs = np.concatenate(kept_values)
        self.evaluations = count
        self.mass = self.masses()
        self.total = self.mass.sum()
        self.log_total = np.log(self.total) + self.top

    def nodes(self, boxes):
        """x and v at the nodes, shaped (boxes, n, n) or (boxes, n)."""
        t, _, _ = rule(self.n)
        x = (boxes[:, 0:1] + boxes[:, 1:2]) / 2 + (boxes[:, 1:2] - boxes[:, 0:1]) / 2 * t
        if not self.two:
            return x, None
        v = (boxes[:, 2:3] + boxes[:, 3:4]) / 2 + (boxes[:, 3:4] - boxes[:, 2:3]) / 2 * t
        return np.broadcast_arrays(x[:, None, :], v[:, :, None])  # the mean runs fastest

    def values(self, boxes):
        parts = []
        for i in range(0, len(boxes), 4000):
            x, v = self.nodes(boxes[i : i + 4000])
            parts.append(self.g(np.ascontiguousarray(x), None if v is None else np.ascontiguousarray(v)))
        return np.concatenate(parts) if parts else np.empty((0,) + (self.n,) * (2 if self.two else 1), dtype=LD)

    def weights(self, boxes):
        _, w, _ = rule(self.n)
        area = (boxes[:, 1] - boxes[:, 0]) / 2
        if not self.two:
            return area[:, None] * w
        return (area * (boxes[:, 3] - boxes[:, 2]) / 2)[:, None, None] * (w[:, None] * w[None, :])

    def _judge(self, boxes, values):
        with np.errstate(under="ignore"):
            f = np.exp(values - self.top)
        _, _, legendre = rule(self.n)
        mass = (f * self.weights(boxes)).reshape(len(boxes), -1).sum(axis=1)
        if not self.two:
            tail = np.abs(f @ legendre[-3:].T).sum(axis=1) * (boxes[:, 1] - boxes[:, 0])
            return mass, tail, np.zeros_like(tail)
        area = (boxes[:, 1] - boxes[:, 0]) * (boxes[:, 3] - boxes[:, 2])
        tail_x = np.abs(np.einsum("mj,bij->bmi", legendre[-3:], f)).sum(axis=1).max(axis=1) * area
        tail_v = np.abs(np.einsum("mi,bij->bmj", legendre[-3:], f)).sum(axis=1).max(axis=1) * area
        return mass, tail_x, tail_v

    def _halve(self, boxes, across_x):
        if not len(boxes):
            return boxes
        first, second = boxes.copy(), boxes.copy()
        middle_x = (boxes[:, 0] + boxes[:, 1]) / 2
        first[across_x, 1] = middle_x[across_x]
        second[across_x, 0] = middle_x[across_x]
        if self.two:
            middle_v = (boxes[:, 2] + boxes[:, 3]) / 2
            first[~across_x, 3] = middle_v[~across_x]
            second[~across_x, 2] = middle_v[~across_x]
        return np.concatenate([first, second])

    def largest(self):
        """The node where the integrand is largest."""
        best = np.unravel_index(int(np.argmax(self.logs)), self.logs.shape)
        x, v = self.nodes(self.boxes[best[0] : best[0] + 1])
        return x[(0,) + best[1:]], None if v is None else v[(0,) + best[1:]]

    def masses(self):
        with np.errstate(under="ignore"):
            f = np.exp(self.logs - self.top)
        return (f * self.weights(self.boxes)).reshape(len(self.boxes), -1).sum(axis=1)

    def mean_of(self, function):
        """The expectation of function(x, v)."""
        with np.errstate(under="ignore"):
            f = np.exp(self.logs - self.top) * self.weights(self.boxes)
        x, v = self.nodes(self.boxes)
        return (f * function(x, v)).sum() / self.total

    def below(self, cut, axis=0):
        """P(x <= cut) (axis 0) or P(v <= cut) (axis 1): whole boxes, and the cut ones done anew."""
        low, high = self.boxes[:, 2 * axis], self.boxes[:, 2 * axis + 1]
        whole = self.mass[high <= cut].sum()
        crossing = self.boxes[(low < cut) & (high > cut)].copy()
        if len(crossing):
            crossing[:, 2 * axis + 1] = cut
            with np.errstate(under="ignore"):
                f = np.exp(self.values(crossing) - self.top)
            whole += (f * self.weights(crossing)).sum()
        return whole / self.total

    def cloud(self, axis=0):
        """Places along one axis and their probabilities: a rough marginal distribution."""
        with np.errstate(under="ignore"):
            f = np.exp(self.logs - self.top) * self.weights(self.boxes)
        return self.nodes(self.boxes)[axis].ravel(), f.ravel() / self.total


def quantile(cloud, below, p):
    """The place where the smooth distribution function `below` is p, and the density there: Newton's
    steps from a rough start; the last one starts so close that the density need not be exact."""
    place, weight = cloud
    order = np.argsort(place)
    sums = np.cumsum(weight[order])
    at = place[order][min(int(np.searchsorted(sums, p)), len(order) - 1)]
    around = place[order][np.searchsorted(sums, [max(p - 0.2, p / 2), min(p + 0.2, (1 + p) / 2)]).clip(0, len(order) - 1)]
    h = (around[1] - around[0]) * LD(1e-4)
    for _ in range(12):
        gap = below(at) - LD(p)
        density = (below(at + h) - below(at - h)) / (2 * h)
        at = at - gap / density
        if abs(gap) < 1e-7:
            break
    if abs(below(at) - LD(p)) > 1e-10:
        raise ArithmeticError("a quantile was not found")
    return at, density


# ---- the four models ------------------------------------------------------------------------------

class Analysis:
    """One meta-analysis. `variant` moves every node: another rule, another map."""

    def __init__(self, studies, effect, spread, variant=0):
        self.studies, self.effect, self.spread = studies, effect, spread
        self.n = (16, 13)[variant]
        self.tolerance = 1e-11
        self.shift = (0.0, 0.37)[variant]
        self.scale_v = self._spread_grid()
        self.modes = self._modes()
        self._choose_map()

    # The map between mean and x.
    def _choose_map(self):
        best = max(self.modes, key=lambda m: m[2])
        widths = [s.width() for s in self.studies]
        self.b = LD(max(1 / math.sqrt(sum(1 / w**2 for w in widths)), 1e-6) * (1 + self.shift))
        self.c = LD(best[0]) + self.b * LD(self.shift)

    def to_x(self, mean):
        return np.arcsinh((LD(mean) - self.c) / self.b)

    def to_mean(self, x):
        return self.c + self.b * np.sinh(x)

    def _spread_grid(self):
        """v at which modes are sought: everywhere a spread could matter."""
        scales = [self.spread.scale, *[s.width() for s in self.studies]]
        low, high = math.log(min(scales)) - 6, math.log(max(*scales, self._extent())) + 6
        if self.spread.low > 0:
            low = max(low, math.log(self.spread.low))
        if math.isfinite(self.spread.high):
            high = min(high, math.log(self.spread.high))
        return np.linspace(low, max(high, low + 1e-9), 28)

    def _extent(self):
        centers = [c for s in self.studies for c in s.centers()]
        return max(max(centers) - min(centers), 1e-3)

    def _modes(self):
        """Local maxima over the mean at each spread: (mean, v, log posterior, width)."""
        centers = np.array([c for s in self.studies for c in s.centers()] + self.effect.places())
        width = min(min(s.width() for s in self.studies), self.effect.scale) / math.sqrt(len(self.studies))
        found = []
        steps = np.concatenate([[0], 2.0 ** np.arange(-2, 26, 0.5)]) * width
        middle = np.median([c for s in self.studies for c in s.centers()])
        grid = np.unique(np.concatenate([centers, middle + steps, middle - steps, self.effect.center + steps,
                                         self.effect.center - steps, np.linspace(centers.min(), centers.max(), 200)]))
        grid = grid[(grid >= self.effect.low) & (grid <= self.effect.high)]
        edges = [e for e in (self.effect.low, self.effect.high) if math.isfinite(e)]
        grid = np.unique(np.concatenate([grid, edges])) if edges else grid
        for v in [-60.0, *self.scale_v]:
            values = self._log_at(grid, v)
            peaks = [i for i in range(len(grid)) if (i == 0 or values[i] >= values[i - 1])
                     and (i + 1 == len(grid) or values[i] > values[i + 1])]
            for i in sorted((i for i in peaks if values[i] > values.max() - 60), key=lambda i: -values[i])[:4]:
                found.append(self._refine(grid[max(i - 1, 0)], grid[min(i + 1, len(grid) - 1)], v))
        return found

    def _log_at(self, mean, v):
        mean = np.asarray(mean, dtype=LD)
        return self.effect(mean) + log_likelihood(self.studies, mean, np.exp(LD(v)))

    def _refine(self, low, high, v):
        for _ in range(7):
            mean = np.linspace(low, high, 17)
            values = self._log_at(mean, v)
            i = int(np.argmax(values))
            low, high = mean[max(i - 1, 0)], mean[min(i + 1, 16)]
            if high - low < 1e-9 * (1 + abs(high)):
                break
        value = values[i]
        if v > -60:
            value = value + self.spread(np.exp(LD(v)), LD(v)) + LD(v)
        return mean[i], v, float(value), self._fall(mean[i], values[i], v)

    def _fall(self, mean, value, v):
        """About how far from a maximum the integrand has fallen by the half power of e."""
        widths = 2.0 ** np.arange(-20, 20)
        places = np.concatenate([mean - widths, mean + widths])
        drop = (value - self._log_at(places, v)).reshape(2, -1)
        drop[((places < self.effect.low) | (places > self.effect.high)).reshape(2, -1)] = LD(0)
        far = drop.max(axis=0) >= 0.5
        return float(widths[int(np.argmax(far))]) if far.any() else float(widths[-1])

    # Integrands.
    def _log_jacobian(self, x):
        return np.log(self.b) + np.logaddexp(x, -x) - np.log(LD(2))

    def g_fixed(self, x, _):
        mean = self.to_mean(x)
        return self.effect(mean) + log_likelihood(self.studies, mean, LD(0)) + self._log_jacobian(x)

    def g_null(self, v, _):
        spread = np.exp(v)
        return self.spread(spread, v) + v + log_likelihood(self.studies, LD(0), spread)

    def g_random(self, x, v):
        mean, spread = self.to_mean(x), np.exp(v)
        return (self.effect(mean) + self.spread(spread, v) + v + self._log_jacobian(x)
                + log_likelihood(self.studies, mean, spread))

    # Starting boxes.
    def _x_ends(self):
        far = LD(10) ** 20 * (1 + abs(self.c))
        low = self.to_x(self.effect.low) if math.isfinite(self.effect.low) else self.to_x(-far)
        high = self.to_x(self.effect.high) if math.isfinite(self.effect.high) else self.to_x(far)
        return low, high

    def _v_ends(self):
        low = math.log(self.spread.low) if self.spread.low > 0 else math.log(min(self.spread.scale, float(self.b))) - 50
        high = math.log(self.spread.high) if math.isfinite(self.spread.high) else math.log(self.spread.scale + 1) + 50
        return LD(low), LD(high)

    @staticmethod
    def _cuts(low, high, places, step):
        """Sorted cuts from low to high through the places, no gap wider than step, none silly small."""
        inside = sorted(p for p in places if low < p < high)
        cuts = [low]
        for p in [*inside, high]:
            if p - cuts[-1] < 0.05 and p is not high:
                continue
            start, gap = cuts[-1], p - cuts[-1]
            pieces = max(1, int(np.ceil(gap / step)))
            cuts += [start + gap * (k + 1) / pieces for k in range(pieces - 1)] + [p]
        return cuts

    def _x_places(self, modes):
        places = [self.to_x(p) for p in self.effect.places()]
        for mean, _, _, width in modes:
            places += [self.to_x(mean + k * width) for k in (-8, -3, 0, 3, 8)]
        return places

    def _x_boxes(self, modes, step=1.5):
        low, high = self._x_ends()
        cuts = self._cuts(low, high, self._x_places(modes), step)
        return list(zip(cuts[:-1], cuts[1:]))

    def fixed(self):
        modes = [m for m in self.modes if m[1] == -60.0]
        return Cubature(self.g_fixed, self._x_boxes(modes, 0.7), self.n, self.tolerance, two=False)

    def null(self):
        low, high = self._v_ends()
        cuts = self._cuts(low, high, [math.log(self.spread.scale)], 0.5)
        return Cubature(self.g_null, list(zip(cuts[:-1], cuts[1:])), self.n, self.tolerance, two=False)

    def random(self):
        low, high = self._v_ends()
        step = 1.0 + self.shift / 4
        cuts = self._cuts(low, high, [math.log(self.spread.scale)], step)
        best = max(m[2] for m in self.modes if m[1] > -60.0)
        boxes = []
        for va, vb in zip(cuts[:-1], cuts[1:]):
            near = [m for m in self.modes if va - 1 <= m[1] <= vb + 1 and m[2] > best - 90]
            boxes += [(xa, xb, va, vb) for xa, xb in self._x_boxes(near, 2.0)]
        boxes = self._prune(np.array(boxes, dtype=LD))
        return Cubature(self.g_random, boxes, self.n, self.tolerance)

    def _prune(self, boxes):
        """Leaves out boxes in whose neighbourhood nothing is left of the integrand."""
        t = np.array([-0.95, 0.0, 0.95], dtype=LD)
        x = (boxes[:, 0:1] + boxes[:, 1:2]) / 2 + (boxes[:, 1:2] - boxes[:, 0:1]) / 2 * t
        v = (boxes[:, 2:3] + boxes[:, 3:4]) / 2 + (boxes[:, 3:4] - boxes[:, 2:3]) / 2 * t
        x, v = np.broadcast_arrays(x[:, None, :], v[:, :, None])
        values = self.g_random(np.ascontiguousarray(x), np.ascontiguousarray(v)).reshape(len(boxes), -1).max(axis=1)
        alive = values > values.max() - 100
        keep = alive.copy()
        for i in np.flatnonzero(alive):
            touch = ((boxes[:, 0] <= boxes[i, 1]) & (boxes[:, 1] >= boxes[i, 0]) & (boxes[:, 2] <= boxes[i, 3])
                     & (boxes[:, 3] >= boxes[i, 2]))
            keep |= touch
        return boxes[keep]

    def marginals(self):
        """fixed_null, fixed_effect, random_null, random_effect (the last two absent for one study), each as
        (log value, mean, spread) with the place where its integrand is largest."""
        zero = np.zeros(1, dtype=LD)
        result = [(log_likelihood(self.studies, zero, LD(0))[0], LD(0), LD(0))]
        fixed = self.fixed()
        result.append((fixed.log_total, self.to_mean(fixed.largest()[0]), LD(0)))
        if len(self.studies) > 1:
            null, random = self.null(), self.random()
            result.append((null.log_total, LD(0), np.exp(null.largest()[0])))
            x, v = random.largest()
            result.append((random.log_total, self.to_mean(x), np.exp(v)))
        return result

    def log_marginals(self):
        return [value for value, _, _ in self.marginals()]

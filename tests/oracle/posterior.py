"""Posterior means, sds, quantiles and probabilities from the cubatures of marginal.py."""

import numpy as np
from scipy.special import log_ndtr

from likelihood import LD, log_likelihood
from marginal import Cubature, quantile, rule

LEVELS = (0.025, 0.5, 0.975)


class Answers:
    """Everything the tables hold about one analysis under equal model probabilities."""

    def __init__(self, analysis):
        self.a = analysis
        self.fixed, self.random = analysis.fixed(), analysis.random()
        gap = self.random.log_total - self.fixed.log_total
        with np.errstate(over="ignore"):
            self.p_random = 1 / (1 + np.exp(-gap))
            self.p_fixed = 1 / (1 + np.exp(gap))

    def effect_below(self, which, mean):
        x = self.a.to_x(mean)
        if which == "effect_fixed":
            return self.fixed.below(x)
        if which == "effect_random":
            return self.random.below(x)
        return self.p_fixed * self.fixed.below(x) + self.p_random * self.random.below(x)

    def effect_moments(self, which):
        parts = []
        for cubature in (self.fixed, self.random):
            mean = cubature.mean_of(lambda x, v: self.a.to_mean(x))
            parts.append((mean, cubature.mean_of(lambda x, v: (self.a.to_mean(x) - mean) ** 2)))
        return self._mix(which, parts)

    def _mix(self, which, parts):
        (m1, v1), (m2, v2) = parts
        if which.endswith("_fixed"):
            return m1, np.sqrt(v1)
        if which.endswith("_random"):
            return m2, np.sqrt(v2)
        mean = self.p_fixed * m1 + self.p_random * m2
        return mean, np.sqrt(self.p_fixed * (v1 + (m1 - mean) ** 2) + self.p_random * (v2 + (m2 - mean) ** 2))

    def effect_quantile(self, which, p):
        """The quantile and the density there."""
        clouds = {"effect_fixed": [(self.fixed, 1)], "effect_random": [(self.random, 1)]}.get(
            which, [(self.fixed, self.p_fixed), (self.random, self.p_random)])
        parts = [(cubature.cloud(), share) for cubature, share in clouds]
        cloud = (np.concatenate([x for (x, _), _ in parts]), np.concatenate([w * share for (_, w), share in parts]))
        x, density = quantile(cloud, lambda cut: self.effect_below(which, self.a.to_mean(cut)), p)
        return self.a.to_mean(x), density / (self.a.b * np.cosh(x))

    def spread_moments(self):
        mean = self.random.mean_of(lambda x, v: np.exp(v))
        return mean, np.sqrt(self.random.mean_of(lambda x, v: (np.exp(v) - mean) ** 2))

    def spread_below(self, spread):
        return self.random.below(np.log(LD(spread)), axis=1)

    def spread_quantile(self, p):
        v, density = quantile(self.random.cloud(axis=1), lambda cut: self.random.below(cut, axis=1), p)
        return np.exp(v), density / np.exp(v)

    def new_study_below(self, place):
        """P(effect in a new study <= place), averaged over the two effect models."""
        a = self.a

        def g(x, v):
            z = ((LD(place) - a.to_mean(x)) / np.exp(v)).astype(float)
            return a.g_random(x, v) + log_ndtr(z).astype(LD)

        part = Cubature(g, self.random.boxes, a.n, a.tolerance)
        below = np.exp(part.log_total - self.random.log_total)
        return self.p_fixed * self.fixed.below(a.to_x(place)) + self.p_random * below


class OwnEffect:
    """A study's own effect in the random-effects model: an explicit integral over it at every node."""

    def __init__(self, answers, index):
        self.answers, self.a, self.study = answers, answers.a, answers.a.studies[index]
        cubature = answers.random
        weight = (np.exp(cubature.logs - cubature.top) * cubature.weights(cubature.boxes)).ravel() / cubature.total
        x, v = cubature.nodes(cubature.boxes)
        keep = weight > 1e-12
        self.weight = weight[keep]
        self.mean, self.spread = self.a.to_mean(x).ravel()[keep], np.exp(v).ravel()[keep]
        precision = 1 / self.spread**2 + 1 / LD(self.study.width()) ** 2
        self.middle = (self.mean / self.spread**2 + LD(self.study.centers()[0]) / LD(self.study.width()) ** 2) / precision
        self.sd = 1 / np.sqrt(precision)
        self.total, first, second = self._moments()
        self.own_mean = (self.weight * first / self.total).sum()
        self.own_variance = (self.weight * second / self.total).sum() - self.own_mean**2

    def _log_density(self, own):
        z = (own - self.mean[:, None]) / self.spread[:, None]
        return -z * z / 2 - np.log(self.spread[:, None]) + log_likelihood([self.study], own, LD(0))

    def _over(self, low, high, n=32, panels=3):
        nodes, weights, _ = rule(n)
        total, first, second = 0, 0, 0
        for k in range(panels):
            a, b = low + (high - low) * k / panels, low + (high - low) * (k + 1) / panels
            own = (a + b)[:, None] / 2 + (b - a)[:, None] / 2 * nodes
            value = self._log_density(own)
            f = np.exp(value - self.top) * weights * ((b - a) / 2)[:, None]
            total, first, second = total + f.sum(axis=1), first + (f * own).sum(axis=1), second + (f * own * own).sum(axis=1)
        return total, first, second

    def _moments(self):
        self.top = self._log_density(self.middle[:, None])
        return self._over(self.middle - 13 * self.sd, self.middle + 13 * self.sd)

    def below(self, place):
        low, high = self.middle - 13 * self.sd, self.middle + 13 * self.sd
        cut = np.clip(LD(place), low, high)
        part, _, _ = self._over(low, cut)
        random = (self.weight * part / self.total).sum()
        fixed = self.answers.fixed.below(self.a.to_x(place))
        return self.answers.p_fixed * fixed + self.answers.p_random * random

    def summary(self):
        """(mean, sd) averaged over the two effect models."""
        m1 = self.answers.fixed.mean_of(lambda x, v: self.a.to_mean(x))
        v1 = self.answers.fixed.mean_of(lambda x, v: (self.a.to_mean(x) - m1) ** 2)
        return self.answers._mix("effect", [(m1, v1), (self.own_mean, self.own_variance)])

    def quantile(self, p):
        mean, sd = self.summary()
        cloud = mean + sd * np.linspace(-4, 4, 2001).astype(LD), np.full(2001, LD(0))
        z = (cloud[0] - mean) / sd
        weight = np.exp(-z * z / 2)
        return quantile((cloud[0], weight / weight.sum()), self.below, p)

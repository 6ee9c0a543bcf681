"""One meta-analysis as lines of a reference table (read by tests/pool/reference_case.hpp)."""

import math

import numpy as np
from mpmath import mp

import noncentral_t
from likelihood import LD, Band, Exact, Normal, ld, log_likelihood
from marginal import Analysis, Effect, Spread
from posterior import LEVELS, Answers, OwnEffect
from table import exact

MODELS = ("fixed_null", "fixed_effect", "random_null", "random_effect")


def full(x):
    """An 80-bit number as decimal text."""
    return np.format_float_scientific(LD(x), precision=20, unique=True, trim="-")


def study_line(study):
    if isinstance(study, Exact):
        return ["study", "folded_t" if study.folded else "exact_t", exact(study.t), exact(study.df), exact(study.n)]
    if isinstance(study, Band):
        edges = [exact(float(e)) for pair in zip(study.low, study.high) for e in pair]
        return ["study", "t_band", exact(study.df), exact(study.n), *edges]
    return ["study", "folded_normal" if study.folded else "normal", exact(study.estimate), exact(study.se)]


def prior_lines(effect, spread):
    return [["effect", effect.family[0], *[exact(float(x)) for x in effect.family[1:]], effect.direction],
            ["spread", spread.family[0], *[exact(float(x)) for x in spread.family[1:]]]]


def at_zero(studies):
    """The log likelihood at mean 0 and spread 0, bands from their definition (they may lie deep in a tail)."""
    with mp.workdps(40):
        total = mp.mpf(0)
        for study in studies:
            if isinstance(study, Band):
                total += mp.log(sum(mp.exp(noncentral_t.log_band(float(a), float(b), study.df, 0, 30))
                                    for a, b in zip(study.low, study.high)))
            else:
                value = log_likelihood([study], [LD(0)], [LD(0)])[0]
                total += mp.mpf(float(value)) + mp.mpf(float(value - LD(float(value))))
        return ld(total)


def marginal_lines(studies, effect, spread, second=True, floor=5e-11):
    """The four log marginal likelihoods; `second` computes them again at other nodes for the error."""
    found = Analysis(studies, effect, spread).marginals()
    first = [value for value, _, _ in found]
    other = Analysis(studies, effect, spread, 1).log_marginals() if second else first
    if any(isinstance(s, Band) for s in studies):
        found[0] = (at_zero(studies), None, None)
        first = [found[0][0], *first[1:]]
        other = [found[0][0], *other[1:]]
    lines = []
    for model, value, again, (_, mean, width) in zip(MODELS, first, other, found):
        if mean is not None and not trusted(studies, mean, width):
            continue
        error = max(abs(float(value - again)), 3e-19 * size(studies, value), floor if not second else 1e-15)
        lines.append(["marginal", model, full(value), f"{error:.1e}"])
    return lines


def trusted(studies, mean, spread):
    """Whether bands keep their digits there: likelihood.py computes them without logarithms, which serves
    down to about e^-300. Such a model is left out of the table."""
    return all(log_likelihood([s], [mean], [spread])[0] > -250 for s in studies if isinstance(s, Band))


def size(studies, value):
    """The terms whose rounding counts."""
    squares = sum(s.t**2 if isinstance(s, Exact) else 1.0 for s in studies)
    return abs(float(value)) + squares + sum(getattr(s, "df", 1.0) for s in studies)


def posterior_lines(studies, effect, spread, own=()):
    answers = Answers(Analysis(studies, effect, spread))
    lines = []
    for which in ("effect_fixed", "effect_random", "effect"):
        mean, sd = answers.effect_moments(which)
        lines += [["moments", which, full(mean), full(sd)]]
        for p in LEVELS:
            lines.append(["quantile", which, repr(p), *map(full, answers.effect_quantile(which, p))])
        for place in sorted({0.0, *(round(float(mean + k * sd) * 256) / 256 for k in (-1.5, 0, 1.5))}):
            lines.append(["probability", which, exact(place), full(answers.effect_below(which, place))])
    mean, sd = answers.spread_moments()
    lines.append(["moments", "spread", full(mean), full(sd)])
    for p in LEVELS:
        lines.append(["quantile", "spread", repr(p), *map(full, answers.spread_quantile(p))])
    for place in sorted({max(1, round(float(k * mean) * 1024)) / 1024 for k in (0.3, 1, 2)}):
        lines.append(["probability", "spread", exact(place), full(answers.spread_below(place))])
    mean, sd = answers.effect_moments("effect")
    for k in (-2, 0.5):
        place = round(float(mean + k * sd) * 256) / 256
        lines.append(["probability", "new_study", exact(place), full(answers.new_study_below(place))])
    for index in own:
        effect_of = OwnEffect(answers, index)
        lower, upper = effect_of.quantile(0.025), effect_of.quantile(0.975)
        lines.append(["shrunken", str(index), *map(full, effect_of.summary()), *map(full, lower), *map(full, upper)])
    return lines


def deciding(studies):
    """Rows that bound the mean from both sides."""
    return sum(1 for s in studies if not isinstance(s, Band) and not s.folded)

#!/usr/bin/env python3
"""How a t rebuilt from medians behaves.

Draws two groups from one Normal population, keeps only the median with the quartiles (or with the
smallest and largest score), rebuilds mean and SD (Luo et al. 2018; Wan et al. 2014) and the t.
The rebuilt pooled variance varies like one with `df_share` h times 2n-2 df; `inflation` k is then what makes
t/sqrt(k) exceed the 95 % point of Student's t with h*(2n-2) df in 5 % of the draws. The last columns are true
error rates: at 5 % of the t as it stands, and at 1 % of the t as it stands and as lowered.
Quartiles are the usual sample quartiles (linear between order statistics).

Writes tests/reference/medians.csv. About a minute on one core:
    /usr/bin/python3 tests/oracle/medians.py
"""
import csv
import os

import numpy as np
from scipy import stats

REPLICATES = 400_000
SEED = 20180215


def mean_sd(kind, n, low, q1, med, q3, high):
    if kind == "quartiles":
        share = 0.7 + 0.39 / n
        mean = share * (q1 + q3) / 2 + (1 - share) * med
        sd = (q3 - q1) / (2 * stats.norm.ppf((0.75 * n - 0.125) / (n + 0.25)))
    else:
        share = 4 / (4 + n**0.75)
        mean = share * (low + high) / 2 + (1 - share) * med
        sd = (high - low) / (2 * stats.norm.ppf((n - 0.375) / (n + 0.25)))
    return mean, sd


def summaries(rng, n, count):
    x = rng.standard_normal((count, n))
    x.sort(axis=1)
    q1, med, q3 = np.quantile(x, [0.25, 0.5, 0.75], axis=1)
    return x[:, 0], q1, med, q3, x[:, -1]


def simulate(rng, n):
    out = {"quartiles": [], "range": []}
    left = REPLICATES
    while left > 0:
        count = min(left, 4_000_000 // n)
        left -= count
        one, two = summaries(rng, n, count), summaries(rng, n, count)
        for kind, parts in out.items():
            m1, s1 = mean_sd(kind, n, *one)
            m2, s2 = mean_sd(kind, n, *two)
            square = (s1**2 + s2**2) / 2
            parts.append(((m1 - m2) / np.sqrt(2 * square / n), square))
    return {kind: [np.concatenate(x) for x in zip(*parts)] for kind, parts in out.items()}


def lowered(t, square):
    """df from the spread of the pooled variance, then the inflation that makes the 5 % error right."""
    nu = 2 * np.mean(square) ** 2 / np.var(square)
    return (np.quantile(np.abs(t), 0.95) / stats.t.ppf(0.975, nu)) ** 2, nu


def main():
    rng = np.random.default_rng(SEED)
    here = os.path.dirname(os.path.abspath(__file__))
    with open(os.path.join(here, "..", "reference", "medians.csv"), "w", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(["kind", "n", "inflation", "df_share", "error_05", "error_01", "error_01_lowered"])
        for n in (5, 7, 10, 15, 20, 30, 50, 100, 200, 500):
            df = 2 * n - 2
            for kind, (t, square) in simulate(rng, n).items():
                k, nu = lowered(t, square)
                size = np.abs(t)
                errors = [np.mean(size > stats.t.ppf(0.975, df)), np.mean(size > stats.t.ppf(0.995, df)),
                          np.mean(size / np.sqrt(k) > stats.t.ppf(0.995, nu))]
                row = [kind, n, f"{k:.3f}", f"{nu / df:.3f}"] + [f"{e:.4f}" for e in errors]
                out.writerow(row)
                print(*row, flush=True)


if __name__ == "__main__":
    main()

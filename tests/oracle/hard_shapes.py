"""Makes tests/reference/hard_shapes.csv: the shapes that break fixed grids, and their answers."""

import math
import time

from case import deciding, marginal_lines, posterior_lines, prior_lines, study_line
from likelihood import LD, Band, Exact, Normal
from marginal import Effect, Spread
from table import Stopwatch, write_lines

INF = float("inf")
DEFAULT_EFFECT = ("cauchy", 0.0, 0.7071067811865476)
DEFAULT_SPREAD = ("inverse-gamma", 1.0, 0.15)


class Repeated:
    """Many studies with the same numbers."""

    def __init__(self, study, count):
        self.study, self.count = study, count
        self.t, self.df, self.n, self.folded = study.t, study.df * count, study.n, study.folded

    def add(self, mean, spread, out):
        one = out * 0
        self.study.add(mean, spread, one)
        out += one * self.count

    def centers(self):
        return self.study.centers()

    def width(self):
        return self.study.width() / math.sqrt(self.count)


def two_groups(t, per_group, folded=False):
    return Exact(t, 2 * per_group - 2, per_group / 2, folded)


def significant(per_group, c=2.0244140625):
    return Band([(-INF, -c), (c, INF)], 2 * per_group - 2, per_group / 2)


def shapes():
    """(name, studies, effect prior, spread prior, own effects to integrate)."""
    effect, spread = Effect(DEFAULT_EFFECT), Spread(DEFAULT_SPREAD)
    yield "one-study", [two_groups(2.375, 30)], effect, spread, None
    yield "one-huge-t", [two_groups(50.0, 20)], effect, spread, None
    yield "far-apart", [two_groups(20.0, 50), two_groups(-20.0, 50)], effect, spread, []
    yield "two-unsigned-significant", [significant(20), significant(25)], effect, spread, None
    yield "two-unsigned-t", [two_groups(2.5, 20, True), two_groups(3.125, 25, True)], effect, spread, None
    narrow = Effect(("cauchy", 0.0, 0.001)), Spread(("half-cauchy", 0.01))
    yield "narrow-against-t-10", [two_groups(10.0, 50), two_groups(9.5, 40), two_groups(10.5, 60)], *narrow, []
    yield "narrow-against-two", [two_groups(10.0, 50), two_groups(0.5, 40)], *narrow, None
    yield "giant-beside-dwarf", [two_groups(25.0, 500), Exact(1.5, 2.0, 3.0)], effect, spread, None
    yield "giant-beside-dwarfs", [two_groups(25.0, 500), Exact(1.5, 2.0, 3.0), Exact(-0.25, 2.0, 3.0)], effect, spread, [0]
    yield "all-zero", [two_groups(0.0, m) for m in (10, 15, 20, 40, 80)], effect, spread, [1]
    edge = Effect(("uniform", -0.1875, 0.34375)), Spread(("uniform", 0.0625, 0.3125))
    yield "uniform-edges-cut", [two_groups(3.0, 60), two_groups(2.0, 40), two_groups(2.5, 50)], *edge, []
    yield "edge-far-below", [two_groups(9.0, 60), two_groups(8.0, 40), two_groups(8.5, 50)], *edge, None
    less = Effect(DEFAULT_EFFECT, "less")
    yield "opposite-direction", [two_groups(9.0, 80), two_groups(7.0, 90), two_groups(8.0, 85)], less, spread, []
    yield "mildly-opposite", [two_groups(0.75, 80), two_groups(-0.25, 90), two_groups(1.5, 85)], less, spread, []
    hundred = [(1.25, 20), (2.5, 50), (-0.5, 30), (3.75, 80), (0.0, 25), (1.75, 40), (0.875, 100), (2.125, 35),
               (-1.375, 60), (4.5, 150)]
    yield ("hundred-thousand", [Repeated(two_groups(t, m), 10000) for t, m in hundred], effect, spread, None)
    # Rubin (1981), Journal of Educational Statistics 6, table 1: eight coaching programmes.
    schools = [Normal(*s) for s in zip((28, 8, -3, 7, -1, 1, 18, 12), (15, 10, 16, 11, 9, 11, 10, 18))]
    yield "eight-schools", schools, Effect(("normal", 0.0, 20.0)), Spread(("half-cauchy", 25.0)), [0, 2]
    yield "eight-schools-uniform", schools, Effect(("normal", 0.0, 1000.0)), Spread(("uniform", 0.0, 1000.0)), []


def block(name, studies, effect, spread, own):
    lines = [["case", name], *prior_lines(effect, spread)]
    for study in studies:
        if isinstance(study, Repeated):
            lines += [study_line(study.study), ["repeat", str(study.count)]]
        else:
            lines.append(study_line(study))
    lines += marginal_lines(studies, effect, spread)
    if own is not None:
        lines += posterior_lines(studies, effect, spread, own)
    return "".join(",".join(line) + "\n" for line in lines)


def main():
    clock = Stopwatch()
    blocks = []
    for shape in shapes():
        start = time.process_time()
        blocks.append(block(*shape))
        print(f"{shape[0]}: {time.process_time() - start:.1f} s", flush=True)
    header = clock.header([
        "Meta-analyses of shapes that break fixed grids, and Rubin's eight schools (1981). Natural logs.",
        "Adaptive Gauss-Legendre cubature in 80-bit arithmetic (tests/oracle/marginal.py); the last number of a",
        "marginal is how far the same integral with another rule and other nodes is off.",
    ])
    write_lines("hard_shapes.csv", header, blocks)


if __name__ == "__main__":
    main()

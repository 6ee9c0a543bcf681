"""Writing reference tables: exact inputs, fifty digits, and a header that says how they were made."""

import decimal
import pathlib
import platform
import sys
import time

import mpmath
from mpmath import mp

REFERENCE = pathlib.Path(__file__).resolve().parent.parent / "reference"


def exact(x):
    """The exact decimal text of a binary number (every double has one)."""
    if x in (float("inf"), float("-inf")):
        return "inf" if x > 0 else "-inf"
    text = format(decimal.Decimal(x), "f") if 1e-12 < abs(x) < 1e15 or x == 0 else str(decimal.Decimal(x))
    return text.rstrip("0").rstrip(".") if "." in text and "E" not in text else text


def digits(value, count):
    """`count` significant digits of an mpf; numbers too small for a double are written as zero."""
    if value == mp.ninf:
        return "-inf"
    if abs(value) < mp.mpf(10) ** -300:
        return "0"
    return mp.nstr(value, count, min_fixed=-4, max_fixed=20)


def dyadic(x, bits=10):
    """x rounded to `bits` significant bits, so that its decimal text is short and exact."""
    import math
    if x == 0:
        return 0.0
    mantissa, exponent = math.frexp(x)
    return math.ldexp(round(mantissa * 2**bits), exponent - bits)


class Stopwatch:
    def __init__(self):
        self.start = time.time()

    def header(self, lines):
        """Comment lines with the run time and the tools; `lines` say what the table holds."""
        took = time.time() - self.start
        tools = f"Python {platform.python_version()}, mpmath {mpmath.__version__} ({mpmath.libmp.BACKEND})"
        made = f"Made by tests/oracle/{pathlib.Path(sys.argv[0]).name} in {took:.0f} s on one core; {tools}."
        return "".join(f"# {line}\n" for line in [*lines, made])


def write(name, header, columns, rows):
    path = REFERENCE / name
    path.write_text(header + ",".join(columns) + "\n" + "".join(",".join(row) + "\n" for row in rows))
    print(f"{path}: {len(rows)} rows")


def write_lines(name, header, blocks):
    """A table whose lines are of several kinds, the first field saying which."""
    path = REFERENCE / name
    path.write_text(header + "".join(blocks))
    print(f"{path}: {len(blocks)} cases")

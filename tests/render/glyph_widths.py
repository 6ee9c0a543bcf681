#!/usr/bin/python3
"""Measures the advance widths of DejaVu Sans (book and bold) for src/render/svg/glyph_widths.inc.

glyph_widths.py            writes the table to standard output
glyph_widths.py --check F  compares the table in F with the installed font; 77 (skip) without the font

The font: Debian package fonts-dejavu-core 2.37 (Bitstream Vera licence). Widths are facts read from
its `cmap` and `hmtx` tables, in thousandths of an em, rounded up.
"""
import struct
import sys

FOLDER = "/usr/share/fonts/truetype/dejavu/"
RANGES = [(0x20, 0x7E), (0xA0, 0x24F), (0x370, 0x3FF), (0x400, 0x52F), (0x5D0, 0x5EA), (0x620, 0x64A),
          (0x1E00, 0x1EFF), (0x2010, 0x2044), (0x2070, 0x208E), (0x20A0, 0x20B5), (0x2190, 0x2199),
          (0x2200, 0x22FF), (0x25A0, 0x25CF), (0x2400, 0x2424)]


def widths(file):
    data = open(file, "rb").read()
    tables = {}
    for i in range(struct.unpack(">H", data[4:6])[0]):
        tag, _, offset, length = struct.unpack(">4sIII", data[12 + 16 * i:28 + 16 * i])
        tables[tag] = (offset, length)
    at = lambda tag, offset, form: struct.unpack_from(">" + form, data, tables[tag][0] + offset)
    units = at(b"head", 18, "H")[0]
    long_metrics = at(b"hhea", 34, "H")[0]
    glyph_of = {}
    for i in range(at(b"cmap", 2, "H")[0]):
        platform, encoding, start = at(b"cmap", 4 + 8 * i, "HHI")
        if at(b"cmap", start, "H")[0] == 4 and (platform, encoding) == (3, 1):
            segments = at(b"cmap", start + 6, "H")[0] // 2
            column = lambda k: [at(b"cmap", start + 14 + 2 * segments * k + (2 if k else 0) + 2 * j, "H")[0]
                                for j in range(segments)]
            ends, starts, deltas, offsets = column(0), column(1), column(2), column(3)
            base = start + 14 + 2 * segments * 3 + 2
            for j in range(segments):
                for code in range(starts[j], min(ends[j], 0xFFFE) + 1):
                    if offsets[j] == 0:
                        glyph = (code + deltas[j]) & 0xFFFF
                    else:
                        glyph = at(b"cmap", base + 2 * j + offsets[j] + 2 * (code - starts[j]), "H")[0]
                        glyph = (glyph + deltas[j]) & 0xFFFF if glyph else 0
                    if glyph:
                        glyph_of[code] = glyph
    advance = lambda glyph: at(b"hmtx", 4 * min(glyph, long_metrics - 1), "H")[0]
    return {code: -(-advance(glyph) * 1000 // units) for code, glyph in glyph_of.items()}


def table():
    book, bold = widths(FOLDER + "DejaVuSans.ttf"), widths(FOLDER + "DejaVuSans-Bold.ttf")
    out = ["// Advance widths of DejaVu Sans 2.37 in thousandths of an em: {first, last, book, bold}.",
           "// Written by tests/render/glyph_widths.py; runs of equal widths are one entry."]
    rows = []
    for first, last in RANGES:
        for code in range(first, last + 1):
            if code not in book:
                continue
            entry = (book[code], bold.get(code, book[code]))
            if rows and rows[-1][1] == code - 1 and rows[-1][2:] == entry:
                rows[-1] = (rows[-1][0], code) + entry
            else:
                rows.append((code, code) + entry)
    line = ""
    for first, last, book_width, bold_width in rows:
        item = f"{{0x{first:X}, 0x{last:X}, {book_width}, {bold_width}}}, "
        if len(line) + len(item) > 109:
            out.append(line.rstrip())
            line = ""
        line += item
    out.append(line.rstrip())
    return "\n".join(out) + "\n"


if __name__ == "__main__":
    try:
        made = table()
    except FileNotFoundError as missing:
        print(f"the pinned font is not installed: {missing}")
        sys.exit(77)
    if sys.argv[1:2] == ["--check"]:
        same = made == open(sys.argv[2], encoding="ascii").read()
        print("the table matches the font" if same else "the table differs from the font")
        sys.exit(0 if same else 1)
    sys.stdout.write(made)

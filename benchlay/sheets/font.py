"""The font that sheets are lettered in, read from the file that comes with benchlay.

DejaVu Sans Condensed 2.37, of free licence (``fonts/LICENSE.txt``), without the scripts that a
title block does not need; made by ``tests/sheets/font_from_debian.py``. Only what lettering
and embedding need is read of it: which glyph draws a letter, how wide each is, and the
outlines of those that are used.

References
----------
The OpenType specification: tables head, hhea, hmtx, maxp, cmap (format 4), loca, glyf.
"""

from __future__ import annotations

import itertools
import struct
from collections.abc import Iterable, Mapping
from functools import cache
from pathlib import Path

from benchlay.named import NamedTuple

NAME = "DejaVuSansCondensed"
FILE = f"{NAME}.ttf"
UNITS_PER_EM = 2048
CAP_HEIGHT = 1493  # of H; the file itself does not say it

_CAME_FIRST = ("head", "hhea", "maxp", "hmtx", "loca", "glyf")  # what an embedded font must have
_COMPOSITE = struct.Struct(">HH")
_WORDS, _SCALE, _MORE, _TWO_SCALES, _MATRIX = 0x1, 0x8, 0x20, 0x40, 0x80
_MAGIC = 0xB1B0AFBA  # the sum of a whole font file's words, by definition
_WORD = 0xFFFFFFFF


class Font(NamedTuple):
    """What is known of the font."""

    tables: Mapping[str, bytes]
    glyphs: Mapping[str, int]  # by letter
    advances: tuple[int, ...]  # by glyph, in units of the em

    def advance(self, text: str) -> int:
        """Return how wide a line is; a letter that the font lacks takes the missing one's box."""
        return sum(self.advances[self.glyphs.get(letter, 0)] for letter in text)


@cache
def font() -> Font:
    """Return the font, read once."""
    data = (Path(__file__).parent / "fonts" / FILE).read_bytes()
    tables = {}
    for n in range(struct.unpack_from(">H", data, 4)[0]):
        tag, _, start, length = struct.unpack_from(">4sIII", data, 12 + 16 * n)
        tables[tag.decode("ascii")] = data[start : start + length]
    return Font(tables, _glyphs(tables["cmap"]), _advances(tables))


def _advances(tables: Mapping[str, bytes]) -> tuple[int, ...]:
    """Return the widths; those of the last glyphs are all the same and stand once."""
    (count,) = struct.unpack_from(">H", tables["maxp"], 4)
    (wide,) = struct.unpack_from(">H", tables["hhea"], 34)
    widths = [w for w, _ in struct.iter_unpack(">Hh", tables["hmtx"][: 4 * wide])]
    return tuple(widths + widths[-1:] * (count - wide))


def _glyphs(cmap: bytes) -> dict[str, int]:
    """Return the glyph of each letter: the table for Windows and Unicode, format 4."""
    (count,) = struct.unpack_from(">H", cmap, 2)
    records = [struct.unpack_from(">HHI", cmap, 4 + 8 * n) for n in range(count)]
    (at,) = [offset for platform, encoding, offset in records if (platform, encoding) == (3, 1)]
    (doubled,) = struct.unpack_from(">H", cmap, at + 6)
    segments = doubled // 2
    ends, starts, deltas, ranges = (
        struct.unpack_from(f">{segments}H", cmap, at + 14 + skip)
        for skip in (0, doubled + 2, 2 * doubled + 2, 3 * doubled + 2)
    )
    out = {}
    for n in range(segments):
        for code in range(starts[n], min(ends[n], 0xFFFE) + 1):
            glyph = code
            if ranges[n]:
                base = at + 16 + 3 * doubled + 2 * n
                place = base + ranges[n] + 2 * (code - starts[n])
                (glyph,) = struct.unpack_from(">H", cmap, place)
            if glyph or not ranges[n]:
                glyph = (glyph + deltas[n]) & 0xFFFF
            if glyph:
                out[chr(code)] = glyph
    return out


def subset(glyphs: Iterable[int]) -> bytes:
    """Return the font as a file in which the glyphs that are not needed are empty.

    Numbers of glyphs stay what they are. The glyph of missing letters is always there.
    """
    tables = dict(font().tables)
    offsets = [2 * n for (n,) in struct.iter_unpack(">H", tables["loca"])]  # the short form
    outlines = [tables["glyf"][a:b] for a, b in itertools.pairwise(offsets)]
    wanted = _with_parts({0, *glyphs}, outlines)
    kept = [outline if n in wanted else b"" for n, outline in enumerate(outlines)]
    places = [0]
    for outline in kept:
        places.append(places[-1] + len(outline))
    tables["glyf"] = b"".join(kept)
    tables["loca"] = struct.pack(f">{len(places)}H", *(n // 2 for n in places))
    return _file({name: tables[name] for name in _CAME_FIRST})


def _with_parts(glyphs: set[int], outlines: list[bytes]) -> set[int]:
    """Return glyphs with those that they are put together from."""
    todo, done = set(glyphs), set[int]()
    while todo:
        glyph = todo.pop()
        done.add(glyph)
        todo |= set(_parts(outlines[glyph])) - done
    return done


def _parts(outline: bytes) -> list[int]:
    if not outline or struct.unpack_from(">h", outline)[0] >= 0:
        return []
    out, at, more = [], 10, True
    while more:
        flags, glyph = _COMPOSITE.unpack_from(outline, at)
        out.append(glyph)
        at += 4 + (4 if flags & _WORDS else 2)
        at += 2 * bool(flags & _SCALE) + 4 * bool(flags & _TWO_SCALES) + 8 * bool(flags & _MATRIX)
        more = bool(flags & _MORE)
    return out


def _sum(data: bytes) -> int:
    padded = data + b"\0" * (-len(data) % 4)
    words: list[int] = [word for (word,) in struct.iter_unpack(">I", padded)]
    return sum(words) & _WORD


def _file(tables: dict[str, bytes]) -> bytes:
    """Return tables as a font file."""
    head = bytearray(tables["head"])
    head[8:12] = b"\0\0\0\0"
    tables["head"] = bytes(head)
    power = len(tables).bit_length() - 1
    out = struct.pack(
        ">IHHHH", 0x10000, len(tables), 16 << power, power, 16 * (len(tables) - (1 << power))
    )
    at, body = 12 + 16 * len(tables), b""
    for name in sorted(tables):
        data = tables[name]
        out += struct.pack(">4sIII", name.encode(), _sum(data), at + len(body), len(data))
        body += data + b"\0" * (-len(data) % 4)
    whole = bytearray(out + body)
    place = at + sum((len(tables[n]) + 3) // 4 * 4 for n in sorted(tables) if n < "head") + 8
    whole[place : place + 4] = struct.pack(">I", (_MAGIC - _sum(bytes(whole))) & _WORD)
    return bytes(whole)

"""The bones of a PDF file: numbered objects, streams, the table of where they are.

Nothing is compressed: the bytes then depend on nothing but the drawing, and a comparison of
two revisions can be read. ISO 32000-1 (PDF 1.7).
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from hashlib import sha256

_ASCII_LAST = 0x7E
_DECIMALS = 4  # a tenth of a micrometre on paper


class Raw(str):
    """Something that is PDF already: a reference, an array, a number, a name."""

    __slots__ = ()


def number(value: float) -> str:
    """Write a number: rounded, without trailing zeros or a minus zero."""
    text = f"{value:.{_DECIMALS}f}".rstrip("0").rstrip(".")
    return "0" if text in ("-0", "") else text


def name(text: str) -> Raw:
    """Write a name; what is not a plain letter goes in as its code."""
    return Raw(
        "/" + "".join(c if (c.isalnum() and c.isascii()) or c in "-_+" else _code(c) for c in text)
    )


def _code(letter: str) -> str:
    return "".join(f"#{byte:02X}" for byte in letter.encode("utf-8", "replace"))


def string(text: str) -> Raw:
    """Write a text for people: plain where it can be, else as UTF-16."""
    if all(" " <= c <= chr(_ASCII_LAST) for c in text):
        return Raw("(" + "".join(f"\\{c}" if c in "()\\" else c for c in text) + ")")
    return Raw("<FEFF" + text.encode("utf-16-be", "replace").hex().upper() + ">")


def array(items: Iterable[str]) -> Raw:
    """Write an array."""
    return Raw("[" + " ".join(items) + "]")


def dictionary(entries: Mapping[str, str]) -> Raw:
    """Write a dictionary; its keys are names."""
    return Raw("<<" + " ".join(f"{name(key)} {value}" for key, value in entries.items()) + ">>")


class PdfFile:
    """Objects in the order in which they were asked for."""

    def __init__(self) -> None:
        """Start with none."""
        self._objects: list[bytes] = []

    def reserve(self) -> Raw:
        """Return a reference to an object that is given later."""
        self._objects.append(b"")
        return Raw(f"{len(self._objects)} 0 R")

    def give(self, reference: str, body: str | bytes) -> None:
        """Say what a reserved object is."""
        data = body.encode("ascii") if isinstance(body, str) else body
        self._objects[int(reference.split()[0]) - 1] = data

    def add(self, body: str | bytes) -> Raw:
        """Add an object and return the reference to it."""
        reference = self.reserve()
        self.give(reference, body)
        return reference

    def add_stream(self, content: bytes, entries: Mapping[str, str] | None = None) -> Raw:
        """Add a stream of bytes and return the reference to it."""
        head = dictionary({"Length": str(len(content)), **(entries or {})})
        return self.add(head.encode("ascii") + b"\nstream\n" + content + b"\nendstream")

    def finish(self, root: str, info: str) -> bytes:
        """Return the whole file."""
        out = bytearray(b"%PDF-1.7\n%\xe2\xe3\xcf\xd3\n")
        places = []
        for n, body in enumerate(self._objects, start=1):
            places.append(len(out))
            out += b"%d 0 obj\n" % n + body + b"\nendobj\n"
        start = len(out)
        out += b"xref\n0 %d\n0000000000 65535 f \n" % (len(places) + 1)
        out += b"".join(b"%010d 00000 n \n" % place for place in places)
        own = f"<{sha256(bytes(out)).hexdigest()[:32]}>"
        entries = {
            "Size": str(len(places) + 1),
            "Root": root,
            "Info": info,
            "ID": array((own, own)),
        }
        out += f"trailer\n{dictionary(entries)}\nstartxref\n{start}\n%%EOF\n".encode("ascii")
        return bytes(out)

"""What may stand in the text of a DXF file, and how its numbers are rounded."""

from __future__ import annotations

import re

from benchlay.sheets.lettering import plain

# Group codes whose values are floating-point numbers.
_FLOATS = frozenset(
    [*range(10, 60), *range(110, 150), *range(210, 240), *range(460, 470), *range(1010, 1060)]
)
_LARGE = 1e9


def safe_text(text: str) -> str:
    r"""Text for TEXT and ATTRIB, with nothing in it that a reader takes as a command.

    A pair of per cent signs is set apart by a thin space; carets are escaped as the format
    says; a backslash before ``U+``, ``u+`` or ``M+`` is set apart likewise.

    Examples
    --------
    >>> safe_text("99 %"), ascii(safe_text("%%d")), ascii(safe_text(r"\U+0041"))
    ('99 %', "'%\\u2009%d'", "'\\\\\\u2009U+0041'")
    """
    text = re.sub(r"%(?=%)", "%\N{THIN SPACE}", plain(text))
    text = re.sub(r"\\(?=[UuMm]\+)", "\\\\\N{THIN SPACE}", text)
    return text.replace("^", "^ ")


def safe_markup(text: str) -> str:
    r"""Text for a dimension: as `safe_text`, and with its commands escaped.

    Examples
    --------
    >>> safe_markup(r"{\P}")
    '\\{\\\\P\\}'
    """
    # The pair of angle brackets would be replaced by the measured figure.
    text = re.sub(r"<(?=>)", "<\N{THIN SPACE}", safe_text(text))
    return re.sub(r"[\\{}]", r"\\\g<0>", text)


def rounded(text: str) -> str:
    """Round every number to a millionth of its unit; last bits differ between machines."""
    lines = text.split("\n")
    for n in range(0, len(lines) - 1, 2):
        if int(lines[n]) in _FLOATS:
            value = float(lines[n + 1])
            if abs(value) < _LARGE:
                lines[n + 1] = f"{round(value, 6) + 0.0!r}"
    return "\n".join(lines)

"""The layers of every sheet, in the order of inking, and how beams are told apart.

Wavelength gives a beam its pattern, the hazard its width; colour is an extra that a black and
white print does without. Solid lines are kept for what is made of matter, short dashes for
strays. The patterns are of our own choosing, tried in black and white: a fixed period of
about 11 mm that shows on short legs whatever the width.
"""

from __future__ import annotations

from collections.abc import Iterable

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import Layer

# Names are those that CAD programs have always used: some know patterns by name alone and
# draw their own, so each name must mean much the same to them.
_PATTERNS: tuple[tuple[str, tuple[float, ...]], ...] = (
    ("DASHDOT", (8.4, 1.2, 0.35, 1.2)),
    ("DIVIDE", (8.4, 1.2, 0.35, 1.2, 0.35, 1.2)),
    ("DOT", (0.5, 1.4)),
    ("BORDER", (4.2, 1.2, 4.2, 1.2, 0.35, 1.2)),
    ("DASHEDX2", (8.4, 2.0)),
    ("DIVIDEX2", (8.4, 1.2, 0.35, 1.2, 0.35, 1.2, 0.35, 1.2)),
    ("DASHDOT2", (4.2, 1.2, 0.35, 1.2)),
)
STRAY_PATTERN_MM = (2.1, 1.05)

# Dark and unlike each other in grey too; nothing invisible is given a visible hue.
_HUES = (
    (400.0, "#4a4a68"),  # ultraviolet
    (450.0, "#4b1d8f"),
    (495.0, "#123f9c"),
    (570.0, "#0f6b2e"),
    (620.0, "#8a5a00"),
    (700.0, "#a31515"),
)
_INFRARED = "#5a3a2a"

WIDTHS_MM = (0.35, 0.5, 0.7)  # below class 3B, 3B, 4: as modelled


class BeamLook(NamedTuple):
    """A wavelength on the sheet, and the width its hazard calls for."""

    wavelength_nm: float
    width_mm: float = WIDTHS_MM[0]


def beam_layer(wavelength_nm: float) -> str:
    """Return the name of the layer of a wavelength's working beams.

    Examples
    --------
    >>> beam_layer(532.0), beam_layer(632.8)
    ('BEAM_532', 'BEAM_632_8')
    """
    return "BEAM_" + f"{wavelength_nm:.4f}".rstrip("0").rstrip(".").replace(".", "_")


def wavelength_words(wavelength_nm: float, decimal: str) -> str:
    """Return a wavelength as it is written on the sheet."""
    number = f"{wavelength_nm:.4f}".rstrip("0").rstrip(".")
    return number.replace(".", decimal) + " nm"


def sheet_layers(beams: Iterable[BeamLook]) -> tuple[Layer, ...]:
    """Return every layer, lowest ink first."""
    ordered = sorted(beams)
    return (
        Layer("HAZARD", "hazard zones: limit and hatched rim", "#8a1c00", 0.25),
        Layer("HOLES", "mounting holes", "#808080", 0.13),
        Layer("ENVELOPE", "beam envelopes, 1/e2 radius", "#8c8c8c", 0.13),
        Layer("BODIES", "mounts, posts and bodies", "#404040", 0.25),
        Layer("AXIS", "axes of elements", "#404040", 0.25, (6.0, 1.0, 0.35, 1.0), "CENTER"),
        Layer("STRAY", "stray light", "#b00060", 0.35, STRAY_PATTERN_MM, "DASHED2"),
        *(_beam(look, n) for n, look in enumerate(ordered)),
        Layer("PANELS", "enclosure panels", width_mm=0.5),
        Layer("OPTICS", "outlines of optics", width_mm=0.5),
        Layer("BENCH", "outline of the bench", width_mm=0.5),
        Layer("DATUM", "datum and directions", width_mm=0.35),
        Layer("DIMENSIONS", "dimensions", width_mm=0.25),
        Layer("LEVELS", "heights above the bench top", width_mm=0.25),
        Layer("TAGS", "tags and leaders", width_mm=0.25),
        Layer("SHEET", "frame", width_mm=0.7),
        Layer("TITLE", "title block and zones of the sheet", width_mm=0.35),
        Layer("REVISION", "revisions", width_mm=0.25),
        Layer("NOTES", "notes", width_mm=0.25),
        Layer("TABLES", "legend and schedules", width_mm=0.25),
        Layer("VIEWPORT", "edge of the view; not printed", width_mm=0.13),
    )


def _beam(look: BeamLook, rank: int) -> Layer:
    name = beam_layer(look.wavelength_nm)
    meaning = f"working beams, {look.wavelength_nm:g} nm"
    words, pattern = _PATTERNS[rank % len(_PATTERNS)]
    colour = _hue(look.wavelength_nm)
    return Layer(name, meaning, colour, look.width_mm, pattern, words)


def _hue(wavelength_nm: float) -> str:
    for limit, colour in _HUES:
        if wavelength_nm < limit:
            return colour
    return _INFRARED

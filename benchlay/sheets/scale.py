"""Sheet sizes, scales, and which of them a view is drawn on.

Sizes follow ISO 5457 (trimmed; A4 stands upright, the others lie), scales ISO 5455, both from
memory.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import Point

SIZES_MM: dict[str, Point] = {
    "A4": (210.0, 297.0),
    "A3": (420.0, 297.0),
    "A2": (594.0, 420.0),
    "A1": (841.0, 594.0),
    "A0": (1189.0, 841.0),
}
SCALES = (1, 2, 5, 10, 20, 50, 100, 200, 500)

PLAN_SIZES = tuple(SIZES_MM)[1:]  # beside its tables a plan has no room on A4

LARGEST = PLAN_SIZES[-1]

LEFT_MARGIN_MM = 20.0  # for filing; the others
MARGIN_MM = 10.0

# At 1:5 an inch of glass is 5 mm wide and its coated side can be told; at 1:10 just; beyond
# that elements are specks. So a larger sheet is taken before a smaller scale, but A1,
# which few can print, only before elements become specks, and A0 when everything else failed.
_PREFERENCES = (
    (("A3",), 5),
    (("A2",), 5),
    (("A3",), 10),
    (("A2",), 10),
    (("A1",), 10),
    (("A3", "A2"), 20),
    (("A1", "A0"), 20),
    (("A0",), SCALES[-1]),
)

COLUMN_MM = 112.0  # tables at the right
BELOW_MM = 76.0  # title block, and two rows of dimensions under the view
ABOVE_MM = 20.0  # title of the view
BESIDE_MM = 28.0  # a row of dimensions at the left


class Window(NamedTuple):
    """A rectangle on the paper, in mm from the sheet's lower left corner."""

    left: float
    low: float
    right: float
    high: float

    @property
    def width(self) -> float:
        """From left to right."""
        return self.right - self.left

    @property
    def height(self) -> float:
        """From low to high."""
        return self.high - self.low


class Choice(NamedTuple):
    """The sheet and scale of a view."""

    sheet: str
    size_mm: Point
    scale: int  # N of 1:N


class NothingFitsError(ValueError):
    """No listed sheet and scale hold the view."""


def frame_of(size_mm: Point) -> Window:
    """Return the drawing space of a sheet: inside its frame."""
    width, height = size_mm
    return Window(LEFT_MARGIN_MM, MARGIN_MM, width - MARGIN_MM, height - MARGIN_MM)


def view_of(size_mm: Point) -> Window:
    """Return where the main view may lie: left of the tables, above the title block."""
    frame = frame_of(size_mm)
    return Window(
        frame.left + BESIDE_MM,
        frame.low + BELOW_MM,
        frame.right - COLUMN_MM,
        frame.high - ABOVE_MM,
    )


def choose(view_mm: Point, sheet: str | None = None, scale: int | None = None) -> Choice:
    """Choose the largest listed scale on the handiest sheet that holds the view.

    Parameters
    ----------
    view_mm : tuple of float
        Width and height of what is to be shown, true size, mm.
    sheet, scale : str or int, optional
        What the drafter asked for; the other is then chosen to suit.

    Raises
    ------
    NothingFitsError
        If nothing listed holds the view; the message says what was tried.
    """
    for sheets, smallest in _PREFERENCES:
        for name in (sheet,) if sheet else sheets:
            limit = SCALES[-1] if sheet else smallest
            fits = _largest(view_mm, SIZES_MM[name], limit, scale)
            if fits is not None:
                return Choice(name, SIZES_MM[name], fits)
    asked = f"{sheet or 'A3 to A0'} at {f'1:{scale}' if scale else 'any listed scale'}"
    msg = f"{view_mm[0]:.0f} by {view_mm[1]:.0f} mm do not fit on {asked}"
    raise NothingFitsError(msg)


def choices(view_mm: Point, sheet: str | None = None, scale: int | None = None) -> Iterator[Choice]:
    """Return what `choose` does, then larger sheets on which nothing is drawn smaller.

    They are for a view that is too full for the first.

    Raises
    ------
    NothingFitsError
        See `choose`.
    """
    first = choose(view_mm, sheet, scale)
    yield first
    if sheet:
        return
    for name in PLAN_SIZES[PLAN_SIZES.index(first.sheet) + 1 :]:
        fits = _largest(view_mm, SIZES_MM[name], first.scale, scale)
        if fits is not None:
            yield Choice(name, SIZES_MM[name], fits)


def _largest(view_mm: Point, size_mm: Point, smallest: int, scale: int | None) -> int | None:
    window = view_of(size_mm)
    for denominator in (scale,) if scale else SCALES:
        fits = (
            view_mm[0] <= window.width * denominator and view_mm[1] <= window.height * denominator
        )
        if fits and (scale or denominator <= smallest):
            return denominator
    return None

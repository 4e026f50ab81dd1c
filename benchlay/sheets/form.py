"""The form that a sheet is filled in on: frame, title block, caution, revisions, a window.

How to use it, for any sheet that is not the plan::

    from benchlay.sheets.form import form_for

    form = form_for(fields, content_mm=(170.0, 200.0))   # the smallest sheet that holds it
    form = form_for(fields, size="A3")                    # or one by its size
    window = form.window                                  # where the content may go, on paper
    scale = form.scale_for((600.0, 400.0))                # N of 1:N for a view of so many mm
    sheet = form.sheet("drilling", "holes of the bench", model=..., paper=..., scale=scale)

`fields` comes from `benchlay.sheets.drafting.title_fields(layout, "Drilling sheet", sha256)`;
``fields._replace(tolerance="ISO 2768-m")`` states the tolerance where dimensions state none,
and the number in the set goes in by ``fields._replace(sheet=number)``. What is drawn on paper
(`paper`) has its origin in the sheet's lower left corner. What is drawn true to size
(`model`) has its origin at `origin_mm` on paper; by default `form.middle` of the view's box.
Tables and notes that fill a window from the top are in `benchlay.sheets.tables`. Everything
that the form itself draws lies outside `window`; where there is room left of the title block,
`form.beside` is a second window.
"""

from __future__ import annotations

from collections.abc import Iterable

from benchlay.exposure.cautions import SHORT
from benchlay.named import NamedTuple
from benchlay.sheets.frame import WIDTH_MM, frame, rectangle
from benchlay.sheets.layers import BeamLook, sheet_layers
from benchlay.sheets.lettering import LINE_PITCH, SMALL_MM, wrap
from benchlay.sheets.primitives import Block, Layer, Point, Primitive, Sheet, Text
from benchlay.sheets.scale import SCALES, SIZES_MM, NothingFitsError, Window, frame_of
from benchlay.sheets.tables import Column, Drawn, Table, table
from benchlay.sheets.title_block import HEIGHT_MM, TitleFields, title_block

CAUTION = SHORT
_CLEAR_MM = 2.0
_PAD_MM = 1.4
_OWN_LETTERS = 0.8  # of a line: stroke fonts that readers of DXF put in ours' place are wider
_LEAST_BESIDE_MM = 40.0  # narrower is of no use
_MOST_REVISIONS = 3  # the last ones; all stand on the plan
_REVISIONS = (
    Column("Rev", 11.0),
    Column("Date", 24.0),
    Column("Change", 117.0),
    Column("By", 28.0),
)


class Form(NamedTuple):
    """A sheet with nothing on it yet but what every sheet has."""

    size: str  # A3
    size_mm: Point
    fields: TitleFields
    primitives: tuple[Primitive, ...]  # of the form, on paper
    window: Window  # for the content, on paper: all above the title block
    beside: Window | None = None  # left of the title block, where there is room

    def scale_for(self, view_mm: Point, window: Window | None = None) -> int:
        """Return N of the largest listed scale 1:N at which a view fits into a window.

        Raises
        ------
        NothingFitsError
            If it does not fit at any.
        """
        room = self.window if window is None else window
        for n in SCALES:
            if view_mm[0] <= room.width * n and view_mm[1] <= room.height * n:
                return n
        msg = f"{view_mm[0]:.0f} by {view_mm[1]:.0f} mm do not fit on {self.size} at any scale"
        raise NothingFitsError(msg)

    def middle(self, view: Window, scale: float, window: Window | None = None) -> Point:
        """Return where the model's origin lies on paper for a view to stand in the middle.

        Parameters
        ----------
        view : Window
            The view's corners in the model, mm.
        scale : float
            N of 1:N.
        window : Window, optional
            On paper; the form's own by default.
        """
        room = self.window if window is None else window
        return (
            (room.left + room.right) / 2 - (view.left + view.right) / 2 / scale,
            (room.low + room.high) / 2 - (view.low + view.high) / 2 / scale,
        )

    def sheet(
        self,
        name: str,
        description: str,
        *,
        model: Iterable[Primitive] = (),
        paper: Iterable[Primitive] = (),
        scale: float = 1.0,
        origin_mm: Point = (0.0, 0.0),
        blocks: Iterable[Block] = (),
        beams: Iterable[BeamLook] = (),
        layers: Iterable[Layer] | None = None,
        properties: Iterable[tuple[str, str]] = (),
        decimal: str = ",",
    ) -> Sheet:
        """Return the filled-in sheet; see `Sheet` for what the parameters mean.

        `layers` are those of every sheet by default, with the layers of the wavelengths in
        `beams`.
        """
        left, low, right, high = self.window
        return Sheet(
            name=name,
            title=" - ".join(w for w in (self.fields.title, self.fields.document_type) if w)
            or name,
            description=description,
            size_mm=self.size_mm,
            scale=scale,
            origin_mm=origin_mm,
            window_mm=((left, low), (right, high)),
            layers=sheet_layers(beams) if layers is None else tuple(layers),
            model=tuple(model),
            paper=(*self.primitives, *paper),
            blocks=tuple(blocks),
            properties=tuple(properties),
            decimal=decimal,
        )


def form_for(
    fields: TitleFields,
    *,
    size: str | None = None,
    content_mm: Point = (0.0, 0.0),
    sizes: Iterable[str] = ("A4", "A3", "A2", "A1"),
    revisions: tuple[tuple[str, str, str, str], ...] = (),
    caution: str = CAUTION,
) -> Form:
    """Return the form of a size, or the smallest one whose window holds the content.

    Parameters
    ----------
    fields : TitleFields
        What the title block says.
    size : str, optional
        A4 to A0; the smallest of `sizes` that holds the content by default.
    content_mm : tuple of float
        Width and height that the content takes on paper.
    sizes : iterable of str
        Those to choose from, smallest first.
    revisions : tuple of (index, date, change, by)
        The last three stand above the title block.
    caution : str
        Stands above the title block.

    Raises
    ------
    NothingFitsError
        If the content fits on no size.
    """
    for name in (size,) if size else sizes:
        form = _form(name, fields, revisions, caution)
        width, height = form.window.width, form.window.height
        if size or (content_mm[0] <= width and content_mm[1] <= height):
            return form
    msg = f"{content_mm[0]:.0f} by {content_mm[1]:.0f} mm on paper fit on no sheet"
    raise NothingFitsError(msg)


def _form(
    size: str,
    fields: TitleFields,
    revisions: tuple[tuple[str, str, str, str], ...],
    caution: str,
) -> Form:
    size_mm = SIZES_MM[size]
    inner = frame_of(size_mm)
    out: list[Primitive] = [*frame(size, size_mm), *title_block(fields, size_mm)]
    left, foot = inner.right - WIDTH_MM, inner.low + HEIGHT_MM
    if caution:
        lines = wrap(caution, _OWN_LETTERS * (WIDTH_MM - 2 * _PAD_MM), SMALL_MM)
        pitch = LINE_PITCH * SMALL_MM
        top = foot + (len(lines) - 1) * pitch + SMALL_MM + 2 * _PAD_MM + 0.4
        out.append(rectangle("TITLE", Window(left, foot, inner.right, top)))
        for n, words in enumerate(lines):
            at = (left + _PAD_MM, top - _PAD_MM - SMALL_MM - n * pitch)
            out.append(Text("NOTES", at, words, SMALL_MM))
        foot = top
    if revisions:
        room = Window(left, foot + _CLEAR_MM, inner.right, inner.high)
        depth = room.high - _revisions(revisions, room).foot
        top = foot + _CLEAR_MM + depth
        out += _revisions(revisions, room._replace(low=foot, high=top)).primitives
        foot = top
    side, top = inner.left + _CLEAR_MM, inner.high - _CLEAR_MM
    window = Window(side, foot + _CLEAR_MM, inner.right - _CLEAR_MM, top)
    beside = Window(side, inner.low + _CLEAR_MM, left - _CLEAR_MM, foot)
    wide = beside.width >= _LEAST_BESIDE_MM
    return Form(size, size_mm, fields, tuple(out), window, beside if wide else None)


def _revisions(rows: tuple[tuple[str, str, str, str], ...], room: Window) -> Drawn:
    content = Table("REVISIONS", _REVISIONS, rows[-_MOST_REVISIONS:], "the plan", "REVISION")
    return table(content, room)

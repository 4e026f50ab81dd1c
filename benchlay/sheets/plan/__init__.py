"""The plan sheet: the bench from above, true to scale, with all that names and measures it.

`compose` turns a `Picture` into a `Sheet`. The order matters: what must not be covered is put
on the board first, tags find their places among it, and hatching comes last, since it is
broken for lettering.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator

from benchlay.named import NamedTuple
from benchlay.sheets.contents import Picture
from benchlay.sheets.dimensions import figure_box
from benchlay.sheets.frame import frame
from benchlay.sheets.layers import BeamLook, sheet_layers
from benchlay.sheets.lettering import LARGE_MM, SMALL_MM, shorten, width_mm
from benchlay.sheets.plan.balloons import balloons
from benchlay.sheets.plan.beams import beams
from benchlay.sheets.plan.bench import (
    bench,
    hole_step,
    holes,
    levels_note,
    main_dimensions,
    used_holes,
)
from benchlay.sheets.plan.board import Board, boards
from benchlay.sheets.plan.column import column
from benchlay.sheets.plan.elements import elements
from benchlay.sheets.plan.further import further
from benchlay.sheets.plan.gaps import gaps, shading
from benchlay.sheets.plan.items import blocks_and_uses
from benchlay.sheets.plan.panels import lids, panels
from benchlay.sheets.plan.parts import SMALLEST, parts
from benchlay.sheets.plan.setting_out import setting_out
from benchlay.sheets.plan.tags import Tagged, tags, untagged
from benchlay.sheets.plan.warning import warning
from benchlay.sheets.plan.zones import hatching, limits
from benchlay.sheets.primitives import (
    Across,
    Dimension,
    Line,
    Point,
    Primitive,
    Sheet,
    Text,
    figure,
    line_ends,
)
from benchlay.sheets.scale import LARGEST, Window, frame_of
from benchlay.sheets.tables import Table
from benchlay.sheets.title_block import TitleFields, title_block

_FIGURE_SHARES = (0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8)
_DESCENT = 0.33  # of the height of capitals, measured from the font
_TAG_MM2 = 110.0  # a tag of twelve letters with its border and what must stay clear round it
_MOST_TAGGED = 0.3  # of the field, which holds the bench itself too
_MOST_FAR = 0.08  # of the tags; with more, a larger sheet is taken
_BAR_MM = 50.0  # of the scale bar, on paper


def compose(picture: Picture) -> Sheet:
    """Compose the plan of a bench, without the sheets on which its tables go on.

    Raises
    ------
    NothingFitsError
        If no listed sheet and scale hold it.
    """
    return _chosen(picture).sheet(picture.fields.sheet)


def sheets(picture: Picture) -> list[tuple[str, Callable[[str], Sheet]]]:
    """Compose the plan, the further sheets that its tables need, and parts of a long bench.

    Returns
    -------
    list of (name, maker)
        A maker gives the sheet once its number in the set is known.

    Raises
    ------
    NothingFitsError
        If no listed sheet and scale hold the plan.
    """
    plan = _chosen(picture)
    out = [(picture.name, plan.sheet), *further(picture, plan.rest)]
    if plan.drawn.scale > SMALLEST:
        out += [(part.name, _chosen(part).sheet) for part in parts(picture)]
    return out


def _chosen(picture: Picture) -> _Composed:
    # A larger sheet has room for more tags, nearer to what they name; the largest, which few
    # can print, is for those that have no room at all on others, and says what even it has not.
    *smaller, last = boards(picture)
    whole: _Composed | None = None
    for board in smaller:
        if _crowded(picture, board):
            continue
        composed = _composed(picture, board)
        if not composed.left_out:
            whole = composed
            if composed.far <= _MOST_FAR * _count(picture):
                return composed
    if whole is not None and last.choice.sheet == LARGEST:
        return whole
    return _composed(picture, last)


def _crowded(picture: Picture, board: Board) -> bool:
    """Whether it is of no use to look for room for so many tags."""
    return _count(picture) * _TAG_MM2 > _MOST_TAGGED * board.field.width * board.field.height


def _count(picture: Picture) -> int:
    """Return about how many tags there are."""
    tags = len(picture.items) + sum(bool(leg.words) for leg in picture.legs)
    return tags + len(picture.zones) + sum(mark.at is not None for mark in picture.findings)


class _Composed(NamedTuple):
    """A plan without its title block, and what found no place on it."""

    drawn: Sheet
    fields: TitleFields
    left_out: tuple[str, ...]
    far: int  # tags that stand so far off that their leaders hide what is drawn
    rest: tuple[Table, ...]

    def sheet(self, number: str) -> Sheet:
        """Return the sheet with its number in the set."""
        block = title_block(self.fields._replace(sheet=number), self.drawn.size_mm)
        return self.drawn._replace(paper=(*self.drawn.paper, *block))


def _composed(picture: Picture, board: Board) -> _Composed:
    empty = _sheet(picture, board)
    title = list(_view_title(picture, board))
    title += warning(picture, board, board.crowd.boxes[-1].right)
    drawn = list(blocks_and_uses(picture, board))
    model: list[Primitive] = [
        *bench(picture, board),
        *panels(picture, board),
        *lids(picture, board),
        *(use for _, use in drawn),
        *beams(picture, board),
        *limits(picture, board),
        *gaps(picture, board),
    ]
    model += [_reserved(dimension, empty, board) for dimension in main_dimensions(picture, board)]
    model += [_reserved(dimension, empty, board) for dimension in setting_out(picture, board)]
    tagged = tags(picture, board)
    found = balloons(picture, board)
    tagged = tagged._replace(left_out=(*tagged.left_out, *found.left_out))
    lettering = board.crowd.boxes
    model += hatching(picture, board, lettering)
    model += shading(picture, board)
    model += holes(picture, board, lettering)
    model += used_holes(picture, board)
    filled = column(picture, board, _notes(picture, board, tagged))
    paper = [
        *frame(board.choice.sheet, board.choice.size_mm),
        *title,
        *_scale_bar(picture, board),
        *tagged.paper,
        *found.paper,
        *elements(picture, board),
        *filled.primitives,
    ]
    sheet = empty._replace(
        model=tuple(model), paper=tuple(paper), blocks=tuple(block for block, _ in drawn)
    )
    return _Composed(sheet, _fields(picture, board), tagged.left_out, board.crowd.far, filled.rest)


def _sheet(picture: Picture, board: Board) -> Sheet:
    field = board.field
    looks = [BeamLook(entry.wavelength_nm, entry.width_mm) for entry in picture.legend]
    return Sheet(
        name=picture.name,
        title=" - ".join(w for w in picture.fields[1:3] if w) or picture.name,
        description=_words(picture, board),
        size_mm=board.choice.size_mm,
        scale=board.scale,
        origin_mm=board.origin_mm,
        window_mm=((field.left, field.low), (field.right, field.high)),
        layers=sheet_layers(looks),
        model=(),
        paper=(),
        properties=picture.properties,
        decimal=picture.decimal,
    )


def _words(picture: Picture, board: Board) -> str:
    """Say in words what the sheet shows."""
    strays = sum(leg.stray for leg in picture.legs)
    return (
        f"Plan of the bench at 1:{board.choice.scale}, state {picture.state}: "
        f"{len(picture.items)} elements and sources, "
        f"{len(picture.legs) - strays} legs of working beams, {strays} of stray light, "
        f"{len(picture.panels)} panels, "
        f"{len(picture.zones)} {picture.zones_are.title.lower()}."
    )


def _reserved(dimension: Dimension, sheet: Sheet, board: Board) -> Dimension:
    """Move a dimension's figure out of the way of beams, and keep tags off it."""
    choices = [dimension]
    if dimension.figure_share and not dimension.running:
        choices = [dimension._replace(figure_share=share) for share in _FIGURE_SHARES]
    # The first of equals is the middle: nothing is moved without need.
    best = min(choices, key=lambda d: board.crowd.lines_through(figure_box(d, sheet)))
    board.crowd.add_box(figure_box(best, sheet))
    start, end = line_ends(best)
    for ends in ((start, end), (best.first, start), (best.second, end)):
        board.crowd_model_line(ends, beam=True)
    return best


def _fields(picture: Picture, board: Board) -> TitleFields:
    scale = f"1:{board.choice.scale}"
    return picture.fields._replace(scale=scale)


def _view_title(picture: Picture, board: Board) -> Iterator[Primitive]:
    inner = frame_of(board.choice.size_mm)
    part = picture.name.rpartition("-")[2] if picture.part is not None else ""
    which = f"PLAN, PART {part}," if part else "PLAN"
    words = f"{which} 1:{board.choice.scale}, STATE: {picture.state}"
    words = shorten(words, board.field.width - 8.0, LARGE_MM)
    at = (inner.left + 6.0, inner.high - 6.0 - LARGE_MM)
    foot, wide = at[1] - _DESCENT * LARGE_MM, width_mm(words, LARGE_MM)
    board.crowd.add_box(Window(at[0], foot, at[0] + wide, at[1] + LARGE_MM))
    yield Text("NOTES", at, words, LARGE_MM)


def _scale_bar(picture: Picture, board: Board) -> Iterator[Primitive]:
    """Draw a bar by which a shrunk print is seen to be one."""
    inner = frame_of(board.choice.size_mm)
    x, y = inner.left + 8.0, inner.low + 8.0
    yield Line("NOTES", (x, y), (x + _BAR_MM, y))
    for n in range(6):
        at = x + n * _BAR_MM / 5
        tall = 2.4 if n in (0, 5) else 1.4
        yield Line("NOTES", (at, y), (at, y + tall))
    for part, across in ((0.0, Across.CENTRE), (1.0, Across.CENTRE)):
        length = figure(part * board.long(_BAR_MM), 1, picture.decimal)
        at_text: Point = (x + part * _BAR_MM, y + 3.2)
        yield Text("NOTES", at_text, length, SMALL_MM, across)
    words = "mm of the bench; 50 mm on paper when printed at 100 %"
    room = inner.right - 180.0 - x - 4.0
    yield Text("NOTES", (x, y - 4.4), shorten(words, room, SMALL_MM), SMALL_MM)


def _notes(picture: Picture, board: Board, tagged: Tagged) -> list[str]:
    grid = picture.holes
    datum = "the near left corner of the bench"
    drawn = ""
    if grid is not None:
        x, y, pitch = (figure(v, 3, picture.decimal) for v in (*grid.first, grid.pitch_mm))
        datum = f"the datum, hole column 1, row 1, at {x}, {y} from the near left corner"
        step = hole_step(grid, board.scale)
        every = "all" if step == 1 else f"one in {step} each way"
        drawn = f" Holes {grid.thread} at {pitch} pitch, {every} drawn."
    out = [
        f"Dimensions in mm, X and Y from {datum}; facing in degrees from X, anticlockwise. "
        f"Do not scale.{drawn}",
        levels_note(picture),
    ]
    return [*out, *untagged(tagged), *picture.notes]

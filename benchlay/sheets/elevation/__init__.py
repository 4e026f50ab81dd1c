"""The elevation of a route: laid out straight along its path and seen from the side."""

from __future__ import annotations

from benchlay.sheets.elevation.board import lay_out
from benchlay.sheets.elevation.contents import Elevation
from benchlay.sheets.elevation.profile import columns, profile, ruler
from benchlay.sheets.elevation.view import margin, model
from benchlay.sheets.layers import BeamLook
from benchlay.sheets.lettering import LARGE_MM, shorten
from benchlay.sheets.primitives import Primitive, Sheet, Text
from benchlay.sheets.tables import notes


def compose(picture: Elevation) -> Sheet:
    """Compose the elevation of a route.

    Raises
    ------
    NothingFitsError
        If no listed sheet and scale hold it.
    """
    board = lay_out(picture)
    form = board.form
    true_size: list[Primitive] = []
    paper: list[Primitive] = []
    for strip in board.strips:
        true_size += model(picture, board, strip)
        for draw in (margin, ruler, profile, columns):
            paper += draw(picture, board, strip)
    heading = f"ELEVATION OF ROUTE {picture.route}, 1:{board.scale}, STATE: {picture.state}"
    at = (form.window.left + 2.0, form.window.high - LARGE_MM - 1.0)
    paper.append(Text("NOTES", at, shorten(heading, form.window.width - 8.0, LARGE_MM), LARGE_MM))
    if form.beside is not None:
        paper += notes("NOTES", picture.notes, form.beside, "the plan").primitives
    return form.sheet(
        f"elevation-{picture.route}",
        f"Elevation of route {picture.route} at 1:{board.scale}, state {picture.state}: "
        f"{len(picture.stations)} stations along {picture.length:.0f} mm of path.",
        model=true_size,
        paper=paper,
        scale=board.scale,
        origin_mm=board.origin_mm,
        beams=[BeamLook(nm) for nm in sorted({s.wavelength_nm for s in picture.stretches})],
        properties=picture.properties,
        decimal=picture.decimal,
    )

"""Changes to the face where stray light began: a coating, a tilt, a wedge."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks import Context
from benchlay.remedies.edits import Edit
from benchlay.remedies.trials import Change
from benchlay.report.model import Reported
from benchlay.tracing.front import REFLECTED

__all__ = ["coatings", "tilts", "wedges"]

# What antireflection coatings are sold with, from broad bands to one line: common practice.
_COATED = (0.01, 0.005, 0.0025, 0.001, 0.0005)
_RESERVE = 0.5  # of the limit that a coated face may use: coatings age and get dirty
_SQUARE = 0.9998  # cosine of an incidence of about a degree, below which a face stands askew
_TILTS_DEG = (2, 3, 5)
_WEDGES_DEG = (1, 2)


def coatings(context: Context, beam: int, finding: Reported) -> Iterator[Change]:
    """Give a coating of the face that sends the ghost, weak enough for the limit."""
    face = _ghost(context, beam)
    if face is None or not finding.value or not finding.limit:
        return
    element, side = face
    now = _reflectance(context, beam)
    needed = now * _RESERVE * finding.limit / finding.value
    fit = next((r for r in _COATED if r <= needed), None)
    if fit is None:
        return
    for key in ("faces",) if side in ("left", "right") else (side, "faces"):
        words = (
            f"a coating of {100 * fit:g} % on the {side} of '{element}' (now {100 * now:.3g} %) "
            "leaves less than half the limit of this light"
        )
        yield Change("coating", words, (Edit(("elements", element), key, f"{100 * fit:g} %"),))


def tilts(context: Context, beam: int) -> Iterator[Change]:
    """Give tilts of an optic that stands square to its beam."""
    face = _ghost(context, beam)
    beams = context.trace.beams
    if face is None:
        return
    parent = int(beams.start.parent[context.astray_since(beam)])
    if parent < 0 or not beams.cosine[parent] > _SQUARE:
        return
    for angle in _TILTS_DEG:
        for side in ("left", "right"):
            words = f"'{face[0]}' turned by {angle} degrees sends the light aside, to the {side}"
            path = ("elements", face[0])
            edits = (Edit(path, "incidence", str(angle)), Edit(path, "side", side))
            yield Change("tilt", words, edits)


def wedges(context: Context, beam: int) -> Iterator[Change]:
    """Give wedges for the plate that sends the ghost."""
    face = _ghost(context, beam)
    if face is None:
        return
    for angle in _WEDGES_DEG:
        for towards in ("left", "right", "up", "down"):
            words = (
                f"a wedge of {angle} degrees in '{face[0]}', its thick edge {towards}, parts the "
                "light of its faces"
            )
            path = ("elements", face[0])
            edits = (Edit(path, "wedge", str(angle)), Edit(path, "wedge_towards", towards))
            yield Change("wedge", words, edits)


def _ghost(context: Context, beam: int) -> tuple[str, str] | None:
    """Return element and face where a stray was reflected that no route wants reflected."""
    start, first = context.trace.beams.start, context.astray_since(beam)
    row = int(start.face[first])
    if row < 0 or start.event[first] != REFLECTED or context.trace.ways.main[row, 0]:
        return None
    scene = context.trace.scene
    element = scene.elements[int(scene.faces.owner[row])]
    return element, scene.face_names[int(scene.faces.name[row])]


def _reflectance(context: Context, beam: int) -> float:
    """Return the share that the face reflected of what arrived there."""
    beams, first = context.trace.beams, context.astray_since(beam)
    arrived = float(beams.end_core[beams.start.parent[first]])
    return float(beams.start.power[first]) / arrived if arrived > 0.0 else 1.0

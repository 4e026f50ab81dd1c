"""A working beam loses too much at an aperture.

Why it matters
--------------
Power is lost, the edge scatters it, and the beam behind is no longer the one that was planned:
ripples appear long before the loss shows on a meter.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 2}, at: [100, 200], heading: 0}
   elements:
     A1: {kind: aperture, after: red, distance: 200, opening: 4}  # <- clipped
     T1: {kind: target, after: A1, distance: 100}
   routes:
     main: [red, A1, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 2}, at: [100, 200], heading: 0}
   elements:
     A1: {kind: aperture, after: red, distance: 200, opening: 6.2}
     T1: {kind: target, after: A1, distance: 100}
   routes:
     main: [red, A1, T1]

What it does not see
--------------------
Ripples from edges that take less than the limit: diffraction is not part of the trace. Light
that passes an optic and meets a further one goes on from there, and is not counted as lost. The
decentre that is allowed supposes an uncut Gaussian beam.

Source
------
For a round beam of 1/e² radius w in the middle of an opening of radius a the loss is
exp(-2 a²/w²): integral of the Gaussian profile (ISO 11146-1:2021 for w). The limit is the
layout's `limits.clip`, 1 % unless it says otherwise (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

from benchlay.checks._check import (
    Context,
    Loss,
    above,
    length_text,
    place_words,
    power_text,
    rounded_up,
    share_text,
)
from benchlay.findings import Finding, Severity

if TYPE_CHECKING:
    from benchlay.checks._check.openings import Room

NAME = "clipped"

# The bench does not do what it was drawn for.
SEVERITY = Severity.FAIL

_IN_THE_MIDDLE_MM = 1e-3  # nobody sets a beam to a micrometre


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each beam and optic at which more is lost than the layout allows."""
    clip = context.layout(variant).limits.clip
    for loss in context.meetings.losses(context.beams_of(variant)):
        lost = above(loss.share, clip)
        if loss.own and lost and not (loss.whole and context.routes.lost_on_purpose(loss.beam)):
            yield _finding(context, variant, loss, clip)


def _finding(context: Context, variant: int, loss: Loss, clip: float) -> Finding:
    beam = loss.beam
    room = _room(context, loss, clip)
    routes = " and ".join(f"'{name}'" for name in context.routes.routes_of(beam))
    off = "" if room is None else f", {_met(room)}"
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{share_text(loss.share)} ({power_text(loss.power_w)}) of the beam of {routes} "
            f"{_where(context, loss)}{off}"
        ),
        expected=f"a loss of at most {share_text(clip)}{_allowed(room)}",
        remedy=_remedy(room, loss, _opening(context, loss)),
        element=loss.name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=context.span_of(loss.name, variant),
        value=loss.share,
        limit=clip,
        key=(*context.chain(beam), loss.name),
    )


def _room(context: Context, loss: Loss, clip: float) -> Room | None:
    """Return what the beam needs at the face it is meant for, where it meets its plane."""
    from benchlay.checks._check.openings import room_at

    meetings = context.meetings
    beams = context.trace.beams
    if context.routes.met(loss.beam) == loss.name:
        off = float(beams.off_left[loss.beam]), float(beams.off_up[loss.beam])
        return room_at(context.trace, loss.beam, int(beams.end_row[loss.beam]), off, clip)
    for face in meetings.faces_wanted(loss.beam):
        off_face = meetings.where_on(loss.beam, face)
        if off_face is not None:
            return room_at(context.trace, loss.beam, face, off_face, clip)
    return None


def _opening(context: Context, loss: Loss) -> str | None:
    """Return the opening of the panel that takes the light, if that is where it should go."""
    return context.routes.opening_wanted(loss.beam) if loss.sink == "panel" else None


def _where(context: Context, loss: Loss) -> str:
    """Say where the light ends instead."""
    if (opening := _opening(context, loss)) is not None:
        return f"ends on panel '{loss.name}' beside '{opening}'"
    if not loss.past_w < loss.power_w:
        return f"goes past '{loss.name}'"
    beyond = " or goes past it" if loss.past_w > 0.0 else ""
    return f"ends on {place_words(loss.sink, loss.name, loss.part)}{beyond}"


def _met(room: Room) -> str:
    if room.off_mm < _IN_THE_MIDDLE_MM:
        return "met in the middle"
    return f"met {length_text(room.off_mm)} from the middle"


def _allowed(room: Room | None) -> str:
    if room is None:
        return ""
    if room.may_be_off_mm is None:
        return "; this beam loses more even through the middle"
    return f"; for that it may be off the middle by up to {length_text(room.may_be_off_mm)}"


def _remedy(room: Room | None, loss: Loss, opening: str | None) -> str:
    if opening is not None:
        if loss.whole:
            return f"bring '{opening}' and the beam together"
        return f"widen '{opening}', or bring the beam to its middle"
    if room is None:
        return f"bring the beam into the clear region of '{loss.name}'"
    needed = rounded_up(room.needed_mm, 3)
    widen = f"widen its clear region from {length_text(room.clear_mm)} to {needed:g} mm"
    if room.may_be_off_mm is None:
        return f"{widen}, or make the beam narrower there"
    if loss.share >= 1.0 - 1e-9:  # all of it: no width is worth naming
        return f"bring '{loss.name}' and the beam together"
    move = room.off_mm - room.may_be_off_mm
    return f"move '{loss.name}' by {rounded_up(move, 3):g} mm towards the beam, or {widen}"

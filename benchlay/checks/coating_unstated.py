"""Light meets a coating that says nothing of its wavelength.

Why it matters
--------------
A coating made for one wavelength may do anything at another: mirrors turn into windows, and
windows into mirrors. The trace takes the bare material there, which a real coating is not. Where
all that meets a face is within the accessible limit this is a note, one for each element.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:  # <- coating-unstated
       kind: mirror
       after: red
       distance: 300
       turn: left 90
       diameter: 25.4
       reflectance: [{from: 520, to: 545, is: 99.5 %}]
     T1: {kind: target, after: M1, distance: 100}
   routes:
     alignment: [red, M1, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     M1:
       kind: mirror
       after: red
       distance: 300
       turn: left 90
       diameter: 25.4
       reflectance: [{from: 520, to: 545, is: 99.5 %}, {from: 600, to: 700, is: 40 %}]
     T1: {kind: target, after: M1, distance: 100}
   routes:
     alignment: [red, M1, T1]

What it does not see
--------------------
Light below the power floor. Whether a figure that is stated is true of the part on the bench,
or holds at this angle of incidence.

Source
------
Common practice: ask the maker for the curve at every wavelength on the bench, pumps, harmonics
and alignment lasers included.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check import Context, exposure_words, listed, power_text, wavelength_text
from benchlay.findings import Finding, Severity
from benchlay.named import NamedTuple
from benchlay.scene.tables import Ints, Mode

NAME = "coating-unstated"

# The figures that follow are assumptions, but the larger hazard among plausible ones. Where all
# the light together is within the accessible limit it is a note.
SEVERITY = Severity.WARN


class _Meeting(NamedTuple):
    """Light of one wavelength at one face that says nothing of it."""

    face: int
    wave: int
    beams: Ints
    power_w: float


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each face and wavelength, with all the power that meets it.

    What is within the accessible limit all together makes one note an element.
    """
    weak: dict[int, list[_Meeting]] = {}
    for meeting in _meetings(context, variant):
        limit_w = float(context.limit_w[meeting.beams].min())
        if meeting.power_w <= limit_w:
            owner = int(context.trace.scene.faces.owner[meeting.face])
            weak.setdefault(owner, []).append(meeting)
        else:
            yield _finding(context, variant, meeting, limit_w)
    for _, meetings in sorted(weak.items()):
        yield _note(context, variant, meetings)


def _meetings(context: Context, variant: int) -> Iterator[_Meeting]:
    beams = context.trace.beams
    rows = context.beams_of(variant)
    rows = rows[beams.unstated[rows]]
    pairs = np.stack((beams.end_row[rows], beams.start.wave[rows]))
    for face, wave in sorted(set(zip(*pairs.tolist(), strict=True))):
        met = rows[(pairs[0] == face) & (pairs[1] == wave)]
        yield _Meeting(face, wave, met, float(beams.end_core[met].sum()))


def _finding(context: Context, variant: int, meeting: _Meeting, limit_w: float) -> Finding:
    scene, (face, wave, met, power) = context.trace.scene, meeting
    nm = float(scene.wavelengths_nm[wave])
    name = scene.elements[int(scene.faces.owner[face])]
    side = scene.face_names[int(scene.faces.name[face])]
    film = scene.faces.mode[face, wave] != Mode.BARE
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"the {side} of '{name}' says nothing of {wavelength_text(nm)}, and "
            f"{power_text(power)} of it from '{context.source_of(int(met[0]))}' meets it "
            f"(through one aperture: {exposure_words(context, int(met[0]), power)}); "
            + (
                "its metal is not known there, and is assumed to send all back"
                if film
                else "the bare material is assumed"
            )
        ),
        expected=f"a coating that states its reflectance at {wavelength_text(nm)}",
        remedy=(
            (
                f"write the coating of '{name}' by its reflectance, not its metal, such as "
                if film
                else f"add a band with {nm:g} nm to the coating of '{name}', such as "
            )
            + f"`{{from: {nm - 10:g}, to: {nm + 10:g}, is: …}}` with the maker's figure"
        ),
        element=name,
        beam=int(context.numbers[met[0]]),
        at=context.end_at(int(met[0])),
        span=context.span_of(name, variant),
        value=power,
        limit=limit_w,
        unit="W",
        key=(nm, context.face_text(face)),
    )


def _note(context: Context, variant: int, meetings: list[_Meeting]) -> Finding:
    scene = context.trace.scene
    first = meetings[0]
    name = scene.elements[int(scene.faces.owner[first.face])]
    found = {
        float(scene.wavelengths_nm[m.wave]): None for m in sorted(meetings, key=lambda m: m.wave)
    }
    waves = listed([wavelength_text(nm) for nm in found])
    power = max(m.power_w for m in meetings)
    film = any(scene.faces.mode[m.face, m.wave] != Mode.BARE for m in meetings)
    return Finding(
        check=NAME,
        severity=Severity.NOTE,
        message=(
            f"'{name}' says nothing of {waves}, of which at most {power_text(power)} meets a face, "
            f"within the limit all together; "
            + ("metal is assumed to send all back" if film else "the bare material is assumed")
        ),
        expected=f"coatings that state their reflectance at {waves}, where it matters",
        remedy=f"add bands for {waves} to the coatings of '{name}', if their figures are at hand",
        element=name,
        beam=int(context.numbers[first.beams[0]]),
        at=context.end_at(int(first.beams[0])),
        span=context.span_of(name, variant),
        value=power,
        unit="W",
        key=("within the limit",),
    )

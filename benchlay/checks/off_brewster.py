"""An element set to Brewster's angle reflects more than it should.

Why it matters
--------------
At Brewster's angle a bare face passes light polarized in the plane of incidence without loss.
Turned the wrong way, or met by the other polarization, the same face sends a seventh of the
light aside: a stray on every pass, in both directions.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       wavelength: 633
       power: 5 mW
       beam: {waist_radius: 0.5}
       polarization: vertical
       at: [100, 200]
       heading: 0
   elements:
     W1:  # <- off-brewster
       kind: window
       after: red
       distance: 200
       incidence: brewster
       glass: fused-silica
       diameter: 25.4
     T1: {kind: target, after: W1, distance: 100}
   routes:
     main: [red, W1, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red:
       wavelength: 633
       power: 5 mW
       beam: {waist_radius: 0.5}
       polarization: horizontal
       at: [100, 200]
       heading: 0
   elements:
     W1:
       kind: window
       after: red
       distance: 200
       incidence: brewster
       glass: fused-silica
       diameter: 25.4
     T1: {kind: target, after: W1, distance: 100}
   routes:
     main: [red, W1, T1]

What it does not see
--------------------
Faces with a coating, which have no Brewster's angle, and light that no route names. The loss
is that of the two bare faces of a plate; what a polarizer refuses inside is not counted.

Source
------
Fresnel's equations (Born, M. and Wolf, E., Principles of Optics, 7th ed., 1.5.2). One degree
off the angle costs 1.2e-4 a face for an index of 1.5, three degrees 1e-3.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import atan2

import numpy as np

from benchlay.checks._check import Context, above, angle_text, share_text, wavelength_text
from benchlay.findings import Finding, Severity
from benchlay.optics import coherency, fresnel
from benchlay.optics.rays import cross, dot
from benchlay.scene.tables import Mode
from benchlay.tracing.beams import FACE

NAME = "off-brewster"

# The light that is sent aside is judged where it goes; here a figure is worse than meant.
SEVERITY = Severity.WARN

_LOSS = 2e-3  # per pass of two faces: three degrees off, where a meter begins to show it
_BREWSTER = "brewster"


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report working beams that lose more at the faces of such an element."""
    beams, scene = context.trace.beams, context.trace.scene
    elements = context.state(variant).elements
    rows = context.beams_of(variant)
    rows = rows[context.routes.working[rows] & context.outside[rows]]
    for beam in rows[beams.end_kind[rows] == FACE].tolist():
        face = int(beams.end_row[beam])
        name = scene.elements[int(scene.faces.owner[face])]
        element = elements[name].element
        meant = element.stand.incidence == _BREWSTER or element.record.needs_line()
        if meant and scene.faces.mode[face, beams.start.wave[beam]] == Mode.BARE:
            loss = _loss(context, beam, face)
            if above(loss, _LOSS):
                yield _finding(context, variant, beam, face, loss)


def _loss(context: Context, beam: int, face: int) -> float:
    """Return the share that two bare faces of a plate send aside."""
    beams, f = context.trace.beams, context.trace.scene.faces
    k, e1 = beams.start.direction[[beam]], beams.start.axis[[beam]]
    normal = f.normal[[face]]
    s = cross(k, normal)
    s = s / np.maximum(np.sqrt(dot(s, s)), 1e-300)[:, None]
    j = coherency.rotate(beams.end_coherency[:, [beam]], dot(s, e1), dot(s, cross(k, e1)))
    n_in = beams.start.index[[beam]]
    n_out = context.trace.scene.index_inside[[face], beams.start.wave[[beam]]]
    shares = fresnel.powers(n_in, n_out, beams.cosine[[beam]])
    passed = j[0] * (1.0 - shares.rs) ** 2 + j[1] * (1.0 - shares.rp) ** 2
    return float(1.0 - (passed / (j[0] + j[1]))[0])


def _finding(context: Context, variant: int, beam: int, face: int, loss: float) -> Finding:
    beams, scene = context.trace.beams, context.trace.scene
    name = scene.elements[int(scene.faces.owner[face])]
    nm = context.wavelength_nm(beam)
    n_in = float(beams.start.index[beam])
    n_out = float(scene.index_inside[face, beams.start.wave[beam]])
    wanted = atan2(n_out, n_in)
    angle = float(np.arccos(min(float(beams.cosine[beam]), 1.0)))
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{_what(context, beam, face)} is meant to stand at Brewster's angle and sends "
            f"{share_text(loss)} of {wavelength_text(nm)} light aside on every pass; it is met "
            f"at {angle_text(angle)}, Brewster's angle there is {angle_text(wanted)}"
        ),
        expected=f"at most {share_text(_LOSS)} a pass",
        remedy=_remedy(name, abs(angle - wanted)),
        element=name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam),
        span=context.span_of(name, variant),
        value=loss,
        limit=_LOSS,
        key=(*context.chain(beam), context.face_text(face)),
    )


def _what(context: Context, beam: int, face: int) -> str:
    """Name the plate that is judged: of a cell, which has two, the window that is met."""
    scene = context.trace.scene
    name = scene.elements[int(scene.faces.owner[face])]
    variant = int(context.trace.beams.start.variant[beam])
    window, dot_, _ = scene.face_names[scene.faces.name[face]].partition(".")
    several = context.state(variant).elements[name].element.record.needs_line() and dot_
    return f"the {window} window of '{name}'" if several else f"'{name}'"


def _remedy(name: str, off_rad: float) -> str:
    if off_rad < np.radians(1.0):
        return (
            f"turn the polarization before '{name}' into its plane of incidence, or turn "
            f"'{name}' about the beam"
        )
    return f"set '{name}' to that angle"

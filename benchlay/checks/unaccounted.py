"""The ledger of power does not close, or what was left out of the trace could matter.

Why it matters
--------------
A review is as good as its account of the light. Power that was not followed is power of which
nothing was checked.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     green:  # <- unaccounted
       {wavelength: 532, power: 100 W, beam: {waist_radius: 2}, at: [100, 200], heading: 0}
   elements:
     F1:
       kind: window
       after: green
       distance: 200
       diameter: 25.4
       front: 85 %
       back: 85 %
     T1: {kind: target, after: F1, distance: 100}
   routes:
     main: [green, F1, T1]
   limits: {floor: 100 %}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     green:
       {wavelength: 532, power: 100 W, beam: {waist_radius: 2}, at: [100, 200], heading: 0}
   elements:
     F1:
       kind: window
       after: green
       distance: 200
       diameter: 25.4
       front: 85 %
       back: 85 %
     T1: {kind: target, after: F1, distance: 100}
   routes:
     main: [green, F1, T1]
   limits: {floor: 1 %}

What it does not see
--------------------
That every sink is right by itself: the program's own tests hold each against quadrature.

Source
------
The bounds are this program's own: 1e-9 of what is emitted for rounding, and for what lies under
the power floor the accessible limit (IEC 60825-1:2014) or a thousandth of what is emitted.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import fsum

import numpy as np

from benchlay.checks._check import Context, above, exposed, power_text, wavelength_text
from benchlay.elements._kind import Acts
from benchlay.findings import Finding, Severity
from benchlay.geometry.distinct import distinct
from benchlay.scene.tables import SINK, Flags, Ints, Scene

NAME = "unaccounted"

_CLOSES = 1e-9  # of what is emitted: rounding of some thousand additions stays below
_BELOW_FLOOR_SHARE = 1e-3  # contract: more than this was not followed


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report by source what does not add up, what lies under the floor, and bounds met."""
    trace = context.trace
    rows = trace.landings_of(variant)
    emitted = trace.emitted_w(variant)
    sources = trace.beams.start.source[trace.ledger.beam[rows]]
    for number, name in enumerate(trace.scene.sources):
        if name in emitted:
            mine = rows[sources == number]
            yield from _open(context, variant, name, emitted[name], mine)
            yield from _below_floor(context, variant, name, mine)
    yield from _unknown(context, variant, rows)
    if trace.bounded[variant]:
        yield _bounded(context, variant)


def _open(
    context: Context, variant: int, source: str, emitted: float, rows: Ints
) -> Iterator[Finding]:
    gap = abs(emitted - fsum(context.trace.ledger.power[rows].tolist()))
    limit = _CLOSES * emitted
    if above(gap, limit):
        yield Finding(
            check=NAME,
            severity=Severity.FAIL,  # nothing that was said of this source's light can be relied on
            message=(
                f"the sinks of '{source}' miss what it emits by {power_text(gap)} "
                f"of {power_text(emitted)}"
            ),
            expected=f"a ledger that closes to {_CLOSES:g} of what is emitted",
            remedy="report this layout as a fault of the program",
            element=source,
            span=context.span_of(source, variant),
            value=gap,
            limit=limit,
            unit="W",
            key=(source, "ledger"),
        )


def _below_floor(context: Context, variant: int, source: str, rows: Ints) -> Iterator[Finding]:
    trace = context.trace
    ledger = trace.ledger
    rows = rows[ledger.sink[rows] == SINK["below-floor"]]
    waves = trace.beams.start.wave[ledger.beam[rows]]
    for wave in distinct(waves).tolist():
        mine = rows[waves == wave]
        nm = float(trace.scene.wavelengths_nm[wave])
        total, largest = fsum(ledger.power[mine].tolist()), float(ledger.power[mine].max())
        line = context.limits.get((variant, source, nm))
        told = None if line is None else line.limit
        accessible = np.inf if told is None else told.accessible_w
        through = "" if told is None else f"; all through one aperture: {exposed(told, total)}"
        share = _BELOW_FLOOR_SHARE * context.source_power_w(variant, source, nm)
        limit = float(np.fmin(accessible, share))
        if above(total, limit):
            yield Finding(
                check=NAME,
                severity=Severity.WARN,  # each of these beams by itself is far below the limit
                message=(
                    f"{power_text(total)} of {wavelength_text(nm)} from '{source}' lies under "
                    f"the power floor and was not followed (the largest single beam: "
                    f"{power_text(largest)}){through}"
                ),
                expected=(
                    f"at most {power_text(limit)}, the lesser of the accessible limit and a "
                    "thousandth of what is emitted"
                ),
                remedy="lower `limits.floor`, or look for two faces that send light to and fro",
                element=source,
                span=context.span_of(source, variant),
                value=total,
                limit=limit,
                unit="W",
                key=(source, nm, "below-floor"),
            )


def _unknown(context: Context, variant: int, rows: Ints) -> Iterator[Finding]:
    """Report by optic and wavelength what went into glass whose index is not known there."""
    trace, scene = context.trace, context.trace.scene
    dark = _dark_faces(scene) & scene.faces.present[variant][:, None]
    if not dark.any():
        return
    rows = rows[trace.ledger.sink[rows] == SINK["absorbed"]]
    beams, name = trace.ledger.beam[rows], trace.ledger.name[rows]
    wave = trace.beams.start.wave[beams]
    found: dict[tuple[int, int], list[float]] = {}
    for face, line in np.argwhere(dark).tolist():
        # By name: what falls beside the beam's own end is booked with the same beam.
        mine = (name == scene.face_owner_name[face]) & (wave == line)
        power = trace.ledger.power[rows[mine]].tolist()
        found[int(scene.faces.owner[face]), line] = power
    for (owner, line), power in sorted(found.items()):
        if fsum(power) > 0.0:
            yield _in_the_dark(context, variant, scene.elements[owner], line, fsum(power))


def _dark_faces(scene: Scene) -> Flags:
    """Tell which faces (F, L) would let light into glass, or out of it, of unknown index."""
    f = scene.faces
    # Behind the one open face of a mirror with a ground back all is swallowed in any case.
    open_ = f.acts != Acts.OPAQUE
    open_faces = np.bincount(f.owner[open_], minlength=len(scene.elements))
    through = open_ & (open_faces[f.owner] > 1)
    unknown = np.isnan(scene.indices)
    dark: Flags = through[:, None] & (unknown[scene.behind] | unknown[scene.before])
    return dark


def _in_the_dark(
    context: Context, variant: int, element: str, wave: int, power_w: float
) -> Finding:
    nm = float(context.trace.scene.wavelengths_nm[wave])
    return Finding(
        check=NAME,
        severity=Severity.FAIL,  # this light was not followed, nor what the faces send back
        message=(
            f"{power_text(power_w)} of {wavelength_text(nm)} meets the glass of '{element}', which "
            "has no known index there; it is counted as absorbed, and where it goes was not checked"
        ),
        expected="glass whose formula covers the wavelengths that meet it",
        remedy=f"name another glass for '{element}', or give its index: `glass: {{index: 1.5}}`",
        element=element,
        span=context.span_of(element, variant),
        value=power_w,
        limit=0.0,
        unit="W",
        key=(element, nm, "unknown index"),
    )


def _bounded(context: Context, variant: int) -> Finding:
    return Finding(
        check=NAME,
        severity=Severity.FAIL,  # beams above the floor were left alone: nothing was checked there
        message="the trace met its bound on beams or reflections before all light had landed",
        expected="a layout whose light lands within the bounds of the trace",
        remedy=(
            "look for two faces that send light to and fro without loss, or raise `limits.floor`"
        ),
        key=("bounded",),
    )

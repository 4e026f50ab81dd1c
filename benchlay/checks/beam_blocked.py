"""A working beam, or part of its envelope, meets something opaque between two elements.

Why it matters
--------------
The light does not get to where it is wanted, and what it hits scatters it in all directions,
at the height of the optics. Posts and mounts of neighbours are the usual cause.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     supply:  # <- beam-blocked
       kind: obstacle
       at: [300, 200.4]
       facing: 0
       outline: [[0, 0], [60, 0], [60, 80], [0, 80]]
       to_height: 150
     T1: {kind: target, after: red, distance: 500}
   routes:
     main: [red, T1]

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     supply:
       kind: obstacle
       at: [300, 201]
       facing: 0
       outline: [[0, 0], [60, 0], [60, 80], [0, 80]]
       to_height: 150
     T1: {kind: target, after: red, distance: 500}
   routes:
     main: [red, T1]

What it does not see
--------------------
Cables, hoses and hands, and whatever else the layout does not name. Parts of the envelope
that take less than the limit.

Source
------
The limit is the layout's `limits.clip`, as at an aperture. A straight edge that touches the
1/e² radius of a Gaussian beam takes 2.28 % of it: half the complementary error function of
the square root of 2.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import (
    Context,
    Loss,
    above,
    place_words,
    power_text,
    share_text,
)
from benchlay.findings import Finding, Severity

NAME = "beam-blocked"

# The bench does not do what it was drawn for, and light is scattered at beam height.
SEVERITY = Severity.FAIL


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each beam and body that takes more of it than the layout allows."""
    clip = context.layout(variant).limits.clip
    for loss in context.meetings.losses(context.beams_of(variant)):
        if not loss.own and above(loss.share, clip) and _stands_in_the_way(context, loss):
            yield _finding(context, variant, loss, clip)


def _stands_in_the_way(context: Context, loss: Loss) -> bool:
    """Whether the beam was on its way; one that goes astray is `route-broken`.

    Where a state cuts all its routes short, no more is asked of it than to get there.
    """
    aimed = context.meetings.aimed(loss.beam)
    if context.routes.lost_on_purpose(loss.beam):
        return aimed and not loss.whole
    return aimed or not loss.whole


def _finding(context: Context, variant: int, loss: Loss, clip: float) -> Finding:
    beam = loss.beam
    routes = " and ".join(f"'{name}'" for name in context.routes.routes_of(beam))
    what = place_words(loss.sink, loss.name, loss.part)
    start = context.left_name(beam)
    towards = " or ".join(f"'{name}'" for name in context.routes.wanted(beam))
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=(
            f"{what} takes {share_text(loss.share)} ({power_text(loss.power_w)}) of the beam "
            f"of {routes} between '{start}' and {towards or 'its end'}"
        ),
        expected=f"nothing that takes more than {share_text(clip)} between the two",
        remedy=(
            f"move '{loss.name}' out of the way"
            if loss.name is not None
            else "raise the beam above the bench top"
        )
        + ", or name it in the route if the beam is meant to go there",
        element=loss.name,
        beam=int(context.numbers[beam]),
        at=context.end_at(beam) if loss.whole else None,
        span=context.span_of(loss.name, variant),
        value=loss.share,
        limit=clip,
        key=(*context.chain(beam), loss.name),
    )

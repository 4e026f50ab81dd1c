"""An element is modelled more simply than it is.

Why it matters
--------------
A figure is only as good as its model. Where a thin lens stands for a real one, or a crystal is
taken for plain glass, a reader of the results has to know it.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     L1: {kind: lens, after: red, distance: 200, diameter: 25.4, focal: 200}  # <- as-modelled
     W1:  # <- as-modelled
       {kind: window, after: L1, distance: 50, diameter: 25.4, glass: sapphire}

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   elements:
     W1: {kind: window, after: red, distance: 200, diameter: 25.4, glass: fused-silica}

What it does not see
--------------------
What all models of this program leave out, which every result states.

Source
------
A rule of the layout language: thin lenses reflect as equi-convex or equi-concave ones of their
glass, and birefringent materials act by their ordinary index.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import Context
from benchlay.elements._kind import Acts
from benchlay.findings import Finding, Severity
from benchlay.optics.materials import MATERIALS

NAME = "as-modelled"

# Nothing is wrong with the bench.
SEVERITY = Severity.NOTE

_BIREFRINGENT = "birefringent"


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each element whose model is known to be simpler."""
    for name, item in sorted(context.state(variant).elements.items()):
        if any(face.acts is Acts.LENS for face in item.geometry.faces):
            yield _note(
                context,
                variant,
                name,
                f"the face reflections of thin lens '{name}' are those of a lens with two "
                "equal radii",
                "know where they come to a focus only as far as the true radii agree",
            )
        for what, remedy in item.element.record.simplified():
            yield _note(context, variant, name, f"'{name}' {what}", remedy)
        glass = item.geometry.glass
        if glass is not None and glass.name in MATERIALS:
            known = MATERIALS[glass.name].note
            if _BIREFRINGENT in known and item.geometry.bulk.kind != "retarder":
                yield _note(
                    context,
                    variant,
                    name,
                    f"'{name}' is of {glass.name}, which is birefringent: it acts by its "
                    "ordinary index only",
                    "judge the extraordinary ray and any turn of polarization by hand",
                )


def _note(context: Context, variant: int, name: str, what: str, remedy: str) -> Finding:
    return Finding(
        check=NAME,
        severity=SEVERITY,
        message=what,
        expected="results that are read with this in mind",
        remedy=remedy,
        element=name,
        span=context.span_of(name, variant),
        key=(what,),
    )

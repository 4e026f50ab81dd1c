"""A key is read but has no effect in this version.

Why it matters
--------------
Whoever wrote the key counts on it. What is not acted on must not look as if it were.

Fails
-----
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   tolerances: {thickness: 0.1}  # <- not-yet

Passes
------
.. code-block:: yaml

   bench: {size: [800, 400]}
   sources:
     red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
   limits:
     clip: 2 %

What it does not see
--------------------
Keys whose lack of effect would change the light: those are refused when the layout is read.

Source
------
A rule of this program: nothing that was written is passed over in silence.
"""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check import Context
from benchlay.findings import Finding, Severity

NAME = "not-yet"

# Nothing is wrong with the bench.
SEVERITY = Severity.NOTE


def check(context: Context, variant: int) -> Iterator[Finding]:
    """Report each such key once a state."""
    for span, text in sorted(context.layout(variant).not_yet):
        yield Finding(
            check=NAME,
            severity=SEVERITY,
            message=text,
            expected="keys that this version acts on",
            remedy="leave the key if it is meant for later; nothing depends on it now",
            span=span,
            key=(text,),
        )

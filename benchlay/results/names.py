"""What beams leave, by name."""

from __future__ import annotations

from benchlay.tracing import Trace
from benchlay.tracing.front import EMITTED

BENCH = "bench"
"""What light leaves that the bench top throws back: it has no name of its own."""


def left(trace: Trace, beam: int) -> tuple[str, str]:
    """Return the name and the face of what a beam left."""
    start, scene = trace.beams.start, trace.scene
    if start.event[beam] == EMITTED:
        return scene.sources[int(start.source[beam])], "exit"
    face = int(start.face[beam])
    if face >= 0:
        owner, name = scene.faces.owner[face], scene.faces.name[face]
        return scene.elements[int(owner)], scene.face_names[int(name)]
    number = int(scene.solids.name[start.body[beam]])
    return (scene.names[number] if number >= 0 else BENCH), "front"

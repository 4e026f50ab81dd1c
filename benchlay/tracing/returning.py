"""Corner cubes: light that goes back the way it came, on the other side of the apex."""

from __future__ import annotations

from math import sqrt

import numpy as np

from benchlay.optics import coherency, fresnel, moments
from benchlay.scene.tables import SINK, Floats, Ints, Mode, Scene
from benchlay.tracing.front import REFLECTED, SPILLED, Front
from benchlay.tracing.run_state import RunState

_CORNER = 1.0 / sqrt(3.0)  # cosine of incidence on each face of light along the axis


def returned(core: Front, face: Ints, rows: Ints, state: RunState, *, spilled: bool) -> Front:
    """Return the light that corners send back, and book what their mirrors swallow.

    Three ideal mirrors at right angles turn positions about the apex and directions round,
    and leave the field as it was (each is a half turn about its normal, up to sign).
    """
    scene = state.scene
    f = scene.faces
    kept = _kept(scene, face, core.wave)
    state.book(rows, SINK["absorbed"], scene.face_owner_name[face], core.power * (1.0 - kept))
    node = state.ways.follow(core.node, f.owner[face], f.name[face], REFLECTED)
    root = np.sqrt(kept)
    # The second axis is direction x axis, so it turns round with the direction.
    return core.changed(
        position=2.0 * f.origin[face] - core.position,
        direction=-core.direction,
        coherency=coherency.diagonal(core.coherency, root, -root),
        moments=moments.scale_second(core.moments, -1.0),
        face=face,
        body=-1,
        owner=f.owner[face],
        node=-1 if spilled else node,
        event=SPILLED if spilled else REFLECTED,
    )


def _kept(scene: Scene, face: Ints, wave: Ints) -> Floats:
    """Return the share that three reflections leave."""
    f, at = scene.faces, (face, wave)
    mode = f.mode[at]
    film = fresnel.powers(1.0, np.where(mode == Mode.METAL, f.metal[at], 1.5), _CORNER)
    each = np.where(mode == Mode.STATED, 0.5 * (f.share_s[at] + f.share_p[at]), 1.0)
    each = np.where(mode == Mode.METAL, 0.5 * (film.rs + film.rp), each)
    share: Floats = each**3
    return share

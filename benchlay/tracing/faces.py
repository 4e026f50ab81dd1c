"""What a face does to the beams that meet it: reflection, refraction, absorption.

All arrays are one row a beam (N); coherency (4, N) and moments (10, N) come in the beam's
own basis (axis, direction x axis) and leave in the basis (s, p) of the face, which is the
new beam's own: s = k x N is the axis, p = k x s.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics import coherency, fresnel, moments
from benchlay.optics.rays import bench_basis, cross, dot
from benchlay.scene.tables import Flags, Floats, Ints, Mode, Scene

_NORMAL = 1e-12  # below this sine of incidence the plane of incidence is not defined

MIRRORED = moments.scale_second(np.ones((10, 1)), -1.0)  # the signs after a reflection


class Meeting(NamedTuple):
    """Beams at their faces, in the basis (s, p)."""

    row: Ints  # (N,) of the face
    wave: Ints  # (N,)
    normal: Floats  # (N, 3) towards which the beam goes
    cosine: Floats  # (N,) of incidence
    s: Floats  # (N, 3)
    n_in: Floats  # (N,)
    n_out: Floats  # (N,)
    beyond: Ints  # (N,) volume on the other side
    outward: Flags  # (N,) the beam arrives from the side the face's own normal points to
    lens: Flags | None  # (N,) which faces are of ideal lenses; None where none is
    direction: Floats  # (N, 3)
    position: Floats  # (N, 3) where it meets the face, mm
    coherency: Floats  # (4, N)
    moments: Floats  # (10, N)


class Child(NamedTuple):
    """Beams that leave faces, row by row as they came."""

    direction: Floats  # (N, 3)
    axis: Floats  # (N, 3) s; behind a lens, s carried along
    coherency: Floats  # (4, N)
    moments: Floats  # (10, N)


class Divided(NamedTuple):
    """The two children and what stays in the face."""

    reflected: Child
    transmitted: Child
    absorbed: Floats | None  # (N,) W; None where nothing is


def plane_of_incidence(
    direction: Floats, normal: Floats, axis: Floats
) -> tuple[Floats, Floats, Floats]:
    """Return s, and cosine and sine of the turn from the beam's axis to s.

    At normal incidence any s will do for bare faces; for a coating that tells s from p it is
    taken as for a plate turned in plan by next to nothing: s is up.
    """
    s = cross(direction, normal)
    length = np.sqrt(dot(s, s))
    flat = length < _NORMAL
    s /= np.where(flat, 1.0, length)[:, None]
    if np.count_nonzero(flat):
        s[flat] = bench_basis(direction[flat])[1]
    return s, dot(s, axis), dot(s, cross(direction, axis))


def divide(meeting: Meeting, scene: Scene) -> Divided:
    """Divide beams between reflection, transmission and absorption."""
    r_s, r_p, t_s, t_p, lost = _amplitudes(meeting, scene)
    j = meeting.coherency
    reflected = coherency.diagonal(j, r_s, r_p)
    transmitted = coherency.diagonal(j, t_s, t_p)
    absorbed = None if lost is None else lost[0] * j[0] + lost[1] * j[1]
    return Divided(
        _reflected(meeting, scene, reflected), _transmitted(meeting, scene, transmitted), absorbed
    )


def _amplitudes(
    meeting: Meeting, scene: Scene
) -> tuple[Floats, Floats, Floats, Floats, tuple[Floats, Floats] | None]:
    """Return r_s, r_p, t_s, t_p (t in units of power: |t|² is the share) and the two losses."""
    f = scene.faces
    at = meeting.row * f.mode.shape[1] + meeting.wave
    mode = f.mode.ravel().take(at)
    cosine, n_in, n_out = meeting.cosine, meeting.n_in, meeting.n_out
    total = n_in * n_in * (1.0 - cosine * cosine) >= n_out * n_out
    r_s, r_p, t_s, t_p = _bare(n_in, n_out, cosine, total)
    if not np.count_nonzero(mode):
        return r_s, r_p, t_s, t_p, None
    stated = mode == Mode.STATED
    loss_s, loss_p = f.loss_s.ravel().take(at), f.loss_p.ravel().take(at)
    # Beyond the critical angle nothing passes: what a coating would pass is sent back.
    share_s = np.where(total, 1.0 - loss_s, f.share_s.ravel().take(at))
    share_p = np.where(total, 1.0 - loss_p, f.share_p.ravel().take(at))
    r_s = np.where(stated, -np.sqrt(share_s), r_s)
    r_p = np.where(stated, np.sqrt(share_p), r_p)
    t_s = np.where(stated, np.sqrt(np.maximum(1.0 - share_s - loss_s, 0.0)), t_s)
    t_p = np.where(stated, np.sqrt(np.maximum(1.0 - share_p - loss_p, 0.0)), t_p)
    lost_s, lost_p = np.where(stated, loss_s, 0.0), np.where(stated, loss_p, 0.0)
    metal = mode == Mode.METAL
    if metal.any():
        index = np.where(metal, f.metal.ravel().take(at), n_out)
        film = fresnel.amplitudes(n_in, index, cosine)
        shares = fresnel.powers(n_in, index, cosine)
        r_s, r_p = np.where(metal, film.rs, r_s), np.where(metal, film.rp, r_p)
        t_s, t_p = np.where(metal, 0.0, t_s), np.where(metal, 0.0, t_p)
        lost_s, lost_p = np.where(metal, shares.ts, lost_s), np.where(metal, shares.tp, lost_p)
    return r_s, r_p, t_s, t_p, (lost_s, lost_p)


def _bare(n_in: Floats, n_out: Floats, cosine: Floats, total: Flags) -> tuple[np.ndarray, ...]:
    """Return r_s, r_p (complex where light is totally reflected), t_s and t_p."""
    if not np.count_nonzero(total):
        return fresnel.dielectric(n_in, n_out, cosine)
    bare = fresnel.amplitudes(n_in, n_out, cosine)
    root = np.sqrt(np.where(total, 0.0, bare.transmitted_flux.real))
    return bare.rs, bare.rp, (bare.ts * root).real, (bare.tp * root).real


def _reflected(meeting: Meeting, scene: Scene, j: Floats) -> Child:
    k, n = meeting.direction, meeting.normal
    direction = k - (2.0 * dot(k, n))[:, None] * n
    axis = meeting.s
    m = meeting.moments * MIRRORED
    lens = meeting.lens
    if lens is not None:
        from benchlay.optics.thin_lens import throw_back

        bulge = scene.faces.lens_curvature[meeting.row, meeting.wave]
        bulge = np.where(meeting.outward, bulge, -bulge)
        curved = _by_slope(meeting, scene, throw_back(*_slopes(meeting, scene), bulge), back=True)
        axis = np.where(lens[:, None], _carried(axis, direction, curved), axis)
        direction = np.where(lens[:, None], curved, direction)
        power = np.where(lens, -2.0 * meeting.n_in * bulge, 0.0)
        m = moments.kick(m, power, 0.0, power)
    return Child(direction, axis, j, m)


def _transmitted(meeting: Meeting, scene: Scene, j: Floats) -> Child:
    k, n, cosine = meeting.direction, meeting.normal, meeting.cosine
    ratio = meeting.n_in / meeting.n_out
    beyond = np.sqrt(np.maximum(1.0 - ratio * ratio * (1.0 - cosine * cosine), 0.0))
    direction = ratio[:, None] * k + (beyond - ratio * cosine)[:, None] * n
    axis = meeting.s
    lens = meeting.lens
    if lens is not None:
        from benchlay.optics.thin_lens import bend

        power = np.where(lens, scene.faces.lens_power[meeting.row, meeting.wave], 0.0)
        slope, offset = _slopes(meeting, scene)
        bent = bend(slope, offset, power, meeting.n_in, meeting.n_out)
        bent = _by_slope(meeting, scene, bent, back=False)
        axis = np.where(lens[:, None], _carried(axis, direction, bent), axis)
        direction = np.where(lens[:, None], bent, direction)
        beyond = np.where(lens, dot(direction, n), beyond)
    m = moments.scale_second(meeting.moments, np.maximum(beyond, _NORMAL) / cosine)
    if lens is not None:
        m = moments.kick(m, power, 0.0, power)
    return Child(direction, axis, j, m)


def _slopes(meeting: Meeting, scene: Scene) -> tuple[Floats, Floats]:
    """Return tangents to the lens axis and distances from it, along left and up."""
    f = scene.faces
    left, up = f.left[meeting.row], f.up[meeting.row]
    away = meeting.position - f.origin[meeting.row]
    k, along = meeting.direction, meeting.cosine
    slope = np.stack((dot(k, left) / along, dot(k, up) / along), axis=-1)
    return slope, np.stack((dot(away, left), dot(away, up)), axis=-1)


def _carried(axis: Floats, before: Floats, after: Floats) -> Floats:
    """Return an axis across `before` turned with it, the shortest way, to `after`.

    An ideal lens bends by position, out of the plane of incidence of its flat face as well.
    Behind a total reflection `before` is no direction; no light goes there.
    """
    lean = dot(axis, after) / np.maximum(1.0 + dot(before, after), _NORMAL)
    carried: Floats = axis - lean[:, None] * (before + after)
    return carried


def _by_slope(meeting: Meeting, scene: Scene, slope: Floats, *, back: bool) -> Floats:
    """Return unit directions with given tangents, onwards or back."""
    left, up = scene.faces.left[meeting.row], scene.faces.up[meeting.row]
    way = -meeting.normal if back else meeting.normal
    vector = way + slope[:, :1] * left + slope[:, 1:] * up
    unit: Floats = vector / np.sqrt(dot(vector, vector))[:, None]
    return unit

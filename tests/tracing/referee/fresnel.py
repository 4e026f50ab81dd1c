"""Plane faces by 3-vectors and 3x3 coherency tensors, straight from the textbook formulas.

exp(-i w t), absorbers n + ik. A beam is a unit vector k and the tensor G = <E E^+> in the
three axes of the bench, whose trace is the power. Nothing here knows of a beam's own basis.
Born & Wolf, Principles of Optics, 1.5 (Fresnel), 14.2 (metals).
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np


class Ray(NamedTuple):
    """A chief ray with its coherency tensor (3, 3) and the length n L that it has run."""

    point: np.ndarray
    k: np.ndarray
    field: np.ndarray
    path: float = 0.0

    @property
    def power(self):
        return float(np.trace(self.field).real)


def unit(vector):
    vector = np.asarray(vector, dtype=float)
    return vector / np.linalg.norm(vector)


def horizontal(k):
    """Horizontal, to the left of someone who looks along k; and up."""
    e1 = unit(np.cross([0.0, 0.0, 1.0], k))
    return e1, np.cross(k, e1)


def tensor(k, stokes):
    """The tensor of a beam with Stokes vector (S0, S1, S2, S3) from horizontal to up.

    E(t) = Re[(e1 + c e2) exp(-iwt)] with c = -i is e1 at t = 0 and -e2 a quarter period
    later. For the receiver e1, on the left of someone who looks along k, is on the right and
    e2 is up: from right to down is clockwise, so S3 > 0, and <E1 E2*> = conj(c) = +i.
    """
    s0, s1, s2, s3 = stokes
    j12 = 0.5 * (s2 + 1j * s3)
    j = np.array([[0.5 * (s0 + s1), j12], [np.conj(j12), 0.5 * (s0 - s1)]])
    axes = np.stack(horizontal(k))
    return axes.T @ j @ axes


def stokes(ray_field, k, e1=None):
    """Stokes vector of a tensor in (e1, k x e1); e1 is horizontal unless given."""
    e1 = horizontal(k)[0] if e1 is None else e1
    e2 = np.cross(k, e1)
    j11, j22 = (e1 @ ray_field @ e1).real, (e2 @ ray_field @ e2).real
    j12 = e1 @ ray_field @ e2
    return np.array([j11 + j22, j11 - j22, 2 * j12.real, 2 * j12.imag])


def amplitudes(n1, n2, cosine):
    """(rs, rp, ts, tp, flux): flux is what |t|^2 takes to become power (of s light)."""
    c1 = complex(cosine)
    c2 = np.sqrt(1.0 - (n1 / n2) ** 2 * (1.0 - c1 * c1) + 0j)
    if (n2 * c2).imag < 0.0:
        c2 = -c2
    rs = (n1 * c1 - n2 * c2) / (n1 * c1 + n2 * c2)
    rp = (n2 * c1 - n1 * c2) / (n2 * c1 + n1 * c2)
    ts = 2 * n1 * c1 / (n1 * c1 + n2 * c2)
    tp = 2 * n1 * c1 / (n2 * c1 + n1 * c2)
    return rs, rp, ts, tp, (n2 * c2).real / (n1 * c1).real


def powers(n1, n2, theta):
    """(Rs, Rp) at an angle of incidence in rad."""
    rs, rp, *_ = amplitudes(n1, n2, np.cos(theta))
    return abs(rs) ** 2, abs(rp) ** 2


def refracted(k, normal, ratio):
    """Snell's law for vectors: ratio n1/n2, k.normal > 0; None at total reflection."""
    c = k @ normal
    square = 1.0 - ratio * ratio * (1.0 - c * c)
    if square <= 0.0:
        return None
    return ratio * k + (np.sqrt(square) - ratio * c) * normal


def s_vector(k, normal):
    cross = np.cross(k, normal)
    if np.linalg.norm(cross) < 1e-12:
        return horizontal(k)[0] if abs(k[2]) < 0.9 else unit(np.cross([1.0, 0.0, 0.0], k))
    return unit(cross)


def acted(field, k_in, k_out, s, amplitude):
    """The field after amplitudes on s and p = k x s: E' = a_s s (s.E) + a_p p' (p.E)."""
    a_s, a_p = amplitude
    operator = a_s * np.outer(s, s) + a_p * np.outer(np.cross(k_out, s), np.cross(k_in, s))
    return operator @ field @ operator.conj().T


def mirrored(ray, normal, rs, rp):
    """Reflection with given amplitudes."""
    k = ray.k - 2.0 * (ray.k @ normal) * normal
    s = s_vector(ray.k, normal)
    return ray._replace(k=k, field=acted(ray.field, ray.k, k, s, (rs, rp)))


def at_face(ray, normal, n1, n2, share=None):
    """(reflected, transmitted or None) at a bare face, or one of stated shares (Rs, Rp).

    `ray.point` lies on the face.
    """
    normal = normal if ray.k @ normal > 0.0 else -normal
    cosine = ray.k @ normal
    rs, rp, ts, tp, flux = amplitudes(n1, n2, cosine)
    k2 = refracted(ray.k, normal, n1 / n2)
    if share is not None:
        total = k2 is None
        share = (1.0, 1.0) if total else share
        rs, rp = -np.sqrt(share[0]), np.sqrt(share[1])
        ts, tp, flux = np.sqrt(1.0 - share[0]), np.sqrt(1.0 - share[1]), 1.0
    reflected = mirrored(ray, normal, rs, rp)
    if k2 is None:
        return reflected, None
    s = s_vector(ray.k, normal)
    field = flux * acted(ray.field, ray.k, k2, s, (ts, tp))
    return reflected, ray._replace(k=k2, field=field)


def onto(ray, point, normal, index):
    """The ray run on to a plane."""
    length = ((point - ray.point) @ normal) / (ray.k @ normal)
    return ray._replace(point=ray.point + length * ray.k, path=ray.path + index * length)

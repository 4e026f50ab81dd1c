"""Layers in line at normal incidence, all bounces between them, powers added: by iteration.

Stokes vectors in the bench basis of whichever way the light goes. At normal incidence a
mirror turns S2 and S3 round, and an axis met from behind has its angle negated.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

_PAULI = np.array(
    [
        [[1, 0], [0, 1]],
        [[1, 0], [0, -1]],
        [[0, 1], [1, 0]],
        [[0, 1j], [-1j, 0]],  # S3 = 2 Im <E1 E2*>
    ]
)
_MIRROR = np.diag([1.0, 1.0, -1.0, -1.0])


class Layer(NamedTuple):
    """Mueller matrices: through and back, for light that goes on and for light that returns."""

    on: np.ndarray
    returning: np.ndarray
    back_on: np.ndarray
    back_returning: np.ndarray


def mueller(jones):
    """The Mueller matrix of a Jones matrix."""
    j = np.asarray(jones, dtype=complex)
    return np.array([[0.5 * np.trace(a @ j @ b @ j.conj().T).real for b in _PAULI] for a in _PAULI])


def _turned(diagonal, angle):
    c, s = np.cos(angle), np.sin(angle)
    to_axes = np.array([[c, s], [-s, c]])
    return mueller(to_axes.T @ np.diag(diagonal) @ to_axes)


_NOTHING = np.zeros((4, 4))


def face(reflects):
    """A face that sends back a share."""
    through = (1.0 - reflects) * np.eye(4)
    back = reflects * _MIRROR
    return Layer(through, through, back, back)


def polarizer(angle, passes, refused):
    """Shares along the axis and across it; angle in rad from horizontal."""
    roots = np.sqrt([passes, refused])
    return Layer(_turned(roots, angle), _turned(roots, -angle), _NOTHING, _NOTHING)


def retarder(waves, angle):
    """Fast axis at an angle; the slow component gathers exp(+i 2 pi waves)."""
    phases = [1.0, np.exp(2j * np.pi * waves)]
    return Layer(_turned(phases, angle), _turned(phases, -angle), _NOTHING, _NOTHING)


def rotator(angle):
    """The same sense in space both ways: the other one in the basis of light that returns."""
    c, s = np.cos(angle), np.sin(angle)
    on, back = mueller([[c, -s], [s, c]]), mueller([[c, s], [-s, c]])
    return Layer(on, back, _NOTHING, _NOTHING)


def sheet(inside, reflects_front=0.04, reflects_back=0.04):
    """A thin element: two faces with something between them."""
    return [face(reflects_front), inside, face(reflects_back)]


class Result(NamedTuple):
    """What goes on, what returns (Stokes vectors), and what each layer swallowed (W)."""

    on: np.ndarray
    returned: np.ndarray
    absorbed: list[float]


def run(layers, stokes, least=1e-17):
    """Send light in at the front of the first layer."""
    count = len(layers)
    forth = np.zeros((count + 1, 4))
    back = np.zeros((count + 1, 4))
    forth[0] = stokes
    on, returned = np.zeros(4), np.zeros(4)
    absorbed = np.zeros(count)
    while forth[:, 0].sum() + back[:, 0].sum() > least:
        next_forth, next_back = np.zeros_like(forth), np.zeros_like(back)
        for i, layer in enumerate(layers):
            out_on = layer.on @ forth[i] + layer.back_returning @ back[i + 1]
            out_back = layer.returning @ back[i + 1] + layer.back_on @ forth[i]
            absorbed[i] += forth[i][0] + back[i + 1][0] - out_on[0] - out_back[0]
            next_forth[i + 1] += out_on
            next_back[i] += out_back
        on += next_forth[count]
        returned += next_back[0]
        next_forth[count] = 0.0
        next_back[0] = 0.0
        forth, back = next_forth, next_back
    return Result(on, returned, list(absorbed))

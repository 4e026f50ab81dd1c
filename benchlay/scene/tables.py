"""The scene as arrays: distinct rows of faces and solids, and which variant has which.

F faces, S solids, P bounding planes, Q patches, D discs, H holes, V variants, L wavelengths.
Lengths are in mm, in the plan frame.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

from benchlay.elements._polarization import Polarization
from benchlay.named import NamedTuple

Floats: TypeAlias = NDArray[np.float64]
Ints: TypeAlias = NDArray[np.int64]
Flags: TypeAlias = NDArray[np.bool_]


class Faces(NamedTuple):
    """Plane optical faces."""

    owner: Ints  # (F,) element number
    name: Ints  # (F,) number in `Scene.face_names`
    origin: Floats  # (F, 3)
    left: Floats  # (F, 3)
    up: Floats  # (F, 3)
    normal: Floats  # (F, 3)
    round: Flags  # (F,)
    middle: Floats  # (F, 2) of the outline, along left and up
    radii: Floats  # (F, 2) half sizes of the outline
    clear: Floats  # (F, 2) half sizes of the clear region, same middle unless `clear_middle`
    clear_round: Flags  # (F,)
    acts: Ints  # (F,) Acts
    inside: Ints  # (F,) Inside
    sink: Ints  # (F,) number in SINKS: where light ends on an opaque face
    beside: Ints  # (F,) number in SINKS: outside the clear region
    specular: Floats  # (F,)
    lens_power: Floats  # (F, L) of one face of a thin lens, 1/mm
    lens_curvature: Floats  # (F, L) 1/mm, positive where it bulges outwards
    mode: Ints  # (F, L) Mode
    share_s: Floats  # (F, L) reflected power of stated coatings
    share_p: Floats  # (F, L)
    loss_s: Floats  # (F, L) absorbed power of stated coatings
    loss_p: Floats  # (F, L)
    metal: NDArray[np.complex128]  # (F, L)
    unstated: Flags  # (F, L) the coating says nothing of this wavelength
    present: Flags  # (V, F)


class Solids(NamedTuple):
    """Convex solids with their bounding planes, patches, discs and holes."""

    owner: Ints  # (S,) element number, then source number, or the last number for neither
    name: Ints  # (S,) number in `Scene.names`, or -1 for null
    part: Ints  # (S,) number in PARTS
    sink: Ints  # (S,) number in SINKS
    specular: Floats  # (S,)
    plane_normal: Floats  # (P, 3)
    plane_offset: Floats  # (P,)
    plane_start: Ints  # (S,) first plane of each
    plane_solid: Ints  # (P,)
    axis_point: Floats  # (C, 3) of round solids
    axis: Floats  # (C, 3) unit
    axis_radius: Floats  # (C,)
    axis_length: Floats  # (C,)
    axis_solid: Ints  # (C,)
    centre: Floats  # (S, 3) of a sphere round it
    reach: Floats  # (S,) its radius
    patch_solid: Ints  # (Q,)
    patch_points: Floats  # (Q, K, 3), the last corner repeated
    patch_corners: Ints  # (Q,)
    patch_normal: Floats  # (Q, 3)
    disc_solid: Ints  # (D,)
    disc_centre: Floats  # (D, 3)
    disc_axes: Floats  # (D, 2, 3)
    disc_normal: Floats  # (D, 3)
    hole_solid: Ints  # (H,)
    hole_name: Ints  # (H,) number in `Scene.names`: "east.port"
    hole_round: Flags  # (H,)
    hole_centre: Floats  # (H, 3) on the inner side
    hole_axes: Floats  # (H, 2, 3) half axes
    hole_through: Floats  # (H, 3) to the other side
    present: Flags  # (V, S)


SINKS = (
    "target",
    "screen",
    "dump",
    "panel",
    "wall",
    "bench",
    "body",
    "rim",
    "absorbed",
    "handed-over",
    "escaped",
    "below-floor",
)
SINK = {name: number for number, name in enumerate(SINKS)}

PARTS = (
    "edge",
    "mount",
    "plate",
    "body",
    "post",
    "foot",
    "source",
    "panel",
    "lid",
    "bench",
    "floor",
    "wall",
    "ceiling",
)
PART = {name: number for number, name in enumerate(PARTS)}
CLOSE_PARTS = ("edge", "mount", "plate", "body", "source")
"""Parts that hold an optic so closely that the optic's own light passes them."""


class Mode:
    """How a face divides light."""

    BARE = 0
    STATED = 1
    METAL = 2


class Bulks(NamedTuple):
    """What elements do inside, by volume (E rows: volumes of distinct elements)."""

    kind: Ints  # (E,) number in BULKS
    axis: Floats  # (E, 3) unit vector, plan frame: fast axis, or that a rotator turns about
    passes: Floats  # (E, L)
    refused: Floats  # (E, L)
    phase: Floats  # (E, L) rad: retardance, or the angle of a rotator
    thickness: Floats  # (E,)
    barrel: Ints  # (E,) number in SINKS: of light that meets none of the faces round it


BULKS = ("clear", "absorber", "polarizer", "retarder", "rotator", "converter")


class Conversions(NamedTuple):
    """What converters make: one row a volume and product."""

    volume: Ints  # (C,)
    number: Ints  # (C,) of the product in its element's list
    of: Flags  # (C, L) which wavelengths make it
    wave: Ints  # (C,) the wavelength made
    share: Floats  # (C,) of the power
    polarization: tuple[Polarization | None, ...]  # None: that of the light that makes it


class Fixed(NamedTuple):
    """Products that every generation needs, worked out once."""

    face_axes: Floats  # (3, 3 F) columns: normals, lefts, ups
    face_offsets: Floats  # (3 F,) what to subtract from position . axis
    plane_of: Ints  # (S, K) bounding planes of each solid, the first repeated at the end
    plane_normals: Floats  # (S, K, 3)
    plane_offsets: Floats  # (S, K)
    round_of: Ints  # (S,) number of its axis, -1 where a solid is not round
    centres: Floats  # (3, S) middles of the spheres round solids
    centre_square: Floats  # (S,) mm²
    sphere: Floats  # (S,) radii with room for rounding, mm
    own_faces: Ints  # (E, K) face rows round each volume, -1 where it has fewer
    own_axes: Floats  # (E, K, 3, 3) their normals, lefts and ups
    own_middles: Floats  # (E, K, 3) middles of their outlines, mm
    own_both: Flags  # (E, K) whether optics stand on both sides
    pierced: Flags  # (S,) has holes
    hole_axes: Floats  # (3, 3 H) columns: ways through, and half axes over their squared lengths
    hole_offsets: Floats  # (2, 3, H) of their near and far planes: middle . those columns
    hole_sizes: Floats  # (H,) mm, of circles round openings, of any shape
    plane_sines2: Floats  # (P, K) squared sines of planes with those of their own solid
    enterable: Flags  # (V, F) faces that stand there and can be met from outside
    lens: Flags  # (F,) acts as an ideal lens
    passes: Flags  # (F,) acts on light from both sides


class Scene(NamedTuple):
    """Everything that light can meet, in every variant."""

    variants: tuple[str, ...]
    names: tuple[str, ...]
    elements: tuple[str, ...]  # element number -> name
    sources: tuple[str, ...]
    face_names: tuple[str, ...]
    wavelengths_nm: Floats  # (L,)
    index_outside: Floats  # (L,)
    index_inside: Floats  # (F, L) of what lies behind each face
    indices: Floats  # (E + 1, L) of each volume; the last row is the medium outside
    faces: Faces
    solids: Solids
    bulks: Bulks
    behind: Ints  # (F,) row in bulks of the volume behind each face, -1 outside
    before: Ints  # (F,) of the volume before it
    face_owner_name: Ints  # (F,) number in names of the element
    close: Flags  # (S,) holds its optic so closely that the optic's own light passes it
    reach_mm: float
    fixed: Fixed
    conversions: Conversions

"""Placed variants to one scene: distinct rows of faces and solids, and who has which."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

import numpy as np
from numpy.typing import NDArray

from benchlay.elements._kind import Acts, Face, Inside, Volume
from benchlay.layout.layout import Layout
from benchlay.layout.materials import BODY
from benchlay.placing.media import Media
from benchlay.placing.placed import Placed, PlacedElement, PlacedState
from benchlay.scene.bulks import bulks_table
from benchlay.scene.coatings import Figures, before_unknown, figures, spoken_for
from benchlay.scene.conversions import conversions
from benchlay.scene.fixed import fixed_products
from benchlay.scene.rows import FaceRows, Frames, SolidRows
from benchlay.scene.solids import solids_table
from benchlay.scene.surroundings import (
    Surrounding,
    bench_and_room,
    material_of,
    sheets,
    source_body,
)
from benchlay.scene.tables import CLOSE_PARTS, PART, SINK, Faces, Flags, Floats, Ints, Scene

_PLATE_SINK = {"plate": "rim"}
OUTSIDE = -1


class Compiler:
    """Gathers rows item by item; what states share becomes one row."""

    def __init__(self, placed: Placed) -> None:
        self.placed = placed
        base = placed.base.layout
        self.elements = tuple(sorted(base.elements))
        self.sources = tuple(sorted(base.sources))
        self.number = {name: i for i, name in enumerate(self.elements)}
        self.names: list[str] = []
        self.name_number: dict[str, int] = {}
        self.frames = Frames()
        self.faces = FaceRows()
        self.solids = SolidRows()
        self.hole_names: list[int] = []
        self.volumes: list[tuple[PlacedElement, Volume]] = []  # rows of bulks
        self.sides: list[tuple[int, int]] = []  # of each face: volumes behind and before it
        self.face_rows: list[set[int]] = [set() for _ in placed.states]
        self.solid_rows: list[set[int]] = [set() for _ in placed.states]
        self.wavelengths = list(placed.wavelengths_nm)

    def name(self, name: str | None) -> int:
        """Return the number of a name; -1 for none."""
        if name is None:
            return -1
        if name not in self.name_number:
            self.name_number[name] = len(self.names)
            self.names.append(name)
        return self.name_number[name]

    def gather(self) -> None:
        """Add the rows of every variant."""
        done: dict[int, tuple[list[int], list[int]]] = {}
        surroundings: dict[object, int] = {}
        for variant, state in enumerate(self.placed.states):
            for key in self.elements:
                item = state.elements[key]
                if item.out:
                    continue
                rows = done.get(id(item))
                if rows is None:
                    rows = done[id(item)] = self._element(item, state.layout)
                self.face_rows[variant].update(rows[0])
                self.solid_rows[variant].update(rows[1])
            for surrounding in _surroundings(state):
                row = surroundings.get(surrounding)
                if row is None:
                    row = surroundings[surrounding] = self._surrounding(surrounding)
                self.solid_rows[variant].add(row)

    def _element(self, item: PlacedElement, layout: Layout) -> tuple[list[int], list[int]]:
        owner = self.number[item.element.name]
        self.name(item.element.name)  # what is thin and free has faces only; they book as well
        frame = self.frames.add(item.pose.axes(), item.pose.at)
        first = len(self.volumes)
        self.volumes += [(item, volume) for volume in item.geometry.volumes()]
        faces = []
        for face in item.geometry.faces:
            faces.append(self.faces.add(_with_material(face, layout), owner, frame))
            self.sides.append(_sides(face, first))
        x, y, _ = item.pose.at
        upright = self.frames.add(item.pose.upright_axes(), (x, y, 0.0))
        boxed = () if item.holder.box is None else (item.holder.box,)
        material = material_of(layout, item.geometry.material, BODY)
        solids = []
        for solid in (*item.geometry.solids, *boxed, *item.holder.upright):
            sink = _PLATE_SINK.get(solid.part, "body")
            own = material.specular if solid.part == "body" else 0.0
            label = (owner, self.name(item.element.name), PART[solid.part], SINK[sink], own)
            solids.append(self.solids.add(solid, upright if solid.upright else frame, label))
        return faces, solids

    def _surrounding(self, item: Surrounding) -> int:
        frame = self.frames.add(item.axes, item.origin)
        part = PART[item.solid.part]
        label = (self._owner(item), self.name(item.name), part, SINK[item.sink], item.specular)
        for hole in item.solid.holes:
            self.hole_names.append(self.name(hole.name))
        return self.solids.add(item.solid, frame, label)

    def _owner(self, item: Surrounding) -> int:
        """Return who owns it: sources come after the elements, nobody comes last."""
        if item.solid.part == "source":
            return len(self.elements) + self.sources.index(item.name or "")
        return len(self.elements) + len(self.sources)

    def present(self, rows: list[set[int]], count: int) -> Flags:
        """Return which variant has which row."""
        table = np.zeros((len(rows), count), dtype=np.bool_)
        for variant, owned in enumerate(rows):
            table[variant, list(owned)] = True
        return table


def _sides(face: Face, first: int) -> tuple[int, int]:
    """Return the volumes behind and before a face of an element whose first one is `first`."""
    behind, before = (first + number for number in face.volumes)
    return (
        OUTSIDE if face.inside is Inside.NOWHERE else behind,
        before if face.inside is Inside.BOTH else OUTSIDE,
    )


def _with_material(face: Face, layout: Layout) -> Face:
    if face.material is None:
        return face
    return face._replace(specular=material_of(layout, face.material, BODY).specular)


def _surroundings(state: PlacedState) -> Sequence[Surrounding]:
    bodies = (source_body(state.sources[name]) for name in sorted(state.sources))
    return [
        *bench_and_room(state.layout),
        *sheets(state.layout),
        *(body for body in bodies if body is not None),
    ]


def compile_scene(placed: Placed) -> Scene:
    """Return the scene of all states of a placed layout."""
    compiler = Compiler(placed)
    compiler.gather()
    base = placed.base.layout
    waves = np.array(compiler.wavelengths)
    spoken = spoken_for(base, compiler.wavelengths)
    face_names = _face_names(compiler)
    faces, inside = _faces_table(compiler, spoken, face_names)
    outside = np.array([placed.media.index(None, nm) for nm in compiler.wavelengths])
    glasses = [volume.glass for _, volume in compiler.volumes]
    index = [[placed.media.index(g, nm) for nm in compiler.wavelengths] for g in (*glasses, None)]
    sides = np.array(compiler.sides, dtype=np.int64).reshape(-1, 2)
    behind, before = sides[:, 0].copy(), sides[:, 1].copy()
    solids = solids_table(
        compiler.solids,
        compiler.frames,
        compiler.hole_names,
        compiler.present(compiler.solid_rows, len(compiler.solids.solids)),
    )
    return Scene(
        tuple(state.name for state in placed.states),
        tuple(compiler.names),
        compiler.elements,
        compiler.sources,
        face_names,
        waves,
        outside,
        inside,
        np.array(index),
        faces,
        solids,
        bulks_table(compiler.volumes, compiler.wavelengths, spoken),
        behind,
        before,
        np.array(
            [compiler.name(compiler.elements[owner]) for owner in compiler.faces.owners],
            dtype=np.int64,
        ),
        np.isin(solids.part, [PART[part] for part in CLOSE_PARTS]),
        max(state.layout.limits.reach_mm for state in placed.states),
        fixed_products(faces, solids, (behind, before)),
        conversions(compiler.volumes, compiler.wavelengths, spoken),
    )


def _face_names(compiler: Compiler) -> tuple[str, ...]:
    """Return the names of all faces there are, and of those that ways through elements name."""
    records = (item.record for item in compiler.placed.base.layout.elements.values())
    ways = (way for record in records for ways in record.branches().values() for way in ways)
    named = {face for way in ways for face, _ in way}
    return tuple(sorted(named.union(face.name for face in compiler.faces.faces)))


def _faces_table(
    compiler: Compiler, spoken: Mapping[str, frozenset[float]], names: tuple[str, ...]
) -> tuple[Faces, Floats]:
    rows = compiler.faces
    origin, left, up, normal = rows.axes(compiler.frames)
    faces = rows.faces
    inside = np.array(
        [_inside_indices(compiler, i) for i in range(len(faces))], dtype=np.float64
    ).reshape(len(faces), len(compiler.wavelengths))
    per_wave = [
        [_figures(compiler, i, nm, spoken) for nm in compiler.wavelengths]
        for i in range(len(faces))
    ]
    power, curvature = _lens_tables(compiler, inside)
    table = Faces(
        np.array(rows.owners, dtype=np.int64),
        np.array([names.index(face.name) for face in faces], dtype=np.int64),
        origin,
        left,
        up,
        normal,
        np.array([face.outline.round for face in faces], dtype=np.bool_),
        _pairs([face.outline.centre for face in faces]),
        _pairs([face.outline.radii for face in faces]),
        _pairs([face.clear.radii for face in faces]),
        np.array([face.clear.round for face in faces], dtype=np.bool_),
        np.array([face.acts for face in faces], dtype=np.int64),
        np.array([face.inside for face in faces], dtype=np.int64),
        np.array([SINK[face.sink] for face in faces], dtype=np.int64),
        np.array([SINK[face.beside] for face in faces], dtype=np.int64),
        np.array([face.specular for face in faces], dtype=np.float64),
        power,
        curvature,
        *_figure_tables(per_wave, (len(faces), len(compiler.wavelengths))),
        compiler.present(compiler.face_rows, len(faces)),
    )
    return table, inside


def _pairs(values: list[tuple[float, float]]) -> Floats:
    return np.array(values, dtype=np.float64).reshape(-1, 2)


def _figures(
    compiler: Compiler, row: int, wavelength_nm: float, spoken: Mapping[str, frozenset[float]]
) -> Figures:
    name = compiler.elements[compiler.faces.owners[row]]
    stated = figures(compiler.faces.faces[row].coating, wavelength_nm, spoken[name])
    glasses = [compiler.volumes[side][1].glass for side in compiler.sides[row] if side != OUTSIDE]
    media: Media = compiler.placed.media
    known = all(glass is None or media.known(glass, wavelength_nm) for glass in glasses)
    return stated if known else before_unknown(stated)


def _inside_indices(compiler: Compiler, row: int) -> list[float]:
    media: Media = compiler.placed.media
    behind = compiler.sides[row][0]
    glass = None if behind == OUTSIDE else compiler.volumes[behind][1].glass
    return [media.index(glass, nm) for nm in compiler.wavelengths]


def _figure_tables(
    per_wave: list[list[Figures]], shape: tuple[int, int]
) -> tuple[Ints, Floats, Floats, Floats, Floats, NDArray[np.complex128], Flags]:
    flat = [figure for row in per_wave for figure in row]
    share_s, share_p, loss_s, loss_p = (
        np.array([figure[i] for figure in flat], dtype=np.float64).reshape(shape)
        for i in range(1, 5)
    )
    return (
        np.array([figure.mode for figure in flat], dtype=np.int64).reshape(shape),
        share_s,
        share_p,
        loss_s,
        loss_p,
        np.array([figure.metal for figure in flat], dtype=np.complex128).reshape(shape),
        np.array([figure.unstated for figure in flat], dtype=np.bool_).reshape(shape),
    )


def _lens_tables(compiler: Compiler, inside: Floats) -> tuple[Floats, Floats]:
    """Return power and curvature of each lens face: half of n/f, and what bends that much."""
    outside = np.array([compiler.placed.media.index(None, nm) for nm in compiler.wavelengths])
    focal = np.array(
        [face.focal_mm if face.acts is Acts.LENS else np.inf for face in compiler.faces.faces]
    )
    power = outside / (2.0 * focal[:, None])
    step = np.nan_to_num(inside - outside)  # of glass of unknown index: bends nothing back
    curvature = np.divide(power, step, out=np.zeros_like(power), where=step != 0.0)
    return power, curvature

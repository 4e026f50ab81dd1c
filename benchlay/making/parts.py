"""The sheets of an enclosure as a shop makes them: equal ones together, each with its number."""

from __future__ import annotations

from benchlay.geometry.polygon import signed_area
from benchlay.layout.enclosure import Enclosure, Lid, Panel
from benchlay.layout.layout import Layout
from benchlay.layout.materials import SHEET
from benchlay.making.blank import Blank, Draft
from benchlay.making.corners import Sheet
from benchlay.making.folding import Folded
from benchlay.making.panels import panel_draft
from benchlay.named import NamedTuple

PANEL, LID = "panel", "lid"
_DIGITS = 6  # after the point: blanks alike to a nanometre are alike


class Part(NamedTuple):
    """One sheet, as often as it is needed."""

    name: str  # of the first; a lid's is lid-NAME, where that is free
    kind: str  # panel | lid
    names: tuple[str, ...]  # of the panels or lids that it is, in name order
    draft: Draft
    material: str | None  # its name in the layout
    thickness_mm: float
    thickness_stated: bool
    density_kg_m3: float | None

    @property
    def quantity(self) -> int:
        """How many are needed."""
        return len(self.names)

    @property
    def blank(self) -> Blank:
        """Its flat blank."""
        return self.draft.blank

    @property
    def mass_kg(self) -> float | None:
        """Of one; None where no density is stated."""
        if self.density_kg_m3 is None:
            return None
        return self.blank.area_mm2 * self.thickness_mm * self.density_kg_m3 * 1e-9

    @property
    def lacks(self) -> tuple[str, ...]:
        """What a shop needs to know of the sheet itself and is not told."""
        own = [] if self.material else ["material"]
        if not self.thickness_stated:
            own.append("thickness")
        return (*own, *self.draft.lacks)


def parts_of(layout: Layout) -> tuple[Part, ...]:
    """Return the sheets to be made for a layout's enclosure, panels before lids, by name."""
    enclosure = layout.enclosure
    if enclosure is None:
        return ()
    sheets = [
        _sheet(name, enclosure.panels[name], enclosure, layout) for name in sorted(enclosure.panels)
    ]
    single = [
        _part(s.name, PANEL, panel_draft(s, sheets), enclosure.material_of(s.panel), layout)
        for s in sheets
    ]
    taken = {name.casefold() for name in enclosure.panels}
    for name in sorted(enclosure.lids):
        lid = enclosure.lids[name]
        part = _part(name, LID, _lid(lid), enclosure.material_of(lid), layout)
        file = f"lid-{name}"
        while file.casefold() in taken:
            file += "_"
        taken.add(file.casefold())
        single.append(part._replace(name=file))
    return tuple(_gathered(single))


def _sheet(name: str, panel: Panel, enclosure: Enclosure, layout: Layout) -> Sheet:
    material = enclosure.material_of(panel)
    thickness = (SHEET if material is None else layout.materials[material]).thickness_mm
    foot = None
    if panel.fold is not None:
        f = panel.fold
        foot = Folded(f.flange_mm, f.sense, f.radius_mm, thickness)
        if f.flange_mm < 2 * foot.setback_mm:
            foot = None  # too little of it beyond the bend to be held; the draft says so
    return Sheet(name, panel, thickness, enclosure.heights_mm(panel), foot)


def _part(name: str, kind: str, draft: Draft, material: str | None, layout: Layout) -> Part:
    record = SHEET if material is None else layout.materials[material]
    return Part(
        name,
        kind,
        (name,),
        draft,
        material,
        record.thickness_mm,
        record.written("thickness"),
        record.density_kg_m3,
    )


def _lid(lid: Lid) -> Draft:
    xs, ys = zip(*lid.outline, strict=True)
    left, low = min(xs), min(ys)
    corners = tuple((x - left, y - low) for x, y in lid.outline)
    if signed_area(corners) < 0.0:
        corners = corners[::-1]
    size = (max(xs) - left, max(ys) - low)
    return Draft(Blank(corners, flat_mm=size, formed_mm=size))


def _gathered(single: list[Part]) -> list[Part]:
    together: dict[tuple[object, ...], Part] = {}
    for part in single:
        alike = (part.kind, part.material, part.draft.lacks, _rounded(_shape(part.blank)))
        first = together.get(alike)
        together[alike] = (
            part if first is None else first._replace(names=(*first.names, *part.names))
        )
    return list(together.values())


def _shape(blank: Blank) -> object:
    """Return what is cut and bent, whatever it is for."""
    circles = sorted((h.centre, h.diameter_mm) for h in blank.rounds)
    holes = sorted((h.centre, h.diameter_mm) for h in blank.holes)
    return (blank.outer, blank.inner, tuple(circles), tuple(holes), blank.bends)


def _rounded(value: object) -> object:
    """Return nested tuples with their numbers rounded, to be compared."""
    if isinstance(value, float):
        return round(value, _DIGITS) + 0.0
    return tuple(map(_rounded, value)) if isinstance(value, tuple) else value

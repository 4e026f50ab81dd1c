"""What is said of the hazards of a state, as plain data: fields are the keys of the JSON.

A trailing underscore, put where a key is a word of Python's, is dropped in the JSON. Units
stand in the names. Lengths that have no end are infinite, which the JSON writes as null.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import TypeAlias

from benchlay.named import NamedTuple

Place: TypeAlias = tuple[float, float, float]


class Pulses(NamedTuple):
    """Pulses of a line."""

    energy_J: float
    duration_s: float
    rate_Hz: float


class Span(NamedTuple):
    """Stretch of a beam in which the eye's limit is exceeded, m from where it starts.

    It is that of the beam going on in the open, foci and all; beside it `far_field_m`, what the
    formula for the far field says, which knows the divergence alone.
    """

    from_m: float
    to_m: float
    far_field_m: float


class SourceHazard(NamedTuple):
    """One line of a source: what it emits, within the limit of which class, how far it reaches.

    `limits`, `naked_eye` and `binoculars` are in `unit`: W for continuous light, J (one
    pulse) for pulses. `span` is None where the limit is nowhere exceeded.
    """

    source: str
    wavelength_nm: float
    power_W: float
    pulses: Pulses | None
    class_as_modelled: str | None
    statement: str
    unit: str
    limits: Mapping[str, float | None]
    naked_eye: float
    binoculars: float
    mpe_W_m2: float | None
    time_base_s: float | None
    span: Span | None


class LineReached(NamedTuple):
    """The strongest light of one line that an eye could meet somewhere."""

    source: str
    wavelength_nm: float
    class_as_modelled: str | None
    statement: str
    power_W: float
    limit_W: float | None
    ratio: float | None
    beam: int | None
    from_: str
    at: Place | None


class Scattered(NamedTuple):
    """The strongest scattered light that an eye could meet: at `distance_m` from a surface."""

    surface: str
    wavelength_nm: float
    distance_m: float
    power_W: float
    class_as_modelled: str | None


class Reached(NamedTuple):
    """All light in reach on one side of the enclosure; `governs` says which is the worst of it."""

    class_as_modelled: str | None
    statement: str
    governs: str
    lines: tuple[LineReached, ...]
    scattered: Scattered | None


class Accessible(NamedTuple):
    """What people can reach in a state, and what stays within the enclosure.

    `counts` says which of the two is what people can reach, `because` why.
    """

    counts: str
    because: tuple[str, ...]
    class_as_modelled: str | None
    statement: str
    outside: Reached | None
    inside: Reached


class Distance(NamedTuple):
    """How far a beam that people can reach exceeds the limit, from where they can reach it.

    `stopped_m` is how far it really goes in the model, to `ends`; `alike` counts further
    beams that leave by the same way and exceed the limit over no more.
    """

    source: str
    wavelength_nm: float
    beam: int
    from_: str
    at: Place
    power_W: float
    limit_W: float
    from_m: float
    to_m: float
    far_field_m: float
    stopped_m: float
    ends: str
    alike: int


class Eyewear(NamedTuple):
    """What eyewear must do at one wavelength, on one side of the enclosure.

    `optical_density` is enough for all wavelengths there at once, `alone` for this one by
    itself. `exposure_W_m2` is the mean irradiance over the limiting aperture at the worst place.
    `scale` holds the numbers for every mode that is needed, at the narrowest place, `beam_mm`
    wide (63 % of the power); `scale_1_mm` the same where the beam is taken as no narrower than
    1 mm. Both are None where the limit is not exceeded. Of scattered light `beam` is None.
    """

    where: str
    wavelength_nm: float
    optical_density: float | None
    alone: float | None
    scale: str | None
    beam_mm: float | None
    scale_1_mm: str | None
    exposure_W_m2: float
    mpe_W_m2: float | None
    time_base_s: float | None
    source: str | None
    beam: int | None
    from_: str | None
    at: Place | None


class Diffuse(NamedTuple):
    """A matt surface that is struck: how far off the eye's limit is met again.

    `distance_m` takes the size of the spot into account (an extended source), which never
    brings it below 0.1 m, where an eye focuses at the nearest; `point_source_m` does not.
    """

    surface: str
    wavelength_nm: float
    at: Place
    power_W: float
    reflectance: float
    spot_mm: float
    angle_mrad: float
    distance_m: float
    point_source_m: float


class Person(NamedTuple):
    """Where someone is, and whether that is inside the controlled area; `edge_m` to its edge."""

    name: str
    eyes: str
    at: tuple[float, float]
    inside: bool
    edge_m: float | None


class Passage(NamedTuple):
    """A door or window, and whether the controlled area reaches it."""

    kind: str
    name: str
    reached: bool


class StateHazards(NamedTuple):
    """All that is said of one state; `holds` says for how long and under what conditions.

    `controlled_area_outside_m2` is what of the controlled area lies beyond the enclosure's
    line; None without an enclosure.
    """

    state: str
    edition: str
    time_base_s: float | None
    sources: tuple[SourceHazard, ...]
    accessible: Accessible
    distances: tuple[Distance, ...]
    eyewear: tuple[Eyewear, ...]
    diffuse: tuple[Diffuse, ...]
    controlled_area_m2: float
    controlled_area_outside_m2: float | None
    people: tuple[Person, ...]
    passages: tuple[Passage, ...]
    holds: tuple[str, ...]
    assumptions: tuple[str, ...]
    not_computed: tuple[str, ...]


class Sign(NamedTuple):
    """A label or sign: number, kind, where it goes, its lines, and the least size.

    `triangle_mm` is the side of the warning triangle, 0 for a label of words alone.
    """

    number: str
    kind: str
    place: str
    class_as_modelled: str | None
    words: tuple[str, ...]
    triangle_mm: float
    size_mm: tuple[float, float]

"""What placing gives: every item of every state with its pose and its geometry."""

from __future__ import annotations

from collections.abc import Mapping

from benchlay.elements._kind import Geometry
from benchlay.elements.mount import Holder
from benchlay.layout.elements import Element
from benchlay.layout.layout import Layout, LayoutSource
from benchlay.layout.light import Line, PulseTrain
from benchlay.layout.sources import Source
from benchlay.named import NamedTuple
from benchlay.placing.media import Media
from benchlay.placing.nominal import NominalRay
from benchlay.placing.pose import Pose


class PlacedElement(NamedTuple):
    """An element where it stands in one state."""

    element: Element
    pose: Pose
    geometry: Geometry
    holder: Holder

    @property
    def out(self) -> bool:
        """Whether it is taken out in this state."""
        return self.element.stand.out


class PlacedSource(NamedTuple):
    """A source where it stands: the pose's front normal is the way its beam goes."""

    source: Source
    pose: Pose


class PlacedState(NamedTuple):
    """One state: the items that do not differ from the base are the very same objects."""

    name: str
    layout: Layout
    sources: Mapping[str, PlacedSource]
    elements: Mapping[str, PlacedElement]

    def made_nm(self) -> frozenset[float]:
        """Return the wavelengths that converters make."""
        return frozenset(
            made.wavelength_nm
            for item in self.elements.values()
            if not item.out
            for made in item.element.record.makes()
        )

    def _pulse_at(self, wavelength_nm: float) -> PulseTrain | None:
        """Return the strongest pulses of any source at a wavelength, for what is fed by them."""
        pulses = [
            line.pulse
            for item in self.sources.values()
            for line in item.source.lines
            if line.pulse is not None and line.wavelength_nm == wavelength_nm
        ]
        return max(pulses, key=lambda pulse: pulse.energy_j, default=None)

    def lines(self, source: str) -> tuple[Line, ...]:
        """Return the lines of a source, and those that converters may make of its light.

        The latter are emitted elsewhere, so with no power of their own, in the source's pulses.
        What is fed by other light has the pulses of that.
        """
        own = self.sources[source].source.lines
        if self.sources[source].source.fed() is not None:
            own = tuple(line._replace(pulse=self._pulse_at(line.wavelength_nm)) for line in own)
        missing = self.made_nm().difference(line.wavelength_nm for line in own)
        if not missing:
            return own
        main = max(own, key=lambda line: line.power_w)
        return (*own, *(Line(nm, 0.0, main.pulse, main.span) for nm in sorted(missing)))


class Placed(NamedTuple):
    """The layout placed in every state; `arrivals` are nominal rays by element name."""

    layouts: LayoutSource
    states: tuple[PlacedState, ...]
    arrivals: Mapping[str, NominalRay]
    media: Media

    @property
    def wavelengths_nm(self) -> tuple[float, ...]:
        """All wavelengths of light in any state, emitted or made."""
        return tuple(
            sorted(
                {
                    line.wavelength_nm
                    for state in self.states
                    for name in state.sources
                    for line in state.lines(name)
                }
            )
        )

    @property
    def base(self) -> PlacedState:
        """The bench as drawn."""
        return self.states[0]

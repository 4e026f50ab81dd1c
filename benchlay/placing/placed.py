"""What placing gives: every item of every state with its pose and its geometry."""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple

from benchlay.elements._kind import Geometry
from benchlay.elements.mount import Holder
from benchlay.layout.layout import Element, Layout, LayoutSource
from benchlay.layout.sources import Source
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


class Placed(NamedTuple):
    """The layout placed in every state; `arrivals` are nominal rays by element name."""

    layouts: LayoutSource
    states: tuple[PlacedState, ...]
    arrivals: Mapping[str, NominalRay]
    media: Media

    @property
    def base(self) -> PlacedState:
        """The bench as drawn."""
        return self.states[0]

"""The kinds of element: one file a kind, one line a kind in the registry below."""

from __future__ import annotations

from benchlay.elements._kind import ElementKind
from benchlay.elements.aperture import Aperture
from benchlay.elements.cell import Cell
from benchlay.elements.converter import Converter
from benchlay.elements.cube import Cube
from benchlay.elements.dump import Dump
from benchlay.elements.filter import Filter
from benchlay.elements.lens import Lens
from benchlay.elements.mirror import Mirror
from benchlay.elements.obstacle import Obstacle
from benchlay.elements.pending import (
    Grating,
    Parabola,
    Prism,
)
from benchlay.elements.plate_polarizer import PlatePolarizer
from benchlay.elements.polarizer import Polarizer
from benchlay.elements.retroreflector import Retroreflector
from benchlay.elements.rotator import Rotator
from benchlay.elements.screen import Screen
from benchlay.elements.shutter import Shutter
from benchlay.elements.splitter import Splitter
from benchlay.elements.target import Target
from benchlay.elements.tube import Tube
from benchlay.elements.waveplate import Waveplate
from benchlay.elements.window import Window

KINDS: dict[str, type[ElementKind]] = {
    "mirror": Mirror,
    "splitter": Splitter,
    "cube": Cube,
    "window": Window,
    "filter": Filter,
    "polarizer": Polarizer,
    "plate-polarizer": PlatePolarizer,
    "waveplate": Waveplate,
    "rotator": Rotator,
    "lens": Lens,
    "aperture": Aperture,
    "grating": Grating,
    "prism": Prism,
    "parabola": Parabola,
    "retroreflector": Retroreflector,
    "cell": Cell,
    "converter": Converter,
    "dump": Dump,
    "target": Target,
    "screen": Screen,
    "shutter": Shutter,
    "tube": Tube,
    "obstacle": Obstacle,
}

__all__ = ["KINDS", "ElementKind"]

"""The kinds of element: one file a kind, one line a kind in the registry below."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from importlib import import_module

from benchlay.elements._kind import ElementKind


class _Kinds(Mapping[str, type[ElementKind]]):
    """The kinds by name; the file of a kind is loaded when the kind is first asked for.

    Most benches use a few of them, and to load the others would take longer than to read
    the layout.
    """

    def __init__(self, places: dict[str, str]) -> None:
        self._places = places  # file and class by name
        self._loaded: dict[str, type[ElementKind]] = {}

    def __getitem__(self, name: str) -> type[ElementKind]:
        """Return the class of a kind."""
        if name not in self._loaded:
            file, _, cls = self._places[name].partition(".")
            self._loaded[name] = getattr(import_module(f"benchlay.elements.{file}"), cls)
        return self._loaded[name]

    def __contains__(self, name: object) -> bool:
        return name in self._places

    def __iter__(self) -> Iterator[str]:
        return iter(self._places)

    def __len__(self) -> int:
        return len(self._places)


KINDS = _Kinds(
    {
        "mirror": "mirror.Mirror",
        "splitter": "splitter.Splitter",
        "cube": "cube.Cube",
        "window": "window.Window",
        "filter": "filter.Filter",
        "polarizer": "polarizer.Polarizer",
        "plate-polarizer": "plate_polarizer.PlatePolarizer",
        "waveplate": "waveplate.Waveplate",
        "rotator": "rotator.Rotator",
        "lens": "lens.Lens",
        "aperture": "aperture.Aperture",
        "grating": "pending.Grating",
        "prism": "pending.Prism",
        "parabola": "pending.Parabola",
        "retroreflector": "retroreflector.Retroreflector",
        "cell": "cell.Cell",
        "converter": "converter.Converter",
        "dump": "dump.Dump",
        "target": "target.Target",
        "screen": "screen.Screen",
        "shutter": "shutter.Shutter",
        "tube": "tube.Tube",
        "obstacle": "obstacle.Obstacle",
    }
)

__all__ = ["KINDS", "ElementKind"]

"""Each sink, direction, place, width and polarization beside an independent figure."""

import importlib

import pytest

from tests.tracing.bench import SCENES

for name in (
    "plates",
    "glasses",
    "states",
    "lenses",
    "cuts",
    "bodies",
    "landings",
    "rotators",
    "tubes",
    "converters",
    "corners",
    "sources",
    "routes",
    "openings",
):
    importlib.import_module(f"tests.tracing.scenes.{name}")


@pytest.mark.parametrize("name", sorted(SCENES))
def test_scene_agrees_with_the_referee(name):
    compared = list(SCENES[name]())
    assert compared
    wrong = [f"{c.what}: {c.got!r}, not {c.expected!r}" for c in compared if not c.holds]
    assert wrong == []

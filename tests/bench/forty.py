"""Writes the bench that the speed scripts use: 40 elements, 16 uncoated windows, enclosure.

Two rows of wedged windows and mirrors behind a splitter, dumps and screens that stand by, four
panels with one opening; with `states`, three states of it.
"""

import sys

TURNS = ("left 90", "left 90", "right 90", "right 90")
HEAD = """\
title: speed bench
bench: {size: [2400, 1200], holes: {pitch: 25, first: [25, 25]}}
sources:
  red: {wavelength: 633, power: 20 mW, beam: {waist_radius: 0.5}, polarization: vertical,
        at: [200, 300], heading: 0, body: {length: 150, width: 50, height: 50}}
elements:
  BS: {kind: splitter, after: red, distance: 100, turn: left 90, diameter: 25.4,
       reflectance: 50 %}
"""
PANELS = """\
enclosure:
  panels:
    south: {from: [0, 0], to: [2400, 0]}
    east: {from: [2400, 0], to: [2400, 1200]}
    north: {from: [2400, 1200], to: [0, 1200]}
    west: {from: [0, 1200], to: [0, 0],
           openings: {port: {along: 600, height: 50, diameter: 30}}}
"""
STATES = """\
states:
  align: {sources.red.power: 1 mW}
  open: {enclosure.panels.south.open: yes}
"""


def arm(prefix: str, before: str, first_mm: int) -> tuple[list[str], list[str]]:
    """Return the lines of one arm and the names on its route."""
    lines, names = [], []

    def add(name: str, what: str) -> None:
        lines.append(f"  {name}: {{{what}, diameter: 25.4")
        names.append(name)

    for row, turn in enumerate(TURNS):
        for i, distance in enumerate((first_mm, 250)):
            after = names[-1] if names else before
            where = f"after: {after}, distance: {distance}, incidence: {3 + i}"
            add(f"{prefix}W{row}{i}", f"kind: window, {where}")
            lines[-1] += ",\n    thickness: 4, wedge: 30 arcmin, wedge_towards: left}"
        add(f"{prefix}M{row}", f"kind: mirror, after: {names[-1]}, distance: 200, turn: {turn}")
        lines[-1] += ", reflectance: 99.5 %}"
    lines.append(f"  T{prefix}: {{kind: target, after: {names[-1]}, distance: 100}}")
    return lines, [*names, f"T{prefix}"]


def bench(*, states: bool = False) -> str:
    """Return the layout."""
    one, through = arm("A", "BS.transmitted", 200)
    two, turned = arm("B", "BS.reflected", 130)
    dumps = [f"  D{i}: {{kind: dump, at: [{150 + 250 * i}, 1100], facing: -90}}" for i in range(8)]
    screens = [
        f"  K{i}: {{kind: screen, at: [{1500 + 150 * i}, 100], facing: 90}}" for i in range(4)
    ]
    routes = [
        "routes:",
        f"  a: [red, BS.transmitted, {', '.join(through)}]",
        f"  b: [red, BS.reflected, {', '.join(turned)}]",
    ]
    body = "\n".join((*one, *two, *dumps, *screens, *routes))
    return f"{HEAD}{body}\n{PANELS}{STATES if states else ''}"


if __name__ == "__main__":
    print(bench(states="states" in sys.argv[1:]), end="")

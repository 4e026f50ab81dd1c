"""A box 1000 x 800 x 300 whose panels and lids tests replace; one beam from the left."""

from benchlay.checks import Context, floors_w, limits_of
from benchlay.coverage.enclosed import enclosed_of
from benchlay.coverage.gaps import gaps_of
from benchlay.layout import read_layout
from benchlay.placing import place
from benchlay.tracing import trace

PANELS = {
    "south": "{from: [0, 0], to: [1000, 0]}",
    "east": "{from: [1000, 0], to: [1000, 800]}",
    "north": "{from: [1000, 800], to: [0, 800]}",
    "west": "{from: [0, 800], to: [0, 0]}",
}
LID = "{height: 300, outline: [[0, 0], [1000, 0], [1000, 800], [0, 800]]}"
ELEMENTS = "  T1: {kind: target, after: red, distance: 400}\n"
ROUTES = "routes: {main: [red, T1]}\n"


def box(*, lids=None, elements=ELEMENTS, routes=ROUTES, power="50 mW", room="", at=None, **panels):
    """Write the layout: a panel set to None is left out, others are added or replace theirs."""
    whole = {**PANELS, **panels}
    covers = {"main": LID} if lids is None else lids
    x, y = at or (300, 400)
    return (
        "bench: {size: [1000, 800]}\n"
        "sources:\n"
        f"  red: {{wavelength: 633, power: {power}, beam: {{waist_radius: 0.5}}, body: none,\n"
        f"        at: [{x}, {y}], heading: 0}}\n"
        f"elements:\n{elements}{routes}{room}enclosure:\n  panels:\n"
        + "".join(f"    {name}: {text}\n" for name, text in whole.items() if text)
        + ("  lids:\n" if covers else "")
        + "".join(f"    {name}: {text}\n" for name, text in covers.items())
    )


def opening(panel, text):
    """Write a panel of the box with one opening, `hole`."""
    return f"{PANELS[panel][:-1]}, openings: {{hole: {text}}}}}"


def enclosed(text):
    """Return what encloses a layout, without a look at what fills openings."""
    layouts, problems = read_layout(text, "box.yaml")
    assert layouts is not None, [str(p) for p in problems.sorted()]
    found = enclosed_of(layouts.as_drawn)
    assert found is not None
    return found


def gap_named(found, through):
    (gap,) = (gap for gap in gaps_of(found) if gap.through == through)
    return gap


def traced(text):
    layouts, problems = read_layout(text, "box.yaml")
    assert layouts is not None, [str(p) for p in problems.sorted()]
    placed = place(layouts, problems)
    assert placed is not None, [str(p) for p in problems.sorted()]
    return trace(placed, floors_w(placed, limits_of(placed)))


def context_of(text):
    done = traced(text)
    return Context(done, limits_of(done.placed))

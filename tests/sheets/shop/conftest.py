"""What tests of workshop sheets share: boxes of lettering on paper."""

import math

import pytest

from benchlay.sheets.lettering import width_mm
from benchlay.sheets.primitives import Across, Dimension, Space, Text, Up, to_paper
from benchlay.writers import recorder
from benchlay.writers.dimension_lines import take_apart


def text_boxes(sheet):
    """Yield words and corners of the box round every line of lettering, mm on paper."""
    for space, p in recorder.record(sheet):
        if isinstance(p, Dimension):
            p = take_apart(p, sheet.scale if space is Space.MODEL else 1.0, sheet.decimal).text
        if not isinstance(p, Text) or not p.text:
            continue
        at = to_paper(sheet, p.at) if space is Space.MODEL else p.at
        width, height = width_mm(p.text, p.height_mm) / 1.1, p.height_mm
        x = {Across.LEFT: 0.0, Across.CENTRE: -width / 2, Across.RIGHT: -width}[p.across]
        y = {Up.BASELINE: 0.0, Up.MIDDLE: -height / 2, Up.TOP: -height}[p.up]
        corners = [(x, y), (x + width, y), (x + width, y + height), (x, y + height)]
        c, s = (f(math.radians(p.rotation_deg)) for f in (math.cos, math.sin))
        turned = [(at[0] + c * u - s * v, at[1] + s * u + c * v) for u, v in corners]
        xs, ys = zip(*turned, strict=True)
        yield p.text, (min(xs), min(ys), max(xs), max(ys))


@pytest.fixture(scope="session")
def legible():
    """Assert that all lettering lies on the sheet and none on another."""

    def check(sheet):
        boxes = list(text_boxes(sheet))
        width, height = sheet.size_mm
        for words, (x0, y0, x1, y1) in boxes:
            assert min(x0, y0) >= 0.0, (sheet.name, words)
            assert x1 <= width, (sheet.name, words)
            assert y1 <= height, (sheet.name, words)
        for n, (words, a) in enumerate(boxes):
            for other, b in boxes[n + 1 :]:
                clear = a[2] <= b[0] or b[2] <= a[0] or a[3] <= b[1] or b[3] <= a[1]
                assert clear, (sheet.name, words, other)

    return check


@pytest.fixture(scope="session")
def words_of():
    """Return all lettering of a sheet."""

    def words(sheet):
        records = recorder.record(sheet)
        own = [p.text for _, p in records if isinstance(p, Text)]
        return own + [p.text for _, p in records if isinstance(p, Dimension) and p.text]

    return words

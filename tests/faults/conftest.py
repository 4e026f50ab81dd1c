import pytest

from benchlay.faults import review_faults
from benchlay.pipeline import place, read

HEAD = """\
bench: {{size: {size}, medium: vacuum}}
sources:
  red: {{wavelength: 633, power: 100 mW, beam: {{waist_radius: 0.3}}, polarization: {polarization},
        at: {at}, heading: 0, body: none}}
"""


@pytest.fixture
def bench():
    """Returns the review of a bench: one 100 mW beam along +x, 100 above the bench."""

    def make(body, *, size="[3000, 3000]", polarization="vertical", at="[100, 1000]"):
        text = HEAD.format(size=size, polarization=polarization, at=at) + body
        return place(read("bench.yaml", text))

    return make


@pytest.fixture
def reviewed(bench):
    def make(body, **head):
        return review_faults(bench(body, **head))

    return make


@pytest.fixture
def named():
    """Returns the one fault of a review whose family and words are given."""

    def find(review, element, words, state=0):
        found = [
            fault
            for fault in review.faults
            if fault.family.element == element
            and words in fault.name
            and fault.family.state == state
        ]
        assert len(found) == 1, [fault.name for fault in found]
        return found[0]

    return find

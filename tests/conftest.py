"""Settings and results that several tests share."""

import pytest
from hypothesis import HealthCheck, settings

from benchlay.report.model import CheckRun, LimitUsed, Reported, Review

# The same examples on every run and no clock: a failure must be seen again when the
# suite is run again. Found cases are pinned with @example beside the property.
settings.register_profile(
    "benchlay",
    derandomize=True,
    deadline=None,
    max_examples=50,
    database=None,
    suppress_health_check=[HealthCheck.too_slow],
)
settings.load_profile("benchlay")


@pytest.fixture
def make_finding():
    """Make a finding as it is reported; any field may be given."""

    def make(severity="fail", **fields):
        whole = Reported(
            id="escape/W1/g7f3",
            check="escape",
            severity=severity,
            states=("as drawn", "alignment"),
            worst_state="alignment",
            message="6.1 mW of 532 nm leave over the south side",
            expected="at most 0.385 mW beyond the enclosure",
            remedy="raise panel 'south' to 320 mm",
            element="W1",
            beam=17,
            at=(1500.0, 412.5, 100.0),
            file="x.yaml",
            line=2,
            column=3,
            value=0.0061,
            limit=0.000385,
            unit="W",
            accepted=None,
        )
        return whole._replace(**fields)

    return make


@pytest.fixture
def make_review():
    """Make the review of a layout with these findings; any other field may be given."""

    def make(layout="x.yaml", findings=(), **fields):
        whole = Review(
            layout=layout,
            sha256="0" * 64,
            title="A bench",
            revision="A",
            as_of=None,
            findings=tuple(findings),
            checks=(CheckRun("escape", "as drawn", True),),
            limits_used=(LimitUsed(532.0, 100.0, 10.0, 7.0, 0.000385, "IEC 60825-1:2014", False),),
            lines=("elements:", "  W1: {kind: window}"),
        )
        return whole._replace(**fields)

    return make

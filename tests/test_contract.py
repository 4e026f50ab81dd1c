"""Every key of the JSON that other programs rely on: there, in its order, of its type."""

import json
from pathlib import Path

import pytest

from benchlay import cli

LAYOUT = """
title: Contract
revision: B
bench: {size: [900, 600], beam_height: 100, holes: {pitch: 25, first: [25, 25]}}
sources:
  red: {wavelength: 633, power: 80 mW, beam: {waist_radius: 0.5, m2: 1.2}, polarization: vertical,
        at: [100, 100], heading: 0, body: {length: 90, width: 40, height: 40}}
  ruby: {wavelength: 694.3, pulse: {energy: 2 mJ, duration: 20 ns, rate: 10 Hz},
         beam: {diameter: 2, divergence: 1.5 mrad}, at: [100, 450], heading: 0}
elements:
  M1: {kind: mirror, after: red, distance: 300, turn: left 90, diameter: 25.4, reflectance: 99 %}
  W1: {kind: window, after: M1, distance: 100, incidence: 30, diameter: 25.4}
  T1: {kind: target, after: W1, distance: 100, specular: 10 %, diffuse: 80 %}
  A1: {kind: aperture, after: ruby, distance: 200, opening: 1.5}
  L9: {kind: lens, at: [700, 50], facing: 90, diameter: 25.4, focal: 100}
routes:
  work: [red, M1, W1, T1]
  port: [ruby, A1, east.port]
enclosure:
  material: sheet
  panels:
    east: {from: [900, 0], to: [900, 600],
           openings: {port: {along: 450, height: 100, diameter: 20}}}
    north: {from: [900, 600], to: [0, 600]}
materials: {sheet: {specular: 5 %, diffuse: 10 %}}
states:
  off: {elements.M1.out: yes}
  glance: {limits.time_base: 0.25 s}
accept:
  - {finding: dark-element/L9/0000, reason: spare, by: officer, until: 2027-06-30}
"""

NUMBER, INTEGER, TEXT, YES_NO, NULL = (
    (float, int), int, str, bool, type(None),
)  # fmt: skip
SEVERITIES = {"fail", "warn", "note"}
SINKS = {
    "target", "screen", "dump", "panel", "wall", "bench", "body", "rim", "absorbed",
    "handed-over", "escaped", "below-floor",
}  # fmt: skip
EVENTS = {
    "emitted", "reflected", "transmitted", "diffracted", "converted", "scattered", "spilled",
}  # fmt: skip


def is_number(value):
    return isinstance(value, NUMBER) and not isinstance(value, bool)


def maybe(kind):
    return lambda value: value is None or matches(value, kind)


def listed(kind):
    return lambda value: isinstance(value, list) and all(matches(v, kind) for v in value)


def fixed(kind, count):
    return lambda value: listed(kind)(value) and len(value) == count


def one_of(words):
    return lambda value: value in words


def keys(table, optional=()):
    def check(value):
        assert isinstance(value, dict), value
        present = [key for key in table if key in value or key not in optional]
        assert list(value) == present
        for key, kind in table.items():
            if key in value:
                assert matches(value[key], kind), (key, value[key])
        return True

    return check


def named(kind):
    return lambda value: isinstance(value, dict) and all(matches(v, kind) for v in value.values())


def matches(value, kind):
    if kind is NUMBER:
        return is_number(value)
    if isinstance(kind, type):
        return isinstance(value, kind) and not (kind is int and isinstance(value, bool))
    return kind(value)


POINT = fixed(NUMBER, 3)
PAIR = fixed(NUMBER, 2)
POLARIZATION = keys(
    {"degree": NUMBER, "angle_deg": NUMBER, "ellipticity_deg": NUMBER, "horizontal": POINT}
)
SINK = keys(
    {"kind": one_of(SINKS), "name": maybe(TEXT), "wavelength_nm": NUMBER, "power_W": NUMBER,
     "largest_W": NUMBER},
    optional=("largest_W",),
)  # fmt: skip
LEDGER = listed(
    keys(
        {"state": TEXT, "source": TEXT, "emitted_W": NUMBER, "sinks": listed(SINK),
         "unaccounted_W": NUMBER}
    )
)  # fmt: skip
STRETCH = keys({"beam": INTEGER, "from": POINT, "to": POINT})
COVERAGE = keys(
    {
        "state": TEXT, "from": TEXT, "covered": NUMBER,
        "gaps": listed(
            keys(
                {"id": TEXT, "azimuth": PAIR, "elevation": PAIR, "solid_angle_sr": NUMBER,
                 "through": TEXT, "width_mm": NUMBER, "at": maybe(POINT), "power_W": NUMBER}
            )
        ),
    }
)  # fmt: skip
FINDING = keys(
    {
        "id": TEXT, "check": TEXT, "severity": one_of(SEVERITIES), "states": listed(TEXT),
        "worst_state": TEXT, "message": TEXT, "expected": TEXT, "remedy": TEXT,
        "element": maybe(TEXT), "beam": maybe(INTEGER), "at": maybe(POINT), "file": maybe(TEXT),
        "line": maybe(INTEGER), "column": maybe(INTEGER), "value": maybe(NUMBER),
        "limit": maybe(NUMBER), "unit": maybe(TEXT), "accepted": maybe(dict),
        "related": listed(dict), "stretch": maybe(listed(POINT)), "stretches": listed(STRETCH),
    }
)  # fmt: skip
ROUTE = keys(
    {
        "route": TEXT, "state": TEXT, "arrives": YES_NO, "power_W": NUMBER,
        "transmission": NUMBER, "path_mm": maybe(NUMBER), "optical_path_mm": maybe(NUMBER),
        "polarization": maybe(POLARIZATION),
    }
)  # fmt: skip
ZONE = keys(
    {
        "state": TEXT, "kind": one_of({"direct", "diffuse", "over"}), "wavelength_nm": NUMBER,
        "reason": TEXT, "area_m2": NUMBER, "reach_m": NUMBER, "polygon": listed(listed(PAIR)),
    }
)  # fmt: skip
LIMIT = keys(
    {
        "wavelength_nm": NUMBER, "time_base_s": NUMBER, "mpe_W_m2": NUMBER,
        "aperture_mm": NUMBER, "accessible_W": NUMBER, "edition": TEXT, "overridden": YES_NO,
        "accessible_J": maybe(NUMBER),
    }
)  # fmt: skip
HANDED_OVER = keys(
    {"through": TEXT, "axis": keys({"at": POINT, "direction": POINT}), "w_mm": PAIR,
     "power_W": NUMBER, "state": TEXT}
)  # fmt: skip
MATRIX = keys(
    {"states": listed(TEXT),
     "rows": listed(keys({"id": TEXT, "in": listed(YES_NO), "worst": TEXT}))}
)  # fmt: skip
PULSES = keys({"energy_J": NUMBER, "duration_s": NUMBER, "rate_Hz": NUMBER})
SPAN = keys({"from_m": NUMBER, "to_m": maybe(NUMBER), "far_field_m": maybe(NUMBER)})
SOURCE = keys(
    {
        "source": TEXT, "wavelength_nm": NUMBER, "power_W": NUMBER, "pulses": maybe(PULSES),
        "class_as_modelled": maybe(TEXT), "statement": TEXT, "unit": one_of({"W", "J"}),
        "limits": named(maybe(NUMBER)), "naked_eye": NUMBER, "binoculars": NUMBER,
        "mpe_W_m2": maybe(NUMBER), "time_base_s": maybe(NUMBER), "span": maybe(SPAN),
    }
)  # fmt: skip
REACHED = keys(
    {
        "class_as_modelled": maybe(TEXT), "statement": TEXT, "governs": TEXT,
        "lines": listed(
            keys(
                {"source": TEXT, "wavelength_nm": NUMBER, "class_as_modelled": maybe(TEXT),
                 "statement": TEXT, "power_W": NUMBER, "limit_W": maybe(NUMBER),
                 "ratio": maybe(NUMBER), "beam": maybe(INTEGER), "from": TEXT, "at": maybe(POINT)}
            )
        ),
        "scattered": maybe(
            keys(
                {"surface": TEXT, "wavelength_nm": NUMBER, "distance_m": NUMBER,
                 "power_W": NUMBER, "class_as_modelled": maybe(TEXT)}
            )
        ),
    }
)  # fmt: skip
HAZARDS = keys(
    {
        "state": TEXT, "edition": TEXT, "time_base_s": maybe(NUMBER), "sources": listed(SOURCE),
        "accessible": keys(
            {"counts": one_of({"inside", "outside"}), "because": listed(TEXT),
             "class_as_modelled": maybe(TEXT), "statement": TEXT, "outside": maybe(REACHED),
             "inside": REACHED}
        ),
        "distances": listed(
            keys(
                {"source": TEXT, "wavelength_nm": NUMBER, "beam": INTEGER, "from": TEXT,
                 "at": POINT, "power_W": NUMBER, "limit_W": NUMBER, "from_m": NUMBER,
                 "to_m": maybe(NUMBER), "far_field_m": maybe(NUMBER), "stopped_m": maybe(NUMBER),
                 "ends": TEXT, "alike": INTEGER}
            )
        ),
        "eyewear": listed(
            keys(
                {"where": one_of({"inside", "outside"}), "wavelength_nm": NUMBER,
                 "optical_density": maybe(NUMBER), "alone": maybe(NUMBER), "scale": maybe(TEXT),
                 "beam_mm": maybe(NUMBER), "scale_1_mm": maybe(TEXT), "exposure_W_m2": NUMBER,
                 "mpe_W_m2": maybe(NUMBER), "time_base_s": maybe(NUMBER), "source": maybe(TEXT),
                 "beam": maybe(INTEGER), "from": maybe(TEXT), "at": maybe(POINT)}
            )
        ),
        "diffuse": listed(
            keys(
                {"surface": TEXT, "wavelength_nm": NUMBER, "at": POINT, "power_W": NUMBER,
                 "reflectance": NUMBER, "spot_mm": NUMBER, "angle_mrad": maybe(NUMBER),
                 "distance_m": maybe(NUMBER), "point_source_m": maybe(NUMBER)}
            )
        ),
        "controlled_area_m2": NUMBER,
        "controlled_area_outside_m2": maybe(NUMBER),
        "people": listed(
            keys({"name": TEXT, "eyes": TEXT, "at": PAIR, "inside": YES_NO,
                  "edge_m": maybe(NUMBER)})
        ),
        "passages": listed(keys({"kind": TEXT, "name": TEXT, "reached": YES_NO})),
        "holds": listed(TEXT), "assumptions": listed(TEXT), "not_computed": listed(TEXT),
    }
)  # fmt: skip
SIGN = keys(
    {"number": TEXT, "kind": TEXT, "place": TEXT, "class_as_modelled": maybe(TEXT),
     "words": listed(TEXT), "triangle_mm": NUMBER, "size_mm": PAIR}
)  # fmt: skip
PANEL = keys(
    {"panel": TEXT, "worst_irradiance_W_cm2": maybe(NUMBER), "state": maybe(TEXT),
     "withstands_W_cm2": maybe(NUMBER), "margin": maybe(NUMBER), "governs": maybe(TEXT),
     "fault": maybe(TEXT), "value": maybe(NUMBER), "limit": maybe(NUMBER), "unit": maybe(TEXT),
     "exposed_s": maybe(NUMBER), "rated_s": maybe(NUMBER), "source": maybe(TEXT),
     "wavelength_nm": maybe(NUMBER), "last_at": maybe(TEXT), "shown": YES_NO,
     "reason": maybe(TEXT), "sheet": one_of({"panel", "lid"})}
)  # fmt: skip
REVIEW = keys(
    {
        "layout": TEXT, "sha256": TEXT, "title": maybe(TEXT), "revision": maybe(TEXT),
        "as_of": maybe(TEXT), "verdict": one_of({*SEVERITIES, "none"}),
        "findings": listed(FINDING),
        "checks": listed(
            keys({"check": TEXT, "state": TEXT, "ran": YES_NO, "reason": maybe(TEXT)})
        ),
        "limits_used": listed(LIMIT), "routes": listed(ROUTE), "ledger": LEDGER,
        "zones": listed(ZONE), "controlled_areas": listed(dict), "coverage": listed(COVERAGE),
        "panels": listed(PANEL),
        "cavities": listed(dict), "matched": listed(dict), "handed_over": listed(HANDED_OVER),
        "hazards": listed(HAZARDS), "signs": listed(SIGN),
        "not_computed": listed(TEXT), "matrix": MATRIX,
    }
)  # fmt: skip
BEAM = keys(
    {
        "beam": INTEGER, "parent": maybe(INTEGER), "source": TEXT, "wavelength_nm": NUMBER,
        "splits": INTEGER, "route": maybe(TEXT), "routes": listed(TEXT), "leg": maybe(INTEGER),
        "from": TEXT, "from_face": TEXT, "to": maybe(TEXT), "to_face": maybe(TEXT),
        "ends": one_of({*SINKS, "optic"}), "event": one_of(EVENTS), "start": POINT, "end": POINT,
        "direction": POINT, "medium_index": NUMBER, "power_W": maybe(NUMBER),
        "power_at_end_W": maybe(NUMBER), "lost_W": named(NUMBER),
        "pulse_energy_J": maybe(NUMBER), "w_start_mm": PAIR, "w_end_mm": PAIR,
        "w_axis_deg": NUMBER, "m2": PAIR, "optical_path_mm": NUMBER,
        "polarization": maybe(POLARIZATION), "peak_irradiance_end_W_cm2": maybe(NUMBER),
    }
)  # fmt: skip
POSE = keys({"at": POINT, "facing": NUMBER, "pitch": NUMBER})
TRACE = keys(
    {
        "state": TEXT,
        "beams": listed(BEAM),
        "placed": named(POSE),
        "ledger": LEDGER,
        "cautions": listed(TEXT),
    }
)
PROBLEM = keys(
    {"file": TEXT, "line": INTEGER, "column": INTEGER, "message": TEXT, "expected": TEXT,
     "remedy": TEXT}
)  # fmt: skip


@pytest.fixture
def printed(tmp_path, monkeypatch, capsys):
    """Run a command on the layout and read its JSON; what is no JSON number is refused."""
    monkeypatch.chdir(tmp_path)
    Path("x.yaml").write_text(LAYOUT, encoding="utf-8")

    def run(*command):
        cli.run(
            [*command, "--json", "x.yaml", *(("--on", "2027-01-01") if "check" in command else ())]
        )
        captured = capsys.readouterr()
        assert captured.err == ""
        return json.loads(captured.out, parse_constant=pytest.fail)

    return run


def test_check(printed):
    document = printed("check")
    assert list(document) == ["benchlay", "reviews", "cautions"]
    assert matches(document["reviews"], listed(REVIEW))
    (review,) = document["reviews"]
    assert len(review["sha256"]) == 64
    assert review["as_of"] == "2027-01-01"
    assert {route["state"] for route in review["routes"]} == {"as drawn", "glance", "off"}
    assert review["handed_over"][0]["through"] == "east.port"
    assert {beam["state"] for beam in review["handed_over"]} <= {"as drawn", "glance", "off"}
    assert review["matrix"]["states"] == ["as drawn", "glance", "off"]
    assert [row["id"] for row in review["matrix"]["rows"]] == [f["id"] for f in review["findings"]]
    assert review["zones"]
    assert [found["state"] for found in review["hazards"]] == ["as drawn", "glance", "off"]
    assert review["signs"]
    assert "accept-unmatched" in {finding["check"] for finding in review["findings"]}


def test_every_check_says_of_every_state_whether_it_ran(printed):
    (review,) = printed("check")["reviews"]
    by_check = {}
    for run in review["checks"]:
        by_check.setdefault(run["check"], []).append(run["state"])
    of_layout = {name: s for name, s in by_check.items() if not name.startswith("accept-")}
    assert all(states == ["as drawn", "glance", "off"] for states in of_layout.values())
    assert all(run["reason"] for run in review["checks"] if not run["ran"])


def test_findings_are_of_the_states_that_were_checked(printed):
    (review,) = printed("check", "--state", "glance")["reviews"]
    assert {state for f in review["findings"] for state in f["states"]} <= {"glance"}
    assert {run["state"] for run in review["checks"]} <= {"glance", "as drawn"}
    assert {entry["state"] for entry in review["ledger"]} == {"glance"}


@pytest.mark.parametrize("state", ["as drawn", "off", "glance"])
def test_trace(printed, state):
    document = printed("trace", "--state", state)
    assert matches(document, TRACE)
    assert document["state"] == state
    assert [beam["beam"] for beam in document["beams"]] == list(range(len(document["beams"])))
    assert list(document["placed"]) == sorted(document["placed"])


def test_ledgers_close_and_hold_no_sink_twice(printed):
    (review,) = printed("check")["reviews"]
    assert len(review["ledger"]) == 6
    for entry in review["ledger"]:
        total = sum(sink["power_W"] for sink in entry["sinks"])
        assert total == pytest.approx(entry["emitted_W"], rel=1e-9)
        assert abs(entry["unaccounted_W"]) <= 1e-9 * entry["emitted_W"]
        places = [(s["kind"], s["name"], s["wavelength_nm"]) for s in entry["sinks"]]
        assert len(set(places)) == len(places)
        assert [("largest_W" in s) for s in entry["sinks"]] == [
            s["kind"] == "below-floor" for s in entry["sinks"]
        ]


def test_what_the_words_of_a_beam_promise(printed):
    beams = printed("trace")["beams"]
    for beam in beams:
        assert (beam["parent"] is None) is (beam["event"] == "emitted")
        assert (beam["route"] is None) is (beam["routes"] == [])
        assert (beam["leg"] is None) is (beam["route"] is None)
        assert (beam["to"] is None) is (beam["ends"] in {"escaped", "bench"})
        length = sum((a - b) ** 2 for a, b in zip(beam["start"], beam["end"], strict=True)) ** 0.5
        before = beams[beam["parent"]]["optical_path_mm"] if beam["parent"] is not None else 0.0
        assert beam["optical_path_mm"] == pytest.approx(before + beam["medium_index"] * length)
        told = beam["polarization"]
        assert 0.0 <= told["degree"] <= 1.0
        assert 0.0 <= told["angle_deg"] < 180.0
        assert -45.0 <= told["ellipticity_deg"] <= 45.0
        across = sum(a * b for a, b in zip(told["horizontal"], beam["direction"], strict=True))
        assert across == pytest.approx(0.0, abs=1e-9)
        lost = sum(beam["lost_W"].values())
        assert lost + beam["power_at_end_W"] <= beam["power_W"] * (1.0 + 1e-9)
        assert set(beam["lost_W"]) <= SINKS
    pulsed = [beam for beam in beams if beam["source"] == "ruby"]
    assert all(b["pulse_energy_J"] == pytest.approx(b["power_W"] / 10.0) for b in pulsed)
    assert all(beam["pulse_energy_J"] is None for beam in beams if beam["source"] == "red")


def test_a_beam_inside_glass_stays_with_its_element(printed):
    beams = printed("trace")["beams"]
    inside = [beam for beam in beams if beam["medium_index"] > 1.1]
    assert inside
    assert all(beam["from"] == beam["to"] for beam in inside)


def test_errors_stand_in_the_place_of_results(printed):
    Path("x.yaml").write_text("bench: {}\n", encoding="utf-8")
    broken = keys({"layout": TEXT, "errors": listed(PROBLEM)})
    assert matches(printed("check")["reviews"], listed(broken))
    assert matches(printed("trace"), broken)

"""Every published value is computed, or listed with the reason why not."""

import json
import math
from pathlib import Path

import pytest

from benchlay.exposure import distances, eyewear, factors
from benchlay.exposure.apertures import (
    circle_area_m2,
    eye_aperture_mm,
    skin_aperture_mm,
)
from benchlay.exposure.emission import Level, emission_limit
from benchlay.exposure.limits import eye_limit, skin_limit

VALUES = json.loads(Path(__file__).with_name("exposure.json").read_text("utf-8"))["values"]

# Published values that are not computed, and why.
NOT_COMPUTED: dict[str, str] = {}


def _scale_level(x):
    mode = eyewear.Mode(x["mode"])
    load = x["value"] if "value" in x else eyewear.continuous_load_w_m2(x["power_w"], x["d63_mm"])
    return eyewear.scale_level(x["wavelength_nm"], mode, load)


def _beam(x):
    return {
        "divergence_full_63_rad": x["divergence_full_rad"],
        "exit_diameter_63_m": x["exit_diameter_m"],
    }


def _emission(x):
    return emission_limit(Level(x["class"]), x["wavelength_nm"], x["t_s"])


COMPUTE = {
    "mpe_eye_H": lambda x: eye_limit(x["wavelength_nm"], x["t_s"]).dose_j_m2,
    "mpe_eye_E": lambda x: eye_limit(x["wavelength_nm"], x["t_s"]).irradiance_w_m2,
    "mpe_skin_E": lambda x: skin_limit(x["wavelength_nm"], x["t_s"]).irradiance_w_m2,
    "ael_P": lambda x: _emission(x).power_w(x["t_s"]),
    "ael_Q": lambda x: _emission(x).energy_j(x["t_s"]),
    "en207_limit": lambda x: (
        eyewear.scale_limit(x["wavelength_nm"], eyewear.Mode(x["mode"]), x["LB"]).value
    ),
    "en207_lb": _scale_level,
    "optical_density": lambda x: eyewear.optical_density(x["exposure"], x["mpe"]),
    "nohd_linear": lambda x: distances.nohd_linear_m(x["power_w"], x["mpe_w_m2"], **_beam(x)),
    "nhd_diffuse": lambda x: distances.diffuse_distance_m(
        x["power_w"], x["mpe_w_m2"], reflectance=x["reflectance"]
    ),
    "gaussian_fraction": lambda x: distances.gaussian_fraction(x["aperture_radius_over_w"], 1.0),
    "mean_irradiance": lambda x: distances.mean_irradiance_w_m2(
        x["power_w"], x["diameter_m"] * 1e3
    ),
    "circle_area": lambda x: circle_area_m2(x["diameter_m"] * 1e3),
    "aperture_skin_mm": lambda x: skin_aperture_mm(x["wavelength_nm"]),
    "aperture_eye_mm": lambda x: eye_aperture_mm(x["wavelength_nm"], x["t_s"]),
    "C3": lambda x: factors.c3(x["wavelength_nm"]),
    "C4": lambda x: factors.c4(x["wavelength_nm"]),
    "C5": lambda x: factors.c5(x["N"], x["t_pulse_s"], x["wavelength_nm"], x["T_s"]),
    "C6": lambda x: factors.c6(x["alpha_mrad"], x["t_s"]),
    "T2": lambda x: factors.t2_s(x["alpha_mrad"]),
    "alpha_max": lambda x: factors.alpha_max_mrad(x["t_s"]),
    "gamma_ph": lambda x: factors.gamma_ph_mrad(x["t_s"]),
}


@pytest.mark.parametrize("entry", VALUES, ids=lambda e: e["id"])
def test_published_value(entry):
    if entry["id"] in NOT_COMPUTED:
        pytest.skip(NOT_COMPUTED[entry["id"]])
    assert entry["edition_matches"]
    found = COMPUTE[entry["quantity"]](entry["inputs"])
    assert math.isclose(found, entry["expected"]["value"], rel_tol=entry["rel_tol"]), (
        f"{found} is not {entry['as_published']} ({entry['source']})"
    )


def test_every_value_names_its_source():
    assert len({e["id"] for e in VALUES}) == len(VALUES)
    assert all(e["source"] and e["edition"] for e in VALUES)
    assert set(NOT_COMPUTED) <= {e["id"] for e in VALUES}


def test_most_values_are_not_from_memory():
    recalled = [e for e in VALUES if e["source_kind"] == "memory"]
    assert len(VALUES) >= 50
    assert len(recalled) <= len(VALUES) / 5
    # What is recalled says so in its source too, and the other way round.
    assert all("recalled" in e["source"] for e in recalled)
    assert not any("recalled" in e["source"] for e in VALUES if e not in recalled)


@pytest.mark.parametrize("entry", VALUES, ids=lambda e: e["id"])
def test_a_limit_from_memory_alone_says_so(entry):
    """What the program says of a limit's source agrees with what is known of it."""
    x, recalled = entry["inputs"], entry["source_kind"] == "memory"
    if entry["quantity"] in {"mpe_eye_H", "mpe_eye_E"}:
        said = eye_limit(x["wavelength_nm"], x["t_s"]).source
        known = "this value from memory" in said
    elif entry["quantity"] in {"ael_P", "ael_Q"}:
        known = _emission(x).from_memory
    else:
        return
    # A number that was recalled must say so; one that was read may be recalled elsewhere in
    # its row, and then the row says so.
    assert known or not recalled or entry["edition"].startswith("unchanged")

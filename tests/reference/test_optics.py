"""Every published optical value that the optics modules can compute, one test each.

`optics.json` states for each value its source and whether the page was seen (`web`,
`dataset`) or remembered (`memory`); tolerances come from the sources' digits.
"""

import json
from collections import Counter
from pathlib import Path

import numpy as np
import pytest

from benchlay.optics import coherency, fresnel, moments, rays
from benchlay.optics.materials import MATERIALS, air_index
from benchlay.optics.metals import METALS

ENTRIES = {
    entry["id"]: entry
    for entry in json.loads((Path(__file__).parent / "optics.json").read_text(encoding="utf-8"))
}

NAMES = {"N-BK7": "BK7", "N-SF11": "SF11", "SF10": "SF10", "fused silica": "fused-silica"}
NAMES |= {"sapphire-o": "sapphire", "MgF2-o": "MgF2"}
SYMBOLS = {"Ag": "silver", "Au": "gold", "Al": "aluminium"}

F_LINE, D_LINE, C_LINE = 486.1327, 587.5618, 656.2725


def index(i):
    material = MATERIALS[NAMES[i["material"]]]
    return material.index_at(1e3 * i["wavelength_um"])


def abbe(i):
    f, d, c = MATERIALS[NAMES[i["material"]]].index_at([F_LINE, D_LINE, C_LINE])
    return (d - 1.0) / (f - c)


def water_in_air(i):
    wavelength_nm = 1e3 * i["wavelength_um"]
    return MATERIALS["water"].index_at(wavelength_nm) / air_index(wavelength_nm)


def air(i):
    n = air_index(1e3 * i["wavelength_um_vacuum"], temperature_c=i["t_C"], pressure_pa=i["p_Pa"])
    return 1e8 * (n - 1.0)


def second_index(i):
    return index(i) if "material" in i else i["n2"]


def brewster(i):
    return np.degrees(fresnel.brewster_angle_rad(i["n1"], second_index(i)))


def normal_reflectance(i):
    return fresnel.powers(i["n1"], second_index(i), 1.0).rs


def cosine(i):
    return np.cos(np.radians(i["theta_deg"]))


def plate(single, internal=1.0):
    """Reflectance and transmittance of two equal faces, powers added."""
    transmitted = (1 - single) ** 2 * internal / (1 - (single * internal) ** 2)
    return single * (1 + internal * transmitted), transmitted


def brewster_plate(i):
    at = np.cos(fresnel.brewster_angle_rad(1.0, i["n"]))
    return plate(fresnel.powers(1.0, i["n"], at).rs)[0]


def rhomb(i):
    """Angle inside the glass at which total reflection parts p from s by `delta_deg`."""
    angle = np.radians(np.linspace(42.0, 89.0, 200_001))
    face = fresnel.amplitudes(i["n"], 1.0, np.cos(angle))
    # A perfect mirror has rp/rs = -1; the phase beyond that is what a rhomb uses.
    phase = np.degrees(np.abs(np.angle(face.rp / face.rs)))
    top = int(np.argmax(phase))
    low, high = slice(0, top), slice(top, None)
    part = low if i.get("branch") == "low" else high
    return np.degrees(angle[part][np.argmin(np.abs(phase[part] - i["delta_deg"]))])


def metal_index(i):
    n = METALS[SYMBOLS[i["metal"]]].index_at(1e3 * i["wavelength_um"])
    return n.real if i["part"] == "n" else n.imag


def tabulated_k(i):
    """Look up the node whose wavelength the source rounds to four decimals."""
    table = METALS[SYMBOLS[i["metal"]]].table
    return next(k for um, _, k in table if round(um, 4) == i["wavelength_um"])


def metal_mirror(i):
    n = METALS[SYMBOLS[i["metal"]]].index_at(1e3 * i["wavelength_um"])
    return fresnel.powers(1.0, n, 1.0).rs


def nk_mirror(i):
    return fresnel.powers(1.0, complex(i["n"], i["k"]), 1.0).rs


def plate_shift(i):
    k = rays.direction_from_angles(np.radians(i["theta_deg"]), 0.0)
    inside, _ = rays.refract(k, [1.0, 0.0, 0.0], 1.0, i["n"])
    path = inside * (i["t_cm"] / inside[0])
    return np.linalg.norm(path - k * (path @ k))


def prism(n, apex_deg, incidence_rad):
    """Deviation in degrees of a ray through a prism with its faces at +-apex/2."""
    half = np.radians(apex_deg) / 2.0
    first = rays.direction_from_angles(np.pi - half, 0.0)
    second = rays.direction_from_angles(half, 0.0)
    k = rays.direction_from_angles(-half + incidence_rad, 0.0)
    inside, _ = rays.refract(k, first, 1.0, n)
    out, total = rays.refract(inside, second, n, 1.0)
    return np.where(total, np.nan, np.degrees(np.arccos(rays.dot(k, out))))


def minimum_deviation(i):
    incidence = np.radians(np.linspace(30.0, 80.0, 100_001))
    deviation = prism(i["n"], i["apex_deg"], incidence)
    least = int(np.nanargmin(deviation))
    return deviation[least], np.degrees(incidence[least])


def brewster_prism(i):
    """Apex at which light met at Brewster's angle crosses symmetrically."""
    n = index(i)
    k = rays.direction_from_angles(fresnel.brewster_angle_rad(1.0, n), 0.0)
    inside, _ = rays.refract(k, [1.0, 0.0, 0.0], 1.0, n)
    return 2.0 * np.degrees(np.arccos(inside[0]))


def wedge(i):
    n = index(i)
    tilted = rays.direction_from_angles(np.radians(i["alpha_arcmin"] / 60.0), 0.0)
    out, _ = rays.refract([1.0, 0.0, 0.0], tilted, n, 1.0)
    return 60.0 * np.degrees(abs(rays.angles_from_direction(out)[0]))


def malus(i):
    angle = np.radians(np.linspace(0.0, 90.0, 9001))
    light = coherency.polarizer(coherency.linear(0.0, np.ones(9001)), angle, 1.0, 0.0)
    shares = coherency.power(light)
    return np.degrees(angle[np.argmin(np.abs(shares - i["ratio"]))])


def polarizers(i):
    light = coherency.unpolarized(1.0)
    if i.get("input") == "vertical":
        light = coherency.linear(0.0, i["I0"])
    for angle_deg in i["angles_deg"]:
        light = coherency.polarizer(light, np.radians(angle_deg), 1.0, 0.0)
    return coherency.power(light)


def depth_of_focus_km(i):
    w0 = i["w0_mm"]
    m = moments.from_waists(i["wavelength_nm"], 1.0, w0, w0, 0.0, 0.0, 1.0, 1.0)
    z = np.linspace(0.0, 1.0, 100_001)
    w = moments.radii(moments.propagate(m[:, None], z, 1.0))[0]
    return 1e-6 * 2.0 * np.interp(np.sqrt(2.0) * w0, w, z)


def farthest_collimated(i):
    """Radius at z of the beam that is smallest there, of all with a waist at 0."""
    z_mm = 1e3 * i["z_m"]
    w0 = np.linspace(1.0, 20.0, 19_001)
    m = moments.from_waists(i["wavelength_nm"], 1.0, w0, w0, 0.0, 0.0, 1.0, 1.0)
    return np.min(moments.radii(moments.propagate(m, z_mm, 1.0))[0])


COMPUTED = {
    "nd-N-BK7": index,
    "vd-N-BK7": abbe,
    "nd-N-SF11": index,
    "vd-SF10": abbe,
    "n-fs-d": index,
    "n-bk7-633": index,
    "n-sapphire-o-0.458": index,
    "n-sapphire-o-0.488": index,
    "n-sapphire-o-0.532": index,
    "n-sapphire-o-1.064": index,
    "n-mgf2-o": index,
    "n-water-D": water_in_air,
    "air-ciddor-20C-80kPa": air,
    "air-ciddor-20C-100kPa": air,
    "air-ciddor-20C-120kPa": air,
    "air-ciddor-30C-100kPa": air,
    "brewster-bk7": brewster,
    "brewster-glass-1.5": brewster,
    "brewster-water": brewster,
    "r-normal-bk7": normal_reflectance,
    "r-surface-4pct": normal_reflectance,
    "plate-loss-1.5": lambda i: plate(fresnel.powers(1.0, i["n"], cosine(i)).rs)[0],
    "pane-T": lambda i: plate(fresnel.powers(1.0, i["n"], cosine(i)).rs, i["internal"])[1],
    "rs-brewster-1.5": lambda i: (
        fresnel.powers(i["n1"], i["n2"], np.cos(fresnel.brewster_angle_rad(i["n1"], i["n2"]))).rs
    ),
    "rs-plate-brewster-ge": brewster_plate,
    "fresnel-30-rs": lambda i: fresnel.amplitudes(i["n1"], i["n2"], cosine(i)).rs.real,
    "fresnel-30-rp": lambda i: fresnel.amplitudes(i["n1"], i["n2"], cosine(i)).rp.real,
    "fresnel-45-Rs": lambda i: fresnel.powers(i["n1"], i["n2"], cosine(i)).rs,
    "fresnel-45-Rp": lambda i: fresnel.powers(i["n1"], i["n2"], cosine(i)).rp,
    "rhomb-1.5-lo": rhomb,
    "rhomb-1.5-hi": rhomb,
    "rhomb-1.51-hi": rhomb,
    "R-Al-600": nk_mirror,
    "R-BW-Al": nk_mirror,
    "R-BW-Cu": nk_mirror,
    "R-BW-Mg": nk_mirror,
    "R-BW-Pt": nk_mirror,
    "R-Al-AIP-650": metal_mirror,
    "n-Ag-0.6168": metal_index,
    "k-Au-0.6168": metal_index,
    "n-Au-0.5209": metal_index,
    "k-Au-0.5209": metal_index,
    "k-Al-0.6199": tabulated_k,
    "plate-shift-yf": plate_shift,
    "prism-60-1.5-D": lambda i: minimum_deviation(i)[0],
    "prism-60-1.5-i": lambda i: minimum_deviation(i)[1],
    "prism-60-sqrt2-D": lambda i: minimum_deviation(i)[0],
    "prism-brewster-fs": brewster_prism,
    "wedge-30arcmin": wedge,
    "malus-1/3": malus,
    "malus-1/10": malus,
    "polarizers-0-30-60-90": polarizers,
    "polarizers-20-40-60": polarizers,
    "st-depth-1mm": depth_of_focus_km,
    "hene-100m-w": farthest_collimated,
}

_ORDINARY = "the program uses ordinary indices only"
_RESONATOR = "the program has no resonator"
_COHERENCE = "coherence length belongs to the checks of interfering light"
_SHARES = "shares of a cut cross-section have their own tests"

ELSEWHERE = {
    "nd-N-SF10": "SF10 is the lead glass; the lead-free one has another index",
    "vd-N-SF10": "SF10 is the lead glass; the lead-free one has another index",
    "n-sapphire-e-0.488": _ORDINARY,
    "n-sapphire-e-1.064": _ORDINARY,
    "n-sapphire-e-1.55": _ORDINARY,
    "n-calcite-e": _ORDINARY,
    "n-mgf2-e": _ORDINARY,
    "dn-quartz": _ORDINARY,
    "dn-sapphire": _ORDINARY,
    "grating-cutoff": "gratings are an element kind and tested there",
    "pedrotti-w0": _RESONATOR,
    "pedrotti-ext-w": _RESONATOR,
    "yariv-confocal-w0": _RESONATOR,
    "yariv-confocal-w1": _RESONATOR,
    "arieli-m": _RESONATOR,
    "kasunic-m": _RESONATOR,
    "hene-fsr-730": _RESONATOR,
    "clip-1.5w": _SHARES,
    "knife-10-90": _SHARES,
    "knife-0.159": _SHARES,
    "fwhm-2w": "widths quoted otherwise are converted by the reader of layouts",
    "dnu-from-dlambda": _COHERENCE,
    "st-lc-multimode": _COHERENCE,
    "st-factor-lorentz": _COHERENCE,
}


@pytest.mark.parametrize("name", sorted(COMPUTED))
def test_published_value(name):
    entry = ENTRIES[name]
    found = float(COMPUTED[name](entry["inputs"]))
    bound = entry.get("abs_tol") or entry["rel_tol"] * abs(entry["expected"])
    assert abs(found - entry["expected"]) <= bound, (found, entry["source"])


def test_every_entry_is_tested_or_accounted_for():
    counted = Counter([*COMPUTED, *ELSEWHERE])
    assert set(counted) == set(ENTRIES)
    assert max(counted.values()) == 1


def test_every_entry_states_its_source():
    kinds = {"web", "dataset", "memory"}
    for entry in ENTRIES.values():
        assert entry["source_kind"] in kinds
        assert entry["source"]["title"]
        assert entry["source"]["where"]

r"""Indices of the glasses, crystals, water, air and metals that a layout may name.

Every transparent material is a published dispersion formula of one shape,

.. math:: n^2 = A + \sum_i \frac{B_i \lambda^2}{\lambda^2 - C_i},
          \quad \lambda \text{ in } \mu m,

with A = 1 where nothing is said. Sources quote the resonance as C_i or as a length
whose square it is; the table keeps their own digits and says which by how it is written
(`_lengths`). Catalogue formulas are relative to air, that of water is absolute.
Wavelengths are taken as those in vacuum. Where a source means the wavelength in air this
moves an index by some 1e-5, less than the spread from melt to melt.

Outside the range of its formula a material has no index: NaN, for the caller to report.
Coefficients were compared, to the single precision it keeps, with a public-domain
collection of such formulas, release of 2026.
"""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

from benchlay.named import NamedTuple

Floats: TypeAlias = NDArray[np.float64]

_UM_PER_NM = 1e-3


class Material(NamedTuple):
    """A transparent material with its dispersion formula and where it comes from."""

    name: str
    source: str
    range_nm: tuple[float, float]
    strengths: tuple[float, ...]  # B_i, without dimension
    resonances_um2: tuple[float, ...]  # C_i
    constant: float = 1.0  # A
    relative_to_air: bool = True
    note: str = ""

    def index_at(self, wavelength_nm: ArrayLike) -> Floats:
        """Index at vacuum wavelengths, relative to air if `relative_to_air`.

        Parameters
        ----------
        wavelength_nm : (...,) array_like of float
            In vacuum.

        Returns
        -------
        (...,) ndarray of float64
            NaN outside `range_nm`.

        Examples
        --------
        >>> round(float(MATERIALS["BK7"].index_at(632.8)), 5)
        1.51509
        """
        wavelength = np.asarray(wavelength_nm, dtype=np.float64)
        low, high = self.range_nm
        within = (wavelength >= low) & (wavelength <= high)
        squared_um = np.where(within, wavelength * _UM_PER_NM, np.nan) ** 2
        squared = np.full(squared_um.shape, self.constant)
        for strength, resonance in zip(self.strengths, self.resonances_um2, strict=True):
            squared = squared + strength * squared_um / (squared_um - resonance)
        index: Floats = np.sqrt(squared)
        return index

    def absolute_index(self, wavelength_nm: ArrayLike) -> Floats:
        """Index relative to vacuum, shape (...,), at vacuum wavelengths in nm.

        A formula that is relative to air is multiplied by the index of air at
        20 degrees C. NaN outside `range_nm`.
        """
        index = self.index_at(wavelength_nm)
        return index * air_index(wavelength_nm) if self.relative_to_air else index


def _lengths(*lengths_um: float) -> tuple[float, ...]:
    """Resonances whose source gives the wavelength, not its square."""
    return tuple(length * length for length in lengths_um)


_ORDINARY = "birefringent: acts by its ordinary index only"

_ALL = (
    Material(
        name="fused-silica",
        source="Malitson, J. Opt. Soc. Am. 55, 1205 (1965); 20 degrees C",
        range_nm=(210.0, 6700.0),
        strengths=(0.6961663, 0.4079426, 0.8974794),
        resonances_um2=_lengths(0.0684043, 0.1162414, 9.896161),
    ),
    Material(
        name="BK7",
        source="glass catalogue of 2017-01-20, arsenic-free type, n_d 1.51680",
        range_nm=(300.0, 2500.0),
        strengths=(1.03961212, 0.231792344, 1.01046945),
        resonances_um2=(0.00600069867, 0.0200179144, 103.560653),
    ),
    Material(
        name="SF10",
        source="glass catalogue of 2017-01-20, lead type, n_d 1.72825",
        range_nm=(380.0, 2500.0),
        strengths=(1.61625977, 0.259229334, 1.07762317),
        resonances_um2=(0.0127534559, 0.0581983954, 116.60768),
    ),
    Material(
        name="SF11",
        source="glass catalogue of 2017-01-20, lead type, n_d 1.78472",
        range_nm=(390.0, 2500.0),
        strengths=(1.73848403, 0.311168974, 1.17490871),
        resonances_um2=(0.0136068604, 0.0615960463, 121.922711),
    ),
    Material(
        name="CaF2",
        source="Malitson, Appl. Opt. 2, 1103 (1963); 24 degrees C",
        range_nm=(230.0, 9700.0),
        strengths=(0.5675888, 0.4710914, 3.8484723),
        resonances_um2=_lengths(0.050263605, 0.1003909, 34.64904),
    ),
    Material(
        name="MgF2",
        source="Dodge, Appl. Opt. 23, 1980 (1984); 19 degrees C",
        range_nm=(200.0, 7000.0),
        strengths=(0.48755108, 0.39875031, 2.3120353),
        resonances_um2=_lengths(0.04338408, 0.09461442, 23.793604),
        note=_ORDINARY,
    ),
    Material(
        name="sapphire",
        source="Malitson and Dodge, J. Opt. Soc. Am. 62, 1405 (1972); 20 degrees C",
        range_nm=(200.0, 5000.0),
        strengths=(1.4313493, 0.65054713, 5.3414021),
        resonances_um2=_lengths(0.0726631, 0.1193242, 18.028251),
        note=_ORDINARY,
    ),
    Material(
        name="ZnSe",
        source="Connolly, diBenedetto and Donadio, Proc. SPIE 181, 141 (1979), fitted by "
        "Tatian, Appl. Opt. 23, 4477 (1984); vapour-grown, 23 degrees C",
        range_nm=(540.0, 18200.0),
        strengths=(4.45813734, 0.467216334, 2.8956629),
        resonances_um2=_lengths(0.200859853, 0.391371166, 47.1362108),
    ),
    Material(
        name="quartz",
        source="Ghosh, Opt. Commun. 163, 95 (1999)",
        range_nm=(198.0, 2053.0),
        constant=1.28604141,
        strengths=(1.07044083, 1.10202242),
        resonances_um2=(0.0100585997, 100.0),
        note=_ORDINARY,
    ),
    Material(
        name="calcite",
        source="Ghosh, Opt. Commun. 163, 95 (1999)",
        range_nm=(204.0, 2172.0),
        constant=1.73358749,
        strengths=(0.96464345, 1.82831454),
        resonances_um2=(0.0194325203, 120.0),
        note=_ORDINARY,
    ),
    Material(
        name="water",
        source="Daimon and Masumura, Appl. Opt. 46, 3811 (2007); 20 degrees C",
        range_nm=(182.0, 1129.0),
        strengths=(0.5684027565, 0.1726177391, 0.02086189578, 0.1130748688),
        resonances_um2=(0.005101829712, 0.01821153936, 0.02620722293, 10.69792721),
        relative_to_air=False,
    ),
)

MATERIALS: dict[str, Material] = {material.name: material for material in _ALL}


# The formula was fitted from 230 to 1690 nm. Down to 185 nm it stays within 2e-6 of
# that of Peck and Reeder, J. Opt. Soc. Am. 62, 958 (1972), which was fitted that far.
# Beyond the ends it is held, which at 10 um is 4e-7 from Mathar, J. Opt. A 9, 470 (2007).
AIR_RANGE_NM = (185.0, 1690.0)

_KELVIN = 273.15
_STANDARD_C = 15.0
_STANDARD_PA = 101_325.0


def air_index(
    wavelength_nm: ArrayLike,
    *,
    temperature_c: ArrayLike = 20.0,
    pressure_pa: ArrayLike = _STANDARD_PA,
) -> Floats:
    r"""Index of dry air with 450 ppm of carbon dioxide.

    .. math:: 10^8 (n_s - 1) = \frac{5792105}{238.0185 - \sigma^2}
              + \frac{167917}{57.362 - \sigma^2}, \quad
              n - 1 = (n_s - 1)\,\rho / \rho_s

    with sigma = 1/lambda in 1/um, and the density taken from the gas law with the
    compressibility of air.

    Parameters
    ----------
    wavelength_nm : (...,) array_like of float
        In vacuum. Outside `AIR_RANGE_NM` the value at its nearer end is used.
    temperature_c : (...,) array_like of float
        Degrees Celsius.
    pressure_pa : (...,) array_like of float
        Pa.

    Returns
    -------
    (...,) ndarray of float64

    References
    ----------
    .. [1] Ciddor, P. E. Appl. Opt. 35, 1566 (1996), eqs. (1), (5), (12) and appendix.

    Examples
    --------
    >>> f"{air_index(633.0) - 1.0:.4e}"
    '2.7180e-04'
    """
    wavelength_um = np.clip(wavelength_nm, *AIR_RANGE_NM) * _UM_PER_NM
    sigma2 = 1.0 / np.square(wavelength_um)
    standard = 1e-8 * (5_792_105.0 / (238.0185 - sigma2) + 167_917.0 / (57.362 - sigma2))
    density = _density(np.asarray(temperature_c), np.asarray(pressure_pa))
    ratio = density / _density(np.asarray(_STANDARD_C), np.asarray(_STANDARD_PA))
    index: Floats = 1.0 + standard * ratio
    return index


def _density(temperature_c: Floats, pressure_pa: Floats) -> Floats:
    """Density of dry air but for a constant factor: p / (Z T)."""
    t, p_by_t = temperature_c, pressure_pa / (temperature_c + _KELVIN)
    first = 1.58123e-6 + (-2.9331e-8 + 1.1043e-10 * t) * t
    compressibility = 1.0 - p_by_t * first + p_by_t * p_by_t * 1.83e-11
    density: Floats = p_by_t / compressibility
    return density

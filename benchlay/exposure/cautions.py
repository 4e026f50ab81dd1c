"""What every statement about exposure must carry with it."""

from __future__ import annotations

SHORT = (
    "A calculation aid, not an approval: the standard in force, local rules and the laser safety "
    "officer decide."
)
"""What stands on every sheet, where there is room for one line; the rest is on the safety sheet."""

CAUTIONS: tuple[str, ...] = (
    "a calculation aid, not a certificate: the standard, local rules and the laser "
    "safety officer decide, and an assessment must be checked and signed by a "
    "competent person",
    "limits come from the edition named; laws and later editions may differ, and "
    "several numbers were recalled, not read from the standard",
    "limits guard against acute harm to normal eyes and skin: photosensitising drugs, "
    "missing eye lenses, infants and long-term effects need extra care",
    "a limit is no line between safe and dangerous: stay as far below it as practicable",
    "results hold only for the light as modelled: unknown reflections, misalignment, "
    "other wavelengths, pump light, harmonics, hot spots and higher modes are not "
    "covered unless entered",
    "engineering controls come first and eyewear last; eyewear is for accidental "
    "exposure, never for looking into a beam",
    "glare, fire, fume, electrical and ignition risks are separate",
)

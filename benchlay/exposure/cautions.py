"""What every statement about exposure must carry with it."""

from __future__ import annotations

SHORT = (
    "A calculation aid, not an approval: the standard in force, local rules and the laser safety "
    "officer decide."
)
"""What stands on every sheet, where there is room for one line; the rest is on the safety sheet."""

DECIDING: tuple[str, ...] = (
    "A calculation aid, not a certificate: no class and no approval is awarded. The standard, "
    "local rules and the laser safety officer decide, and an assessment must be checked and "
    "signed by a competent person.",
    "Limits come from the edition named beside them and take each beam alone, unless said "
    "otherwise. Laws and later editions may differ, and several numbers were recalled, not read "
    "from the standard.",
)
"""Who decides, and where limits come from: it goes with all that is held against a limit."""

CAUTIONS: tuple[str, ...] = (
    *DECIDING,
    "Limits guard against acute harm to normal eyes and skin: photosensitising drugs, missing "
    "eye lenses, infants and long-term effects need extra care.",
    "A limit is no line between safe and dangerous: stay as far below it as practicable.",
    "Results hold only for the light as modelled: unknown reflections, misalignment, other "
    "wavelengths, pump light, harmonics, hot spots and higher modes are not covered unless "
    "entered.",
    "Engineering controls come first and eyewear last; eyewear is for accidental exposure, "
    "never for looking into a beam.",
    "Glare, fire, fume, electrical and ignition risks are separate.",
)

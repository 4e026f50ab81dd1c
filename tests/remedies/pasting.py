"""What a drafter does with a remedy: paste it into the layout."""

HEAD = """\
bench: {size: [800, 400]}
sources:
  red: {wavelength: 633, power: 50 mW, beam: {waist_radius: 0.5}, polarization: vertical,
        at: [100, 200], heading: 0}
"""


def merged(into, new):
    for key, value in new.items():
        if isinstance(value, dict) and isinstance(into.get(key), dict) and key not in ("beam",):
            merged(into[key], value)
        else:
            into[key] = value
    return into

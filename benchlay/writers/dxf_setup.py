"""An empty DXF document for a sheet: units, layers, patterns, styles and views."""

from __future__ import annotations

import re
from typing import Any

from ezdxf import colors
from ezdxf.document import Drawing
from ezdxf.filemanagement import new
from ezdxf.lldxf.const import VALID_DXF_LINEWEIGHTS

from benchlay.sheets.lettering import plain
from benchlay.sheets.primitives import Layer, Sheet, to_model
from benchlay.writers.dimension_lines import ABOVE_MM, ARROW_MM, GAP_MM, OVERSHOOT_MM

VERSION = "R2010"
VIEWPORT_LAYER = "VIEWPORT"
LETTERING = "LETTERING"
DIMSTYLE = "BENCH"
NAME = re.compile(r"[A-Za-z0-9_-]{1,200}")
_FONT = "DejaVuSansCondensed.ttf"
_UNITS_MM, _METRIC = 4, 1


def document(sheet: Sheet) -> Drawing:
    """Return a document in which only the drawing itself is missing."""
    doc = new(VERSION, units=_UNITS_MM)
    doc.header["$MEASUREMENT"] = _METRIC
    # Patterns are in mm on paper: enlarged N times in model space, and not again by the
    # viewport.
    doc.header["$LTSCALE"] = sheet.scale
    doc.header["$PSLTSCALE"] = 0
    doc.header["$LWDISPLAY"] = 1
    for key, value in (("Title", sheet.title), *sheet.properties):
        doc.header.custom_vars.append(plain(key), plain(value))
    for layer in sheet.layers:
        _add_layer(doc, layer)
    if sheet.paper and VIEWPORT_LAYER not in doc.layers:
        _add_layer(doc, Layer(VIEWPORT_LAYER, "edge of the view; not printed"))
    if VIEWPORT_LAYER in doc.layers:
        doc.layers.get(VIEWPORT_LAYER).dxf.plot = 0
    doc.styles.add(LETTERING, font=_FONT)
    _add_dimension_style(doc, sheet)
    _set_views(doc, sheet)
    return doc


def _add_layer(doc: Drawing, layer: Layer) -> None:
    if not NAME.fullmatch(layer.name):
        msg = f"{layer.name!r} cannot name a layer"
        raise ValueError(msg)
    rgb = colors.RGB.from_hex(layer.colour)
    attributes: dict[str, Any] = {"color": _nearest_index(rgb)}
    if attributes["color"] != colors.BLACK:
        attributes["true_color"] = colors.rgb2int(rgb)
    hundredths = round(layer.width_mm * 100)
    attributes["lineweight"] = min(
        (w for w in VALID_DXF_LINEWEIGHTS if w > 0), key=lambda w: abs(w - hundredths)
    )
    if layer.pattern_mm:
        attributes["linetype"] = _pattern(doc, layer)
    doc.layers.add(layer.name, **attributes).description = plain(layer.meaning)


def _nearest_index(rgb: colors.RGB) -> int:
    """Return the numbered colour nearest to one; black is 7, which turns white on black."""
    if max(rgb) == 0:
        return colors.BLACK
    palette = {n: colors.int2rgb(colors.DXF_DEFAULT_COLORS[n]) for n in range(1, 250)}

    def distance(n: int) -> int:
        return sum((a - b) ** 2 for a, b in zip(palette[n], rgb, strict=True))

    return min(palette, key=distance)


def _pattern(doc: Drawing, layer: Layer) -> str:
    """Return the name of the line type of a layer, made if it is new."""
    lengths = layer.pattern_mm
    if len(lengths) % 2:
        msg = f"layer {layer.name!r}: a pattern is pairs of dash and gap"
        raise ValueError(msg)
    name = layer.pattern_name or "MM_" + "_".join(
        f"{length:g}".replace(".", "P") for length in lengths
    )
    if name not in doc.linetypes:
        signed = [v if n % 2 == 0 else -v for n, v in enumerate(lengths)]
        words = "dash, gap in mm on paper: " + " ".join(f"{v:g}" for v in lengths)
        doc.linetypes.add(name, [sum(lengths), *signed], description=words)
    return name


def _add_dimension_style(doc: Drawing, sheet: Sheet) -> None:
    """Set sizes N times enlarged: readers disagree on what an overall factor scales."""
    n = sheet.scale
    style = doc.dimstyles.new(
        DIMSTYLE,
        dxfattribs={
            "dimtxsty": LETTERING,
            "dimtxt": 3.5 * n,
            "dimasz": ARROW_MM * n,
            "dimexo": GAP_MM * n,
            "dimexe": OVERSHOOT_MM * n,
            "dimgap": ABOVE_MM * n,
            "dimscale": 1.0,
            "dimdec": 1,
            "dimzin": 8,  # no trailing zeros
            "dimtad": 1,  # above the line
            "dimtih": 0,
            "dimtoh": 0,
            "dimdsep": ord(sheet.decimal),
        },
    )
    style.copy_to_header(doc)


def _set_views(doc: Drawing, sheet: Sheet) -> None:
    """Say where the drawing lies, in model and in paper space."""
    low, high = to_model(sheet, (0.0, 0.0)), to_model(sheet, sheet.size_mm)
    model = doc.modelspace()
    for box in (doc.header, model.dxf):
        limits = ((low[0], low[1], 0.0), (high[0], high[1], 0.0))
        if box is doc.header:
            doc.header["$EXTMIN"], doc.header["$EXTMAX"] = limits
            doc.header["$LIMMIN"], doc.header["$LIMMAX"] = low, high
        else:
            model.dxf.extmin, model.dxf.extmax = limits
            model.dxf.limmin, model.dxf.limmax = low, high
    middle = ((low[0] + high[0]) / 2, (low[1] + high[1]) / 2)
    doc.set_modelspace_vport(height=(high[1] - low[1]) * 1.02, center=middle)
    if sheet.paper:  # what goes to a machine has no view on paper, and no layer for one
        _add_viewport(doc, sheet)


def _add_viewport(doc: Drawing, sheet: Sheet) -> None:
    """Show the whole of model space in paper space, 1:N."""
    width, height = sheet.size_mm
    layout = doc.paperspace()
    layout.page_setup(size=(width, height), margins=(0, 0, 0, 0), units="mm")
    viewport = layout.add_viewport(
        center=(width / 2, height / 2),
        size=(width, height),
        view_center_point=to_model(sheet, (width / 2, height / 2)),
        view_height=height * sheet.scale,
        status=2,
    )
    viewport.dxf.layer = VIEWPORT_LAYER

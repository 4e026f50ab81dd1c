"""The controlled area is the union of a state's zones, whatever the wavelength and kind."""

import shapely
from traced import area_of, traced

from benchlay.zones import Zones, controlled_areas, zones_of

CROSSED = """
    bench: {size: [1000, 600]}
    sources:
      green: {wavelength: 532, power: 1 W, beam: {waist_radius: 1}, at: [100, 300], heading: 0}
      infrared: {wavelength: 1064, power: 1 W, beam: {waist_radius: 1}, at: [500, 50], heading: 90}
      red: {wavelength: 633, power: 10 mW, beam: {waist_radius: 1}, at: [100, 500], heading: 0}
    elements:
      G: {kind: target, at: [900, 300], facing: 180, diffuse: 0}
      I: {kind: target, at: [500, 560], facing: 270, diffuse: 0, size: [10, 10]}
      R: {kind: target, at: [300, 500], facing: 180, diffuse: 0}
    states: {quiet: {sources.green.power: 0.1 mW}}
    """


def polygons(areas):
    return [shapely.Polygon(area.polygon[0], area.polygon[1:]) for area in areas]


def test_zones_that_cross_are_one_area_with_both_wavelengths():
    zones = zones_of(traced(CROSSED), states=["as drawn"])
    areas = controlled_areas(zones)
    assert [area.wavelengths_nm for area in areas] == [(532.0, 1064.0), (633.0,)]
    assert all(area.state == "as drawn" and area.kinds == ("direct",) for area in areas)
    union = shapely.union_all(polygons(areas))
    assert shapely.symmetric_difference(union, area_of(zones)).area < 1e-3
    for area, polygon in zip(areas, polygons(areas), strict=True):
        assert polygon.is_valid
        assert abs(polygon.area * 1e-6 - area.area_m2) < 1e-9


def test_each_state_has_its_own_area_and_none_where_there_is_no_zone():
    zones = zones_of(traced(CROSSED))
    areas = controlled_areas(zones)
    assert [(a.state, a.wavelengths_nm) for a in areas] == [
        ("as drawn", (532.0, 1064.0)),
        ("as drawn", (633.0,)),
        ("quiet", (633.0,)),
        ("quiet", (1064.0,)),
    ]
    assert controlled_areas(Zones((), ())) == ()

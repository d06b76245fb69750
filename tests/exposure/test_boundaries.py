"""Boundaries against circles, two sources, islands and holes, and true fields at every vertex."""

import numpy as np
import pytest
import shapely
from scipy.ndimage import label

from exposure.assessment.boundaries import horizontal, section
from exposure.assessment.contours import polygons, rings
from exposure.assessment.distances import compliance_distances
from tests.exposure.positions import GARDEN_WIRE, first_over, garden, heating, sphere, strengths

CENTIMETRE = 0.01
WIRE = [[[0.0, 0.0, 9.0]]]


def shape(polygon):
    return shapely.Polygon(polygon.outline, polygon.holes)


def off_the_line(polygon, ratio, function, points):
    """Distance of the vertices from the line of one: logarithm over its slope, (k,). [m]"""
    places = np.array([p for ring in (polygon.outline, *polygon.holes) for p in ring])
    step = 1e-4

    def logs(p):
        return np.log(ratio(function(points(p))))

    slope = [(logs(places + step * e) - logs(places - step * e)) / (2 * step) for e in np.eye(2)]
    return np.abs(logs(places)) / np.hypot(*slope)


def test_a_far_field_is_bounded_by_a_circle():
    """E^2 = 25 / r^2 around (0, 0, 9), plane at 6 m: radius sqrt(25 - 9) = 4 m.

    Vertices and chords to 1 cm, hence the area to 2 pi 4 x 0.01 m2.
    """
    field = strengths(sphere(np.array([0, 0, 9.0]), 25.0), WIRE)

    (found,) = horizontal(field, [first_over(1.0)], 6.0, 6.0, [5.0])

    (island,) = found
    radii = np.hypot(*np.array(island.outline).T)
    assert radii == pytest.approx(4.0, abs=CENTIMETRE)
    assert shape(island).area == pytest.approx(16 * np.pi, abs=2 * np.pi * 4 * CENTIMETRE)
    assert shape(island).exterior.is_ccw


def test_a_plane_beyond_the_compliance_distance_costs_nothing():
    field = strengths(sphere(np.array([0, 0, 9.0]), 25.0), WIRE)

    assert horizontal(field, [first_over(1.0)], 0.0, 2.0, [5.0]) == ((),)
    assert field.values.points == 0


def test_a_band_shows_the_widest_height():
    """Sphere of 5 m around 9 m, heights 5.5 to 8 m: the widest is 8 m, sqrt(25 - 1)."""
    field = strengths(sphere(np.array([0, 0, 9.0]), 25.0), WIRE)

    (found,) = horizontal(field, [first_over(1.0)], 5.5, 8.0, [5.0])

    assert np.hypot(*np.array(found[0].outline).T) == pytest.approx(np.sqrt(24), abs=CENTIMETRE)


def test_the_same_circle_in_a_vertical_section_is_cut_by_the_ground():
    """Sphere of 5 m around 3 m height, section 3 m aside: circle of radius 4 m, cut at up = 0."""
    field = strengths(sphere(np.array([0, 0, 3.0]), 25.0), [[[0.0, 0.0, 3.0]]])

    (found,) = section(field, [first_over(1.0)], (3.0, 0.0), 0.0, 20.0, 20.0, [5.0])

    circle = shapely.Point(0, 3).buffer(4, quad_segs=200).intersection(shapely.box(-9, 0, 9, 9))
    (island,) = found
    assert shape(island).symmetric_difference(circle).area < circle.length * CENTIMETRE
    assert min(up for _, up in island.outline) == 0.0


def two(distance, wavelength, centre=0.0):
    """Scalar interference of two equal sources at (+-distance/2, 0, 0): |sum e^{-jkr}/r|^2."""
    places = np.array([[-0.5 * distance, 0.0, centre], [0.5 * distance, 0.0, centre]])
    k = 2 * np.pi / wavelength

    def values(points):
        r = np.maximum(np.linalg.norm(points[:, None, :] - places, axis=2), 1e-6)
        return (np.abs((np.exp(-1j * k * r) / r).sum(axis=1)) ** 2)[:, None] + 1e-12

    return strengths(values, places[:, None, :], wavelength)


def raster(field, ratio, height, lower, upper, step=0.02):
    """Region of ratio >= 1 on a fine raster of true fields: number of islands, holes, and area."""
    axes = [np.arange(a, b, step) for a, b in zip(lower, upper, strict=True)]
    x, y = np.meshgrid(*axes, indexing="ij")
    points = np.column_stack([x.ravel(), y.ravel(), np.full(x.size, height)])
    inside = (ratio(field.values(points)) >= 1).reshape(x.shape)
    eight = np.ones((3, 3))
    return (
        label(inside, eight)[1],
        label(np.pad(~inside, 1, constant_values=True))[1] - 1,
        inside.sum() * step**2,
    )


@pytest.mark.parametrize("limit", [0.15, 0.4, 0.62])
def test_islands_and_holes_of_two_interfering_sources(limit):
    """Sources 3 m apart, wavelength 2 m, plane 1.2 m above: fringes that part and join.

    Against true fields every 2 cm: the same number of islands and holes, area to 2 cm of its rim.
    """
    field, ratio = two(3.0, 2.0), first_over(limit)

    (found,) = horizontal(field, [ratio], 1.2, 1.2, [7.0])

    islands, holes, area = raster(field, ratio, 1.2, (-8, -7), (8, 7))
    shapes = [shape(p) for p in found]
    assert len(found) == islands
    assert sum(len(p.holes) for p in found) == holes
    assert sum(s.area for s in shapes) == pytest.approx(area, abs=0.02 * sum(s.length for s in shapes))


LIMITS = (heating(28, 0.073), heating(61, 0.16), heating(90, 0.3))
REACH = (4.30, 1.95, 1.12)  # of the next test's dipole, from test_distances


@pytest.mark.parametrize(("height", "budget"), [(9.0, 6_000), (8.0, 2_500), (7.0, 1_500)])
def test_vertices_around_a_dipole_lie_on_the_line(height, budget):
    """True fields at every vertex: within 1 cm of the line of one; the points asked for are counted."""
    field = strengths(garden(current=2.0), [GARDEN_WIRE])

    found = horizontal(field, LIMITS, height, height, REACH)

    assert field.values.points < budget
    assert sum(map(len, found)) > 0
    for ratio, islands in zip(LIMITS, found, strict=True):
        for island in islands:
            errors = off_the_line(
                island, ratio, garden(current=2.0), lambda p: np.column_stack([p, np.full(len(p), height)])
            )
            assert errors.max() < CENTIMETRE
            assert shape(island).is_valid


def test_a_boundary_decimetres_from_the_wire_lies_on_the_line():
    """Weak field, reach 0.3 to 1.1 m: panels are known to 2 cm only, vertices still to 1 cm."""
    weak = garden(current=0.5)
    field = strengths(weak, [GARDEN_WIRE])
    reach = [f.distance for f in compliance_distances(field, LIMITS)]

    found = horizontal(field, LIMITS, 9.0, 9.0, reach)

    assert 0.3 < min(reach) < max(reach) < 1.1
    for ratio, islands in zip(LIMITS, found, strict=True):
        (island,) = islands
        errors = off_the_line(island, ratio, weak, lambda p: np.column_stack([p, np.full(len(p), 9.0)]))
        assert errors.max() < CENTIMETRE


def test_heights_between_the_first_five_are_seen():
    """A hot wire 0.6 m above ground, a person's band of 0-2 m: E^2 = 0.3^2 / r^2 around it, radius 0.3 m.

    The first set of heights has 0.29 and 1.0 m, both more than 0.3 m from a place 6 cm aside: only
    more heights show the whole width.  Tolerance: 17 heights are 0.2 m apart or less there, half of that
    off the wire's height the circle is sqrt(0.3^2 - 0.1^2) wide: 2 cm less, and 1 cm of the vertices.
    """
    wire = np.array([[-1.0, 0.0, 0.6], [1.0, 0.0, 0.6]])

    def values(points):
        beyond = np.maximum(np.abs(points[:, 0]) - 1.0, 0.0)
        squared = beyond**2 + points[:, 1] ** 2 + (points[:, 2] - 0.6) ** 2
        return 0.09 / np.maximum(squared, 1e-4)[:, None]

    (found,) = horizontal(strengths(values, [wire]), [first_over(1.0)], 0.0, 2.0, [0.3])

    zone = shapely.union_all([shape(p) for p in found])
    assert zone.covers(shapely.LineString(wire[:, :2]).buffer(0.27))
    assert shapely.LineString(wire[:, :2]).buffer(0.31).covers(zone)


def test_a_conductor_is_inside_however_weak_its_field():
    """A wire in the plane with ratios far below one is drawn as a strip: three radii count as over."""
    field = strengths(sphere(np.array([0, 0, 9.0]), 1e-6), [GARDEN_WIRE])

    (found,) = horizontal(field, [first_over(1.0)], 9.0, 9.0, [0.003])

    assert shape(found[0]).covers(shapely.LineString(GARDEN_WIRE[:, :2]))


@pytest.mark.parametrize("side", [40, 81])
def test_rings_of_a_raster_have_the_inside_on_their_left(side):
    """A ring (0.3 < r < 0.7) and a disc in it: outlines counter-clockwise, the hole clockwise."""
    x, y = np.meshgrid(*[np.linspace(-1, 1, side)] * 2, indexing="ij")
    r = np.hypot(x, y)

    found = rings(np.where(r < 0.2, 0.1 - r, np.minimum(r - 0.3, 0.7 - r)))

    shapes = polygons(found)
    assert sorted(len(s.interiors) for s in shapes) == [0, 1]
    assert sum(s.area for s in shapes) * (2 / (side - 1)) ** 2 == pytest.approx(
        np.pi * (0.1**2 + 0.7**2 - 0.3**2), rel=0.02
    )


def test_rings_pass_every_edge_once():
    """A random raster with many saddles: every ring is closed, simple pieces add up to the cells' area."""
    field = np.random.default_rng(2).normal(size=(30, 30))

    found = rings(field)

    inside = sum(shapely.Polygon(r).area * (1 if shapely.LinearRing(r).is_ccw else -1) for r in found)
    assert all(shapely.LinearRing(r).is_simple for r in found)
    assert 0.4 * 900 < inside < 0.6 * 900


def test_a_magnetic_null_on_an_axis_makes_no_tower():
    """E^2 = 25/r^2 and H^2 = 25 (rho/r)^2/(eta r)^2 around (0, 0, 9): the section is the circle of 5 m.

    On the axis the logarithm of H^2 has no bottom, so no polynomial follows it; true fields must.
    Whatever either quotient is, none exceeds that of E: 5 m with the 2 cm of a section.
    """

    def values(points):
        offset = points - [0.0, 0.0, 9.0]
        squared = np.maximum((offset**2).sum(axis=1), 1e-8)
        across = offset[:, 0] ** 2 + offset[:, 1] ** 2
        return np.column_stack([25 / squared, 25 * across / squared**2 / 376.73**2])

    def ratio(found):
        return np.maximum(found[:, 0], found[:, 1] * 376.73**2)

    (found,) = section(strengths(values, WIRE, 10.0), [ratio], (0.0, 0.0), 0.0, 8.0, 16.0, [5.0])

    (island,) = found
    radii = np.hypot(*(np.array(island.outline) - [0.0, 9.0]).T)
    assert radii == pytest.approx(5.0, abs=2 * CENTIMETRE)

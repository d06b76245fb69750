"""The greatest exposure ratio of areas against closed forms and dense grids of true fields."""

import numpy as np
import pytest
import shapely
from scipy.integrate import trapezoid
from shapely.affinity import rotate

from exposure.assessment.areas import (
    OUTLINE_STEPS,
    QUIET,
    QUIET_TOLERANCE,
    TOLERANCE,
    greatest,
    greatest_body_average,
)
from exposure.assessment.prisms import Prism, frame, prism
from exposure.site.model import Area
from tests.exposure.positions import GARDEN_WIRE, first_over, garden, heating, sphere, strengths

LIMITS = (heating(28, 0.073), heating(61, 0.16), lambda v: v[:, 1] / 0.1**2)


def rectangle(west, south, east, north, bottom, top):
    return Prism(shapely.box(west, south, east, north), bottom, top)


def dense(function, space):
    """True fields in a prism and along its outline, every 0.1 m or 1/150 of its width if that is more."""
    west, south, east, north = space.outline.bounds
    step = max(0.1, (east - west) / 150)
    axes = [np.arange(a, b + step, step) for a, b in ((west, east), (south, north))]
    plan = np.stack(np.meshgrid(*axes, indexing="ij"), axis=-1).reshape(-1, 2)
    rim = np.array(shapely.segmentize(space.outline.exterior, 0.5 * step).coords)[:, :2]
    plan = np.concatenate([plan, rim])
    heights = np.linspace(space.bottom, space.top, 11)
    points = np.column_stack([np.repeat(plan, 11, axis=0), np.tile(heights, len(plan))])
    return function(points[space.contains(points)])


def test_the_greatest_ratio_of_a_far_field_is_at_the_nearest_corner():
    """E^2 = 9 / r^2 from (0, 0, 9): the nearest point of the prism is the corner (3, 4, 4), r^2 = 50."""
    field = strengths(sphere(np.array([0, 0, 9.0]), 9.0), [[[0, 0, 9.0]]])

    found = greatest(field, [first_over(1.0)], rectangle(3, 4, 9, 11, 2, 4))[0]

    assert found.position == pytest.approx((3, 4, 4), abs=1e-9)
    assert found.ratio == pytest.approx(9 / 50, rel=1e-12)
    assert found.ratio <= found.upper <= found.ratio * (1 + TOLERANCE)


def test_the_greatest_ratio_on_a_slanting_edge_is_at_the_foot_of_the_perpendicular():
    """A triangle whose long side passes (0, 0) at 5 m: E^2 = 1 / 25 there, at (3, 4) by hand.

    Outline sampled at 1/256 of its length: at most 0.06 m from the foot, (0.06/5)^2 = 1.5e-4.
    """
    along, foot = np.array([-4.0, 3.0]), np.array([3.0, 4.0])
    outline = shapely.Polygon([foot - 1.3 * along, foot + 3 * foot, foot + 1.1 * along])
    field = strengths(sphere(np.array([0, 0, 1.0])), [[[0, 0, 1.0]]])

    found = greatest(field, [first_over(1.0)], Prism(outline, 1.0, 1.0))[0]

    step = outline.exterior.length / OUTLINE_STEPS
    assert found.ratio == pytest.approx(1 / 25, rel=(step / 2 / 5) ** 2 + 1e-9)
    assert found.upper >= 1 / 25 * (1 - (step / 2 / 5) ** 2)


def test_a_greatest_ratio_inside_an_area_is_found():
    """A smooth field that is greatest in the middle: 2 - (distance to (1.3, 0.7, 1.1))^2 / 9."""
    place = np.array([1.3, 0.7, 1.1])

    def function(points):
        return (2 - ((points - place) ** 2).sum(axis=1) / 9)[:, None]

    found = greatest(strengths(function, [[[40, 0, 9.0]]]), [first_over(1.0)], rectangle(0, 0, 2, 2, 0, 2))[0]

    assert found.ratio == pytest.approx(2.0, rel=TOLERANCE)
    assert found.upper >= 2.0 * (1 - 1e-6)


def test_the_hottest_fringe_of_a_standing_wave_is_found():
    """cos^2 fringes half a wavelength apart under a slow rise: 20 maxima, the last is greatest.

    f = (0.3 + cos^2(k x)) (1 + x / 100), k = 2 pi / 2 m, 0 <= x <= 19.9: near x = 19, f = 1.3 * 1.19.
    """

    def function(points):
        x = points[:, 0]
        return ((0.3 + np.cos(np.pi * x) ** 2) * (1 + x / 100))[:, None]

    field = strengths(function, [[[-50, 0, 9.0]]], wavelength=2.0)
    found = greatest(field, [first_over(1.0)], rectangle(0, 0, 19.6, 3, 1, 1))[0]

    assert found.position[0] == pytest.approx(19, abs=0.1)
    assert found.ratio == pytest.approx(1.3 * 1.19, rel=TOLERANCE)


AREAS = {
    "house": (rectangle(8, -4, 16, 4, 2.8, 4.8), 2_000),
    "lot": (rectangle(-30, -30, 30, 30, 0, 2), 6_500),
    "near the end": (rectangle(6, -4, 12, 4, 5, 9), 5_000),
    "round a corner": (
        Prism(shapely.Polygon([(-8, 2), (-8, 10), (10, 10), (10, -6), (7, -6), (7, 2)]), 6, 9.5),
        12_000,
    ),
    "path": (Prism(shapely.LineString([(-20, 5), (0, 6), (20, -9)]).buffer(1), 0, 2), 2_500),
}


@pytest.mark.parametrize("name", AREAS)
def test_areas_near_a_dipole_over_ground(name):
    """All ratio functions in one search, against true fields every 0.1 to 0.4 m.

    Tolerance: that of the search; the budget is the count measured when this was written, with a
    quarter to spare.
    """
    space, budget = AREAS[name]
    field = strengths(garden(current=2.0), [GARDEN_WIRE])

    found = greatest(field, LIMITS, space)

    values = dense(garden(current=2.0), space)
    for extreme, ratio in zip(found, LIMITS, strict=True):
        true = ratio(values).max()
        tolerance = QUIET_TOLERANCE if true < QUIET else TOLERANCE
        assert extreme.ratio >= true * (1 - tolerance)
        assert extreme.upper >= true * (1 - 1e-3)  # the outline is sampled 1/256 of its length apart
        assert extreme.upper <= extreme.ratio * (1 + 2 * tolerance)
        assert ratio(extreme.values[None])[0] == pytest.approx(extreme.ratio, rel=1e-12)
        assert space.contains([extreme.position])[0]
    assert field.values.points < budget


def test_a_conductor_through_an_area_is_infinite():
    """Points within three radii count as infinite (design.md 6)."""
    found = greatest(strengths(garden(), [GARDEN_WIRE]), LIMITS, rectangle(-1, -1, 1, 1, 8.5, 9.5))

    assert all(np.isinf(f.upper) for f in found)


def test_a_point_costs_one_evaluation():
    field = strengths(garden(), [GARDEN_WIRE])

    found = greatest(field, LIMITS, Prism(shapely.Point(4, 2), 7.0, 7.0))

    assert field.values.points == 1
    assert found[0].position == pytest.approx((4, 2, 7))


def test_the_mean_over_a_body_of_a_field_quadratic_in_height():
    """Mean of 1 + z^2 over 0.5 to 2.5 m is 1 + (2.5^3 - 0.5^3) / 6: Gauss's rule is exact."""

    def function(points):
        return (1 + points[:, 2] ** 2)[:, None]

    field = strengths(function, [[[40, 0, 9.0]]])
    found = greatest_body_average(field, [first_over(1.0)], rectangle(0, 0, 2, 2, 0.5, 2.5))[0]

    assert found.ratio == pytest.approx(1 + (2.5**3 - 0.5**3) / 6, rel=1e-12)
    assert found.position[2] == 0.5


def test_the_mean_over_a_body_beneath_a_dipole():
    """Against the trapezoid rule with 201 heights at the place found, and with 0.5 m steps in plan."""
    lot = rectangle(-10, -10, 10, 10, 0, 2)
    field = strengths(garden(current=2.0), [GARDEN_WIRE])

    found = greatest_body_average(field, LIMITS, lot)

    def mean(plan):
        heights = np.linspace(0, 2, 201)
        points = np.column_stack([np.tile(plan, (201, 1)), heights])
        return trapezoid(garden(current=2.0)(points), heights, axis=0) / 2

    for extreme, ratio in zip(found, LIMITS, strict=True):
        assert ratio(mean(extreme.position[:2])[None])[0] == pytest.approx(extreme.ratio, rel=1e-4)
        places = [(x, y) for x in np.arange(-10, 11, 2.0) for y in np.arange(-10, 11, 2.0)]
        assert extreme.upper >= max(ratio(mean(p)[None])[0] for p in places) * (1 - 1e-4)


def test_a_path_is_widened_and_a_point_stays():
    """A straight path 10 m long and 2 m wide holds its rectangle and its round ends: 20 + pi m2."""
    path = prism(Area("path", "general_public", "path", ((0, 0), (10, 0)), 0.0, 2.0, width=2.0))
    point = prism(Area("desk", "general_public", "point", ((3, 4),), 1.0, 1.0))

    assert path.outline.covers(shapely.box(0, -1, 10, 1))
    assert path.outline.area == pytest.approx(20 + np.pi, rel=1e-2)
    assert path.outline.area >= 20 + np.pi
    assert (point.outline.x, point.outline.y, point.bottom, point.top) == (3, 4, 1, 1)


def test_the_frame_of_a_turned_rectangle_is_itself():
    turned = rotate(shapely.box(0, 0, 7, 3), 33)

    _, axes, sides = frame(turned)

    assert sorted(sides) == pytest.approx([3, 7])
    assert axes @ axes.T == pytest.approx(np.eye(2), abs=1e-12)
